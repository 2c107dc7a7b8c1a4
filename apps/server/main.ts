import { createServer } from './server.js';
import { readSettings } from './settings.js';

try {
  const settings = readSettings(process.env);
  const app = await createServer(settings);
  app.enableShutdownHooks(undefined, { useProcessExit: true });
  await app.listen(settings.port, settings.host);
  const shown = settings.host === '::1' ? '[::1]' : settings.host;
  process.stderr.write(`Varwright serves at http://${shown}:${new URL(await app.getUrl()).port || settings.port}/\n`);
} catch (error) {
  process.stderr.write(`the server did not start: ${error instanceof Error ? error.message : error}\n`);
  process.exit(1);
}
