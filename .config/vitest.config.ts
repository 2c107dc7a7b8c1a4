import { fileURLToPath } from 'node:url';
import { defaultServerConditions } from 'vite';
import { defineConfig } from 'vitest/config';
import { BrowserFirst } from './browser-first.js';

// 'import' or 'default' in these lists would reach Node itself and make it load the wrong build of some packages.
const fromSource = resolved(['source', ...defaultServerConditions]);
const fromDist = resolved([...defaultServerConditions]);
const soak = process.env.VARWRIGHT_SOAK === '1';
const withDatabases = ['libs/store/**/*.spec.ts', 'libs/jobs/**/*.spec.ts', 'apps/server/**/*.spec.ts'];
// What is timed has the machine to itself.
const alone = ['test/browser/pace.spec.ts'];
const startPostgres = ['test/support/postgres.ts'];
// What is asked of the program as a whole is asked of what runs in service, the compiled one: Node loads it as it stands.
const compiled = {
  globalSetup: ['test/support/build.ts', ...startPostgres],
  server: { deps: { external: [/\/dist\//] } },
};

// Pure functions keep nothing between one test and the next, and every other test has a database, a server, a browser or a
// program of its own: files share what is loaded.
const shared = { isolate: false };

function resolved(conditions: string[]) {
  return { resolve: { conditions }, ssr: { resolve: { conditions } } };
}

const project = (name: string, include: string[], timeoutMs: number, more: object = {}) => ({
  extends: true as const,
  ...('server' in more ? fromDist : fromSource),
  test: {
    name,
    include,
    testTimeout: soak ? 3_600_000 : timeoutMs,
    hookTimeout: soak ? 3_600_000 : 60_000,
    ...more,
  },
});

export default defineConfig({
  root: fileURLToPath(new URL('..', import.meta.url)),
  test: {
    pool: 'forks',
    // left to itself the runner keeps a core free
    maxWorkers: 2,
    sequence: { sequencer: BrowserFirst },
    projects: [
      project(
        'unit',
        [
          'libs/**/*.spec.ts',
          'apps/**/*.spec.ts',
          'test/{oracle,property,architecture}/**/*.spec.ts',
          'test/support/**/*.spec.ts',
        ],
        20_000,
        { exclude: withDatabases, ...shared },
      ),
      project('store', withDatabases, 30_000, { globalSetup: startPostgres, ...shared }),
      project('whole', ['test/{api,golden,faults,browser}/**/*.spec.ts'], 120_000, {
        ...compiled,
        exclude: alone,
        ...shared,
      }),
      project('alone', alone, 120_000, {
        ...compiled,
        maxWorkers: 1,
        sequence: { groupOrder: 1 },
      }),
    ],
  },
});
