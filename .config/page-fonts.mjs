// The page's two weights as WOFF2, compressed from the same whole TTF files the paper is set in.
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';

const require = createRequire(import.meta.url);
const FAMILY = '@expo-google-fonts/sofia-sans-semi-condensed';
const WEIGHTS = { 400: '400Regular', 600: '600SemiBold' };

/**
 * @param {string} root
 * @returns {import('vite').Plugin}
 */
export function pageFonts(root) {
  return {
    name: 'page-fonts',
    apply: 'build',
    async generateBundle() {
      for (const [weight, name] of Object.entries(WEIGHTS)) {
        const ttf = readFileSync(require.resolve(`${FAMILY}/${name}/SofiaSansSemiCondensed_${name}.ttf`));
        this.emitFile({ type: 'asset', fileName: `page/sofia-${weight}.woff2`, source: await compressed(root, ttf) });
      }
    },
  };
}

/**
 * Compressing takes a second a weight, so what it gave is kept by the file's hash.
 * @param {string} root
 * @param {Buffer} ttf
 */
async function compressed(root, ttf) {
  const folder = join(root, '.cache', 'fonts');
  const kept = join(folder, `${createHash('sha256').update(ttf).digest('hex').slice(0, 24)}.woff2`);
  if (existsSync(kept)) return readFileSync(kept);
  const { default: wawoff2 } = await import('wawoff2');
  const woff2 = await wawoff2.compress(ttf);
  mkdirSync(folder, { recursive: true });
  writeFileSync(kept, woff2);
  return woff2;
}
