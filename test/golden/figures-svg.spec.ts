// The same drawing twice: what stands on paper is what stands in the file. Read back by an XML parser (sax).
import sax from 'sax';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Outcome } from '#libs/engine/index.js';
import { type FigureFile, renderFigures } from '#libs/proposal/render-figures.js';
import { MADE_BANK, madeOutcome } from '../support/outcome.js';
import { squeezed } from '../support/pdf-text.js';

/** Elements and texts of a well-formed file. */
function readSvg(svg: string): { names: string[]; texts: string[] } {
  const parser = sax.parser(true);
  const [names, texts]: [string[], string[]] = [[], []];
  let inText = false;
  parser.onerror = (error) => {
    throw error;
  };
  parser.onopentag = ({ name }) => {
    names.push(name);
    inText = name === 'text';
  };
  parser.ontext = (text) => {
    if (inText) texts.push(text);
  };
  parser.onclosetag = () => {
    inText = false;
  };
  parser.write(svg).close();
  return { names, texts };
}

const NAME = 'Works <one> & "two"';
let outcome: Outcome;
let files: FigureFile[];

beforeAll(async () => {
  outcome = madeOutcome({ bank: MADE_BANK, name: NAME }, { days: 30 });
  files = await renderFigures(outcome);
});

describe('figures as SVG', () => {
  it('are the diagram and every chart, well-formed, each with its words', () => {
    expect(files.map(({ name }) => name)).toEqual([
      'single-line',
      'duration-curve',
      'power-factor-by-month',
      'worst-day',
      'phasors',
      'impedance',
      'margins',
    ]);
    for (const { svg } of files) {
      const { names, texts } = readSvg(svg);
      expect(names.slice(0, 3)).toEqual(['svg', 'title', 'desc']);
      expect(names.filter((name) => name === 'path').length).toBeGreaterThan(5);
      expect(texts.length).toBeGreaterThan(3);
      expect(svg).not.toMatch(/NaN|undefined|Infinity/);
      expect(svg).not.toContain(NAME);
    }
  });

  it('say what the diagram says: both ratings, fault levels and the board’s voltage', () => {
    const text = squeezed(readSvg(files[0]!.svg).texts.join(''));
    for (const part of ['180–250 MVA', '1 000 kVA', '400 V, at most 420 V', '50 kvar at 480 V, 37.3 kvar at 400 V']) {
      expect(text).toContain(squeezed(part));
    }
    // the control: a number that is not on the diagram
    expect(text).not.toContain('38.3kvar');
  });

  it('are the same twice', async () => {
    expect(await renderFigures(outcome)).toEqual(files);
  });
});
