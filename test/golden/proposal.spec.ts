// A change detector for the paper as a whole: parts, order, bytes, fonts, tags.
import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Outcome } from '#libs/engine/index.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import { pngFile } from '../support/made-picture.js';
import { MADE_BANK, MADE_PLAIN_BANK, madeFrame, madeOutcome } from '../support/outcome.js';
import { readPdf, squeezed, textOf, wordsOf } from '../support/pdf-text.js';

const SECTIONS = [
  'Prepared, checked, approved',
  'Findings',
  'Basis of design',
  'Assumptions',
  'Data quality',
  'Method and working',
  'Stages, protection, discharge',
  'Load before and after',
  'Network and duties',
  'Sensitivity',
  'Money',
  'Limits of validity',
  'Hand check',
  'Site actions',
  'Cautions',
  'Controller settings',
  'For the network operator',
  'Maintenance',
  'Schedule of materials',
  'Revision history',
  'Verification',
];

const NUMBERS = SECTIONS.map((_, at) => at + 1);

const SMALL = { days: 40 };
let judged: Outcome;
let bytes: Uint8Array;
let pages: string[];

beforeAll(async () => {
  judged = madeOutcome({ bank: MADE_BANK }, SMALL);
  bytes = await renderProposal(judged, madeFrame({ preparedBy: 'R. Aldane' }));
  pages = textOf(bytes).split('\f').slice(0, -1);
});

describe('the parts of a proposal', () => {
  it('stand in their order, each under its own number', () => {
    const headings = readPdf(bytes, 'pdfinfo', ['-struct-text'])
      .split('\n')
      .flatMap((line, at, lines) => (/^\s+H2/.test(line) ? [squeezed(lines[at + 1]!)] : []));
    expect(headings).toHaveLength(SECTIONS.length);
    for (const [at, number] of NUMBERS.entries()) expect(headings[at]).toContain(`"${number}`);
    const whole = squeezed(pages.join(''));
    let from = 0;
    for (const [at, name] of SECTIONS.entries()) {
      const found = whole.indexOf(squeezed(`${NUMBERS[at]}${name}`), from);
      expect({ name, found: found > 0 }).toEqual({ name, found: true });
      from = found;
    }
  });

  it('carry number, revision, state, page, hash, engine, window and zone on every page', () => {
    pages.forEach((page, at) => {
      const text = squeezed(page);
      for (const part of [
        'Proposal 2026-014, revision 0, draft, not reviewed',
        `page ${at + 1} of ${pages.length}`,
        'content 7f3a 91c2 e05d 44b8, engine 0.1.0',
        'record 1 Jan 2025 00:00 to 10 Feb 2025 00:00, Europe/Dublin',
      ]) {
        expect(text).toContain(squeezed(part));
      }
    });
  });

  it('say what is proposed, how many rows were judged, and what it does not cover, first', () => {
    const first = squeezed(pages[0]!);
    expect(first).toContain(
      squeezed('Judged: the site’s own bank, eight stages, 261 kvar at 400 V, with 7 % reactors.'),
    );
    // Five rows a group: two voltages, the current, both forms of inrush; two of the network. Reactors have no limit.
    expect(first).toContain(squeezed('12 rows judged'));
    expect(first).toContain(squeezed('2 not judged'));
    expect(first).toContain(squeezed('Does not cover:'));
    expect(first).toContain(squeezed('not permission to energise'));
    expect(first).toContain(squeezed('R. Aldane'));
  });

  it('print both ratings of a stage with their voltages', () => {
    expect(squeezed(pages.join(''))).toContain(squeezed('50 kvar at 480 V, 37.3 kvar at 400 V'));
  });

  it('keep hazard words in the cautions', () => {
    const whole = pages.join(' ');
    const begin = whole.lastIndexOf('Cautions');
    const end = whole.indexOf('Controller settings', begin);
    expect(whole.slice(0, begin) + whole.slice(end)).not.toMatch(/\b(danger|warning|caution)/i);
    expect(whole.slice(begin, end)).toMatch(/danger/i);
  });

  it('print every caution, always', () => {
    const whole = squeezed(pages.join(''));
    expect(judged.result.cautions.length).toBeGreaterThanOrEqual(12);
    for (const { text } of judged.result.cautions) expect(whole).toContain(squeezed(text));
  });

  it('lay a limit that is exceeded across the decision', async () => {
    const over = madeOutcome({ bank: MADE_PLAIN_BANK }, SMALL);
    expect(over.result.verdict).toBe('avoid');
    const text = squeezed(textOf(await renderProposal(over, madeFrame())));
    expect(text).toContain(squeezed('Over a limit: not to be built as it stands'));
    expect(squeezed(pages.join(''))).not.toContain(squeezed('not to be built as it stands'));
  });

  it('need no bank to be printed', async () => {
    const none = madeOutcome({}, { days: 20, powerFactor: 0.985 });
    expect(none.bank.groups).toEqual([]);
    const text = squeezed(textOf(await renderProposal(none, madeFrame())));
    expect(text).toContain(squeezed('Proposed: no bank. The site holds 0.95 already.'));
  });
});

describe('the file', () => {
  it('is the same to the byte for equal content, and another for another', async () => {
    const again = await renderProposal(madeOutcome({ bank: MADE_BANK }, SMALL), madeFrame({ preparedBy: 'R. Aldane' }));
    const other = await renderProposal(judged, madeFrame({ preparedBy: 'R. Aldane', revision: 1 }));
    const hash = (data: Uint8Array) => createHash('sha256').update(data).digest('hex');
    expect(hash(again)).toBe(hash(bytes));
    expect(hash(other)).not.toBe(hash(bytes));
  });

  it('embeds every font it names, with a way back to the letters', () => {
    const rows = readPdf(bytes, 'pdffonts', []).trim().split('\n').slice(2);
    expect(rows.length).toBeGreaterThanOrEqual(2);
    for (const row of rows) expect(row).toMatch(/Sofia|DejaVu/);
    for (const row of rows) expect(row).toMatch(/yes yes yes/);
  });

  it('tells a reading program its language, title and parts', () => {
    const info = readPdf(bytes, 'pdfinfo', []);
    expect(info).toMatch(/Title:\s+Power-factor correction for Merrowick Extrusion, hall 2/);
    expect(info).toMatch(/Tagged:\s+yes/);
    // the record's end, so that no clock gets in
    expect(readPdf(bytes, 'pdfinfo', ['-isodates'])).toMatch(/CreationDate:\s+2025-02-10T/);
    const tree = readPdf(bytes, 'pdfinfo', ['-struct']);
    for (const tag of ['Document', 'H1', 'H2', 'H3', 'P', 'Table', 'TR', 'TH', 'TD', 'Figure', 'Caption']) {
      expect(tree).toMatch(new RegExp(`^\\s*${tag}\\b`, 'm'));
    }
    expect(Buffer.from(bytes).toString('latin1')).toContain('/Lang (en)');
  });

  it('carries the site’s logo as a picture of the same bytes every time', async () => {
    const logo = pngFile({
      width: 4,
      height: 2,
      bits: 8,
      colour: 2,
      samples: Array.from({ length: 24 }, (_, n) => n * 9),
    });
    const [once, again] = [
      await renderProposal(judged, madeFrame({ logo })),
      await renderProposal(judged, madeFrame({ logo })),
    ];
    expect(Buffer.from(once).equals(Buffer.from(again))).toBe(true);
    const pictures = (data: Uint8Array) =>
      Buffer.from(data)
        .toString('latin1')
        .match(/\/Subtype \/Image\n/g)?.length ?? 0;
    expect(pictures(once)).toBe(1);
    expect(pictures(bytes)).toBe(0);
    expect(Buffer.from(once).toString('latin1')).toContain('/Alt (Logo of Merrowick Extrusion, hall 2)');
  });

  it.each(['A4', 'Letter'] as const)('keeps every word inside the margins of %s', async (paper) => {
    const logo = pngFile({ width: 30, height: 10, bits: 8, colour: 0, samples: Array.from({ length: 300 }, () => 90) });
    const sheet = await renderProposal(judged, madeFrame({ paper, logo }));
    const size = { A4: [595.28, 841.89], Letter: [612, 792] }[paper];
    for (const { width, height, words } of wordsOf(sheet)) {
      expect([width, height]).toEqual(size);
      expect(words.filter(({ xMin, xMax }) => xMin < 44 || xMax > width - 44)).toEqual([]);
      expect(words.filter(({ yMin, yMax }) => yMin < 20 || yMax > height - 18)).toEqual([]);
    }
  });
});
