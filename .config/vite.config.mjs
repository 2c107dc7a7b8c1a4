// Builds the planner's page into dist/apps/web: one document at /, everything else under /page/.

import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { createLogger, defaultClientConditions, defineConfig } from 'vite';
import { pageFonts } from './page-fonts.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));

// The fonts are made by a plugin under the names the style sheet asks for, which is no news to whoever builds.
const logger = createLogger('warn');
const { warnOnce } = logger;
/** @type {typeof warnOnce} */
logger.warnOnce = (message, options) => {
  if (!/\/page\/sofia-\d+\.woff2 referenced in/.test(message)) warnOnce(message, options);
};

export default defineConfig({
  root: `${root}apps/web`,
  publicDir: false,
  customLogger: logger,
  cacheDir: `${root}.cache/vite`,
  resolve: { conditions: ['source', ...defaultClientConditions] },
  plugins: [react(), pageFonts(root)],
  worker: { format: 'es' },
  build: {
    outDir: `${root}dist/apps/web`,
    emptyOutDir: true,
    assetsDir: 'page',
    target: 'es2022',
    // The policy of the page allows scripts and fonts of this server only, so nothing is put inline.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    manifest: 'page/manifest.json',
    reportCompressedSize: false,
    // how long a part of the build took is no warning either
    rolldownOptions: { checks: { pluginTimings: false } },
  },
});
