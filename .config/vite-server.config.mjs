// Bundles the server, so that it starts from a file and not from a thousand: main.js stands where the compiler put its own.
// Packages with compiled parts, files or threads of their own stay outside, and so does what the others only take where it
// is installed.
import { fileURLToPath } from 'node:url';
import { defaultServerConditions, defineConfig } from 'vite';

const root = fileURLToPath(new URL('..', import.meta.url));
const outside = ['better-sqlite3', 'pg', 'pino', 'piscina', 'pdfkit', 'mathjs'];
const optional =
  /^(@nestjs\/(microservices|websockets|platform-express)|class-(transformer|validator)|@fastify\/(static|view)|@google-cloud|@sap|hdb-pool|ioredis|mongodb|mssql|mysql2?|oracledb|pg-native|pg-query-stream|react-native|redis|sql\.js|sqlite3|typeorm-aurora)/;

export default defineConfig({
  root,
  publicDir: false,
  ssr: { noExternal: true, external: outside, resolve: { conditions: ['source', ...defaultServerConditions] } },
  build: {
    ssr: true,
    outDir: `${root}dist/apps/server`,
    emptyOutDir: false,
    target: 'node20',
    minify: false,
    sourcemap: true,
    rolldownOptions: {
      checks: { pluginTimings: false },
      input: {
        main: `${root}apps/server/main.ts`,
        'planning/planning-worker': `${root}apps/server/planning/planning-worker.ts`,
      },
      external: optional,
      output: { entryFileNames: '[name].js', chunkFileNames: 'parts/[name].js' },
    },
  },
});
