// Writes the example as files for the command line: npm run demo-files -- DIR
import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { demoLoad } from './demo-load.js';
import { DEMO_SITE } from './demo-site.js';

const dir = process.argv[2];
if (dir === undefined || process.argv.length > 3) {
  process.stderr.write('say the folder to write site.json and load.csv to\n');
  process.exit(2);
}
await mkdir(dir, { recursive: true });
await writeFile(join(dir, 'site.json'), `${JSON.stringify(DEMO_SITE, null, 2)}\n`);
await writeFile(join(dir, 'load.csv'), demoLoad());
process.stderr.write(`site.json and load.csv stand in ${dir}\n`);
