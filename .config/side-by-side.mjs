// Runs scripts of package.json two at a time, in the order given, and shows what each said once it has ended.
//   node .config/side-by-side.mjs SCRIPT …
// Ends in 1 where one of them failed; what has not begun by then is left out.
import { spawn } from 'node:child_process';

const AT_ONCE = 2;
const waiting = process.argv.slice(2);
let failed = false;
await Promise.all(Array.from({ length: AT_ONCE }, work));
process.exitCode = failed ? 1 : 0;

async function work() {
  for (;;) {
    const script = failed ? undefined : waiting.shift();
    if (script === undefined) return;
    if (!(await ended(script))) failed = true;
  }
}

/**
 * @param {string} script
 * @returns {Promise<boolean>} whether it went well
 */
function ended(script) {
  return new Promise((resolve) => {
    const child = spawn('npm', ['run', '-s', script], { stdio: ['ignore', 'pipe', 'pipe'] });
    /** @type {Buffer[]} */
    const said = [];
    child.stdout.on('data', (chunk) => said.push(chunk));
    child.stderr.on('data', (chunk) => said.push(chunk));
    child.on('error', (error) => said.push(Buffer.from(`${error.message}\n`)));
    child.on('close', (code) => {
      process.stdout.write(Buffer.concat(said));
      if (code !== 0) process.stdout.write(`${script} failed\n`);
      resolve(code === 0);
    });
  });
}
