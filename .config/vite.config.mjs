// Builds the planner's page into dist/apps/web: one document at /, everything else under /page/.

import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defaultClientConditions, defineConfig } from 'vite';
import { pageFonts } from './page-fonts.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));

export default defineConfig({
  root: `${root}apps/web`,
  publicDir: false,
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
  },
});
