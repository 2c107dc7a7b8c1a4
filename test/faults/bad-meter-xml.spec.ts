// Feeds and messages in XML that are damaged or made to harm: each is refused within a second with row and reason, and a
// sound one beside them is read. What the walk through XML refuses by itself is tested beside it, in libs/meter-files/xml.
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readMeterText, refusalOf } from '../support/meter-text.js';

const sample = (name: string) => readFileSync(new URL(`../golden/meter-files/${name}.xml`, import.meta.url), 'utf8');
const SOUND = { espi: sample('espi-plain'), cim: sample('cim-plain') };

/** A sound file with a value of its own, or with something before its root. */
function changed(text: string, from: string | RegExp, to: string): string {
  const other = text.replace(from, to);
  if (other === text) throw new Error(`the file has no ${from}`);
  return other;
}

const entities = Array.from({ length: 40 }, (_, i) => `<!ENTITY e${i + 1} "&e${i};&e${i};">`).join('');
const ROOT = /<(?=feed|ResponseMessage)/;
const VALUE = /<((?:m:)?value)>[^<]*</;
const value = (text: string) => (file: string) => changed(file, VALUE, `<$1>${text}<`);
const before = (text: string) => (file: string) => changed(file, ROOT, `${text}<`);

const BAD: [name: string, damage: (file: string) => string, problem: object][] = [
  ['an entity bomb', before(`<!DOCTYPE x [<!ENTITY e0 "ha">${entities}]>`), { code: 'unreadable', row: 2, column: 1 }],
  ['an entity that names a file', before('<!DOCTYPE x [<!ENTITY e SYSTEM "file:///etc/hostname">]>'), { row: 2 }],
  ['an entity in a value', value('&e40;'), { code: 'unreadable', column: expect.any(Number) }],
  ['an archive in a value', value('PK\u0003\u0004'), { code: 'unreadable', column: expect.any(Number) }],
  ['a date in a value', value('2024-05-06'), { code: 'bad-number', found: '"2024-05-06"' }],
  ['a time in a value', value('00:15'), { code: 'bad-number', found: '"00:15"' }],
  ['a decimal comma', value('1,5'), { code: 'bad-number', found: '"1,5"' }],
  ['NaN', value('NaN'), { code: 'bad-number', found: '"NaN"' }],
  ['infinity', value('INF'), { code: 'bad-number', found: '"INF"' }],
  ['a number beyond every double', value('1e400'), { code: 'bad-number' }],
  ['NUL in a value', value('1\0'), { code: 'unreadable', found: '"\\u0000"' }],
  ['a value of 10 MB', value('9'.repeat(10_000_000)), { code: 'too-large' }],
  ['elements nested without end', value('<a>'.repeat(100_000)), { code: 'too-large' }],
  ['an end that is missing', (file) => file.slice(0, -20), { code: 'unreadable' }],
];

const CASES = BAD.flatMap(([name, damage, problem]) =>
  (['espi', 'cim'] as const).map((format) => ({ name, format, damage, problem })),
);

describe('a file with', () => {
  it.each(CASES)('$name in $format is refused within a second, and the next one is read', async (bad) => {
    const content = new TextEncoder().encode(bad.damage(SOUND[bad.format]));
    const startMs = performance.now();
    const { problems } = await refusalOf(content);
    expect(performance.now() - startMs).toBeLessThan(1000);
    expect(problems).toMatchObject([{ row: expect.any(Number), ...bad.problem }]);
    expect((await readMeterText(SOUND[bad.format])).record.beginS).toHaveLength(3);
  });

  it.each(['espi', 'cim'] as const)(
    'another sound value in %s is read, so that it is the change that is refused',
    async (format) => {
      const read = async (file: string) => (await readMeterText(file)).record.activeKw.length;
      expect([await read(SOUND[format]), await read(value('7')(SOUND[format]))]).toEqual([3, 3]);
    },
  );
});
