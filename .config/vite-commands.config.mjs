// Bundles the command line, so that a command loads a few files and not hundreds. main.js stands where the compiler put
// its own, the parts beside it. Packages stay outside but zod: every command would read its hundred files.
import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { defaultServerConditions, defineConfig } from 'vite';

const root = fileURLToPath(new URL('..', import.meta.url));
// The thread's program stands among the parts, beside the one that starts it.
const programs = [
  { name: 'main', source: `${root}apps/cli/main.ts` },
  { name: 'parts/judge-worker', source: `${root}apps/cli/judge-worker.ts` },
].filter(({ source }) => existsSync(source));

export default defineConfig({
  root,
  publicDir: false,
  ssr: { noExternal: ['zod'], resolve: { conditions: ['source', ...defaultServerConditions] } },
  build: {
    ssr: true,
    outDir: `${root}dist/apps/cli`,
    emptyOutDir: false,
    target: 'node20',
    minify: false,
    sourcemap: true,
    rolldownOptions: {
      checks: { pluginTimings: false },
      input: Object.fromEntries(programs.map(({ name, source }) => [name, source])),
      output: { entryFileNames: '[name].js', chunkFileNames: 'parts/[name].js' },
    },
  },
});
