import PDFDocument from 'pdfkit';
import { describe, expect, it } from 'vitest';
import { shippedFonts } from './fonts.js';
import { layOutQuickly, type OpenFont } from './quick-layout.js';

function openFont(data: Buffer): OpenFont {
  const doc = new PDFDocument({ font: null as unknown as string });
  doc.font(data as unknown as string);
  return (doc as unknown as { _font: { font: OpenFont } })._font.font;
}

const SAMPLES = [
  'Power-factor correction',
  'AVATAR To We Ty',
  'cos φ ≥ 0.95 · √3',
  'Łódź Ωμέγα Завод',
  '1\u00a0250\u00a0kvar',
  'IEC 61000-2-4:2002',
];

describe('laying out quickly', () => {
  it.each(Object.values(shippedFonts()).map(([family]) => family!))(
    'is as wide as general shaping to 2 %%, $name',
    ({ data }) => {
      const plain = openFont(data);
      const quick = openFont(data);
      layOutQuickly(quick);
      for (const text of SAMPLES) {
        const shaped = plain.layout(text).advanceWidth;
        expect(Math.abs(quick.layout(text).advanceWidth - shaped) / shaped).toBeLessThan(0.02);
      }
    },
  );

  it('is exactly as wide between letters, where space is taken away', () => {
    const { data } = shippedFonts().regular[0]!;
    const [plain, quick] = [openFont(data), openFont(data)];
    layOutQuickly(quick);
    for (const text of ['AV', 'To', 'We', 'Ty', 'LT']) {
      expect(quick.layout(text).advanceWidth).toBeCloseTo(plain.layout(text).advanceWidth, 9);
    }
  });

  it('forms no ligature, so that every letter can be read back', () => {
    const quick = openFont(shippedFonts().regular[0]!.data);
    layOutQuickly(quick);
    expect(quick.layout('fixfly').glyphs).toHaveLength(6);
  });

  it('gives digits of equal width where they are asked for', () => {
    const quick = openFont(shippedFonts().regular[0]!.data);
    layOutQuickly(quick);
    expect(quick.layout('11', ['tnum']).advanceWidth).toBe(quick.layout('88', ['tnum']).advanceWidth);
  });

  it('leaves other scripts to general shaping', () => {
    const fallback = shippedFonts().regular[1]!.data;
    const [plain, quick] = [openFont(fallback), openFont(fallback)];
    layOutQuickly(quick);
    expect(quick.layout('שלום').glyphs.length).toBe(plain.layout('שלום').glyphs.length);
  });
});
