import PDFDocument from 'pdfkit';
import { describe, expect, it } from 'vitest';
import { Paper } from './paper.js';
import { drawTable } from './table.js';

const COLUMNS = [{ head: 'device', share: 1 }];
/** What a heading claims below itself where nothing more is asked for [pt]. */
const CLAIMED = 54;

/** Pages on which a heading and the first row of the table below it come to stand, for a cursor somewhere on a page. */
function pagesOf(start: number, headings: number): { heading: number[]; row: number; rest: number } {
  const doc = new PDFDocument({ font: null as unknown as string, bufferPages: true });
  const page = () => doc.bufferedPageRange().count;
  const heading: number[] = [];
  doc.outline.addItem = (() => heading.push(page())) as never;
  const paper = new Paper(doc);
  paper.begin(60);
  paper.y = start;
  const rest = paper.rest;
  for (let n = 1; n <= headings; n++) paper.heading(`${n}`, 'Devices');
  let row = 0;
  const draw = () => {
    row ||= page();
  };
  const tall = [{ pieces: ['one, two, three\nfour\nfive\nsix'.repeat(12)], inset: 8, draw }];
  drawTable(paper, COLUMNS, [tall, tall], {});
  return { heading, row, rest };
}

describe('a heading', () => {
  it.each([1, 2])('stands on the page of what follows it, wherever the page has come to (%i of them)', (headings) => {
    let turned = 0;
    for (let start = 60; start < 740; start += 17) {
      const { heading, row, rest } = pagesOf(start, headings);
      expect(heading).toEqual(Array.from({ length: headings }, () => row));
      // the control: what it claims by itself would have fitted, and the table below it would not
      if (row === 2 && rest > CLAIMED + 45 * headings) turned++;
    }
    expect(turned).toBeGreaterThan(0);
  });

  it('that nothing follows is drawn all the same', () => {
    const doc = new PDFDocument({ font: null as unknown as string, bufferPages: true });
    const paper = new Paper(doc);
    paper.begin(60);
    paper.heading('1', 'Devices');
    paper.end();
    expect(paper.y).toBeGreaterThan(60);
  });
});
