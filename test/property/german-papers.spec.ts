// German papers, read as a reader gets them: with poppler's tools. What stands on a page is held against the catalogue, and
// the printed arithmetic is worked again by mathjs, a general-purpose reader of formulas.
import { beforeAll, describe, expect, it } from 'vitest';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import { zoneTable } from '#libs/contract/time-zone.js';
import {
  type EstimateOutcome,
  type Outcome,
  planEstimate,
  reevaluateBank,
  type Site,
  type SiteThen,
  withRobustness,
} from '#libs/engine/index.js';
import { GERMAN } from '#libs/present/german/german.js';
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import { generatedCase } from '../support/generated-site.js';
import { MADE_BANK, madeFrame, madeOutcome, madeRecord, madeSite } from '../support/outcome.js';
import { type PlacedWord, readPdf, textOf, wordsOf } from '../support/pdf-text.js';
import { printedWorkings, wrongWorkings } from '../support/printed-workings.js';
import { runs } from '../support/soak.js';

/** Words of English that no German sentence, standard or unit has. */
const ENGLISH =
  /^(the|and|of|with|is|not|are|to|by|from|without|which|each|given|level|stage|bank|record|month|years)$/i;

const TARIFF: Site['tariff'] = {
  name: 'Lieferung, erfunden',
  clauses: [
    { name: 'Grundpreis', kind: 'fixed', amountPerMonth: 140 },
    { name: 'Arbeit', kind: 'energy', pricePerUnit: 0.13 },
    { name: 'Blindarbeit', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.006 },
  ],
};
const PRICES: Site['prices'] = {
  ...{ name: 'Preise, erfunden', invented: true, currency: 'EUR', perKvar: 9, perStage: 55, fixed: 850 },
  reactors: [{ reactorPct: 7, perKvar: 11.5 }],
  switches: [{ kind: 'contactor', perStage: 38, lifeSwitchings: 60_000 }],
};

/** Words by their letters alone, those of a text that a line parted by a hyphen put together again. */
function wordsIn(text: string): string[] {
  const whole = text.normalize('NFC').replace(/(?<=\p{Ll})-\n(?=\p{Ll})/gu, '');
  return whole.split(/[^\p{L}]+/u).filter((word) => word.length > 2);
}

/** What somebody entered, and the names of the fields it was entered in. */
function enteredIn({ site, result }: Outcome | EstimateOutcome): string {
  return JSON.stringify([site, result.assumptions.map(({ path }) => path)]);
}

/** What may stand on a German paper: the catalogue's words, and those of what was entered. */
function vocabulary(outcome: Outcome | EstimateOutcome): Set<string> {
  const { texts, fields, messages } = GERMAN;
  const said = Object.values(messages).flatMap(({ text, consequence, subject = '' }) => [text, consequence, subject]);
  const own = [
    'main cos Varwright kvar kvarh kWh kVA MVA min max THD TDD IEC IEEE NEC EUR SHA csv SVG JSON UTC Aldane',
  ];
  const standards = outcome.result.duties.map(({ source }) => source);
  return new Set(
    wordsIn(
      [...Object.values(texts), ...Object.values(fields), ...said, enteredIn(outcome), ...own, ...standards].join('\n'),
    ),
  );
}

/** Words of a page of which one stands on the other. */
function overlaps(words: readonly PlacedWord[]): string[] {
  const lines = [...words].sort((a, b) => a.yMin - b.yMin || a.xMin - b.xMin);
  return lines.flatMap((word, at) => {
    const over = lines
      .slice(at + 1, at + 60)
      .filter(({ yMin }) => Math.abs(yMin - word.yMin) < 1)
      .filter(({ xMin, xMax }) => Math.min(xMax, word.xMax) - Math.max(xMin, word.xMin) > 1.5);
    return over.map(({ text }) => `${word.text} / ${text}`);
  });
}

/** Words behind the edges of a page. */
function outside({ width, height, words }: ReturnType<typeof wordsOf>[number]): string[] {
  return words
    .filter(({ xMin, xMax, yMin, yMax }) => xMin < 40 || xMax > width - 40 || yMin < 20 || yMax > height - 12)
    .map(({ text }) => text);
}

const NO_FAULTS = { strange: [], english: [], overlapping: [], outside: [] };

/** What is wrong with the words of a German paper and with their places. */
function faultsOf(bytes: Uint8Array, outcome: Outcome | EstimateOutcome): Record<keyof typeof NO_FAULTS, string[]> {
  const known = vocabulary(outcome);
  const found = wordsIn(textOf(bytes));
  expect(found.length).toBeGreaterThan(1500);
  const pages = wordsOf(bytes);
  // a name that somebody entered may be longer than any line
  const entered = enteredIn(outcome);
  return {
    strange: [...new Set(found.filter((word) => !known.has(word) && !entered.includes(word)))],
    english: found.filter((word) => ENGLISH.test(word) && !entered.includes(word)),
    overlapping: pages.flatMap(({ words }) => overlaps(words)),
    outside: pages.flatMap(outside),
  };
}

async function paperOf(outcome: Outcome | EstimateOutcome, parts = {}): Promise<Uint8Array> {
  return renderProposal(outcome, madeFrame({ language: 'de', preparedBy: 'R. Aldane', ...parts }));
}

function firmOutcome(): Outcome {
  const firm = withRobustness(madeOutcome({ bank: MADE_BANK }, { days: 40 }));
  return { ...firm, result: putInWords(firm.result) };
}

describe('a German paper', () => {
  const outcome = firmOutcome();
  let bytes: Uint8Array;
  beforeAll(async () => {
    bytes = await paperOf(outcome);
  });

  it('says that it is German, to the reader and to a reading program', () => {
    const text = textOf(bytes);
    expect(text).toContain('Blindleistungskompensation für Merrowick Extrusion, hall 2');
    expect(text).toContain('Vorschlag 2026-014, Revision 0, Entwurf, nicht geprüft');
    expect(text).toMatch(/Lastgang 1\.\s+Jan\s+2025\s+00:00 bis 10\.\s+Feb\s+2025/);
    expect(Buffer.from(bytes).toString('latin1')).toContain('/Lang (de)');
    expect(readPdf(bytes, 'pdfinfo', [])).toMatch(/Title:\s+Blindleistungskompensation für/);
  });

  it('leaves the words of the outcome, and of every other paper, in English', async () => {
    expect(outcome.result.assumptions[0]!.text).toMatch(/^(The|Resistances|A|No|R\/X)/);
    const english = await renderProposal(outcome, madeFrame());
    expect(english).toEqual(await renderProposal(outcome, madeFrame({ language: 'en' })));
    expect(textOf(english)).toContain('Power-factor correction for');
  });

  it('has equal bytes twice', async () => {
    expect(Buffer.from(await paperOf(outcome)).equals(bytes)).toBe(true);
  });

  it('embeds every font and shows no letter by its code', () => {
    const fonts = readPdf(bytes, 'pdffonts', []).split('\n').slice(2).filter(Boolean);
    expect(fonts.length).toBeGreaterThan(0);
    for (const font of fonts) expect(font).toMatch(/\byes\s+yes\s+yes\b/);
    expect(textOf(bytes)).not.toMatch(/U\+[0-9A-F]{4}|\ufffd/);
  });

  it('has the decimal comma throughout: numbers with a point are names of editions alone', () => {
    const points = textOf(bytes).match(/(?<![\p{L}\d.:,])\d+\.\d+(?![\d.])/gu) ?? [];
    const sections = new Set(points.filter((text) => !/^\d{1,2}\.\d$/.test(text)));
    expect([...sections]).toEqual([]);
  });

  it('prints all cautions in German, danger by that name', () => {
    const text = textOf(bytes).replace(/\s+/g, ' ');
    expect(text).toContain('Gefahr: Ein Kondensator behält seine Ladung, nachdem er abgeschaltet ist.');
    expect(text).toContain('ist keine Erlaubnis zum Einschalten');
    const cautions = outcome.result.cautions.map(({ code }) => GERMAN.messages[code]!.text.split(/[.:]/)[0]!);
    for (const begin of cautions) expect(text).toContain(begin.replace(/\{.*/, '').trim());
  });
});

describe('German papers of generated sites', () => {
  it.each(Array.from({ length: runs(4, 40) }, (_, at) => at))(
    'hold no word of another language and none that is cut, and their arithmetic holds: %i',
    async (number) => {
      const { parts, load } = generatedCase(number);
      const outcome = madeOutcome(parts, load);
      const bytes = await paperOf(outcome, number % 2 === 1 ? { paper: 'Letter' } : {});
      expect(faultsOf(bytes, outcome)).toEqual(NO_FAULTS);
      const printed = printedWorkings(bytes, 'de');
      expect(printed.length).toBeGreaterThan(10);
      expect(wrongWorkings(printed)).toEqual([]);
    },
  );

  it('hold none where the plan is an estimate', async () => {
    const bills = ['01', '02', '03'].map((month) => ({
      ...{ month: `2025-${month}`, activeKwh: 100_000, laggingKvarh: 82_000, maxKw: 320 },
    }));
    const equipment = [{ name: 'Motoren', count: 6, ratedKw: 37, efficiencyPct: 92, powerFactor: 0.78 }];
    const site = madeSite({ estimate: { bills, equipment } });
    const planned = planEstimate(site, estimateZone(site));
    const outcome = { ...planned, result: putEstimateInWords(planned.result) };
    expect(faultsOf(await paperOf(outcome), outcome)).toEqual(NO_FAULTS);
  });

  it('hold none where a bank over a limit is judged again, with money', async () => {
    const then = (stages: number, parts: Partial<Site>): SiteThen => {
      const bank = { stages: [{ count: stages, ratedKvar: 40, ratedV: 440 }], installed: true };
      const site = madeSite({ bank, tariff: TARIFF, prices: PRICES, ...parts });
      const record = madeRecord({ days: 40 });
      return { site, record, zone: zoneTable(site.timeZone, record.firstS, record.endS) };
    };
    const { reevaluation, after } = reevaluateBank(then(6, {}), then(4, { asOf: '2026-03-01' }));
    expect(reevaluation.tonight).not.toBeNull();
    const outcome = { ...after, result: putInWords(after.result) };
    const bytes = await paperOf(outcome, { reevaluation, paper: 'Letter' });
    expect(textOf(bytes)).toContain('Eine Elektrofachkraft schaltet sie ab');
    expect(faultsOf(bytes, outcome)).toEqual(NO_FAULTS);
  });

  it('are told from English ones by their words (control)', async () => {
    const { parts, load } = generatedCase(0);
    const outcome = madeOutcome(parts, load);
    const english = wordsIn(textOf(await renderProposal(outcome, madeFrame())));
    expect(english.filter((word) => ENGLISH.test(word)).length).toBeGreaterThan(300);
    const known = vocabulary(outcome);
    expect(new Set(english.filter((word) => !known.has(word))).size).toBeGreaterThan(200);
  });

  it('are found wanting where labels are too long for their place (control)', () => {
    const word = { text: 'Monatsminimum', xMin: 100, xMax: 180, yMin: 50, yMax: 60 };
    expect(overlaps([word, { ...word, text: '0,959', xMin: 170, xMax: 200 }])).toHaveLength(1);
    expect(overlaps([word, { ...word, text: '0,959', xMin: 181, xMax: 200 }])).toEqual([]);
  });
});
