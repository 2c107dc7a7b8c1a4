import { createHash } from 'node:crypto';
import PDFDocument from 'pdfkit';
import { beforeAll, describe, expect, it } from 'vitest';
import { objectText, savedAfterwards } from '../../test/support/sign-afterwards.js';
import type { Sha256 } from './audit-chain.js';
import { contentNumber, type KnownPaper, paperStanding, tracesOf } from './paper-standing.js';

const sha256: Sha256 = (content) => createHash('sha256').update(content).digest('hex');
const CONTENT = 'a1b2'.repeat(16);

async function madePaper(info: Record<string, string>): Promise<Buffer> {
  const doc = new PDFDocument({
    pdfVersion: '1.7',
    info: { ...info, CreationDate: new Date(0), ModDate: new Date(0) },
  });
  const chunks: Buffer[] = [];
  doc.on('data', (chunk: Buffer) => chunks.push(chunk));
  const ended = new Promise((resolve) => doc.on('end', resolve));
  doc.text('300 kvar, within limits').addPage().text('page 2');
  doc.end();
  await ended;
  return Buffer.concat(chunks);
}

describe('a paper somebody holds', () => {
  let paper: Buffer;
  let catalog: number;
  let page: number;
  const known = (changes: Partial<KnownPaper> = {}): KnownPaper => ({
    ...{ siteId: 's', revisionId: 'r', number: 'P-0001', revision: 3, state: 'approved', supersededBy: null },
    ...{ contentHash: CONTENT, matched: 'issued', sha256: sha256(paper), ...changes },
  });
  const judged = (bytes: Uint8Array, papers: KnownPaper[] = [known()]) => {
    const { standing, signedAfterwards } = paperStanding(bytes, tracesOf(bytes, sha256), papers);
    return signedAfterwards ? `${standing}, signed` : standing;
  };

  beforeAll(async () => {
    paper = await madePaper({ Subject: 'Proposal P-0001, revision 3, approved', Keywords: CONTENT });
    const text = paper.toString('latin1');
    catalog = Number(/(\d+) 0 obj\s<<\s\/Type \/Catalog/.exec(text)![1]);
    page = Number(/(\d+) 0 obj\s<<\s\/Type \/Page\s/.exec(text)![1]);
  });

  it.each([
    ['approved', 'issued', 'approved'],
    ['superseded', 'issued', 'superseded'],
    ['withdrawn', 'issued', 'withdrawn'],
    ['draft', 'draft', 'draft'],
    ['forReview', 'draft', 'draft'],
    ['approved', 'draft', 'draft'],
    ['withdrawn', 'draft', 'withdrawn'],
  ] as const)('of a revision that is %s, being its %s paper, is %s', (state, matched, standing) => {
    expect(judged(paper, [known({ state, matched })])).toBe(standing);
  });

  it('tells what it is looked up by', () => {
    const { whole, earlier, contentHashes, names } = tracesOf(savedAfterwards(paper), sha256);
    expect(contentHashes).toEqual([CONTENT]);
    expect(names).toEqual(['P-0001, revision 3']);
    expect(earlier).toEqual([{ sha256: sha256(paper), bytes: paper.length }]);
    expect(whole.bytes).toBeGreaterThan(paper.length);
  });

  it('that was signed afterwards, once or twice, seen or unseen, is approved content, signed afterwards', () => {
    expect(judged(savedAfterwards(paper))).toBe('approved, signed');
    expect(judged(savedAfterwards(paper, { page }))).toBe('approved, signed');
    expect(judged(savedAfterwards(savedAfterwards(paper)))).toBe('approved, signed');
    expect(judged(savedAfterwards(paper), [known({ state: 'superseded' })])).toBe('superseded, signed');
  });

  it('with a byte changed anywhere is altered, in what it says of itself too', () => {
    const step = Math.floor(paper.length / 400);
    for (let at = 0; at < paper.length; at += step) {
      const bytes = Buffer.from(paper);
      bytes[at] = bytes[at]! ^ 1;
      expect(judged(bytes, [known({ matched: 'named', sha256: null })])).toBe('altered');
    }
  });

  it('is altered by a saving that is no signature or changes what is seen', () => {
    const onPage = (change: (text: string) => string) => ({ objects: { [page]: change(objectText(paper, page)) } });
    const contents = Number(/\/Contents (\d+) 0 R/.exec(objectText(paper, page))![1]);
    const stream = '<< /Length 3 >>\nstream\nq Q\nendstream';
    expect(judged(savedAfterwards(paper, { unsigned: true }))).toBe('altered');
    expect(judged(savedAfterwards(paper, { objects: { [contents]: stream } }))).toBe('altered');
    expect(
      judged(
        savedAfterwards(
          paper,
          onPage((text) => text.replace(/Contents \d+/, 'Contents 99')),
        ),
      ),
    ).toBe('altered');
    expect(
      judged(
        savedAfterwards(
          paper,
          onPage((text) => text.replace('/Contents', '/Rotate 180 /Contents')),
        ),
      ),
    ).toBe('altered');
    const note = { 98: '<< /Type /Annot /Subtype /FreeText /Rect [0 0 600 800] >>' };
    const covered = onPage((text) => text.replace(/>>$/, '/Annots [98 0 R] >>')).objects;
    expect(judged(savedAfterwards(paper, { objects: { ...note, ...covered } }))).toBe('altered');
    const script = objectText(paper, catalog).replace(/>>$/, '/OpenAction 97 0 R >>');
    expect(judged(savedAfterwards(paper, { objects: { [catalog]: script } }))).toBe('altered');
    expect(judged(savedAfterwards(paper, { previous: 12 }))).toBe('altered');
    expect(judged(Buffer.concat([paper, Buffer.from('more')]))).toBe('altered');
    expect(judged(Buffer.concat([savedAfterwards(paper), Buffer.from('more')]))).toBe('altered');
  });

  it('is altered where the signature does not cover it, or what follows was cut off', () => {
    const signed = savedAfterwards(paper);
    const text = signed.toString('latin1');
    const uncovered = Buffer.from(
      text.replace(/ByteRange \[0 \d+/, (range) => range.replace(/\d+$/, '12')),
      'latin1',
    );
    expect(judged(uncovered)).toBe('altered');
    expect(judged(signed.subarray(0, signed.length - 30))).toBe('altered');
  });

  it('of nobody here is unknown', () => {
    expect(judged(paper, [])).toBe('unknown');
    expect(judged(Buffer.from('%PDF-1.7\n%%EOF'), [])).toBe('unknown');
    expect(judged(Buffer.alloc(0), [])).toBe('unknown');
  });

  it('is reached by the number typed from a scan, blanks and hyphens or not', () => {
    expect(contentNumber('A1B2 a1b2-A1B2 a1b2')).toBe('a1b2'.repeat(4));
    expect(contentNumber(CONTENT)).toBe(CONTENT);
    for (const typed of ['', 'a1b2', 'g1b2'.repeat(4), `${CONTENT}0`, 'P-0001'])
      expect(contentNumber(typed)).toBeNull();
  });
});
