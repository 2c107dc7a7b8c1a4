import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';

/** The two weights of the paper's one family. */
export type Weight = 'regular' | 'semibold';

/** One font file under the name pdfkit knows it by. */
export interface FontFile {
  name: string;
  data: Buffer;
}

/** Asks a font whether it draws a code point. */
export type Coverage = (name: string, codePoint: number) => boolean;

const find = createRequire(import.meta.url).resolve;
const FAMILY = '@expo-google-fonts/sofia-sans-semi-condensed';

/** The family first, then the fallback for other scripts, per weight. */
const FILES: Record<Weight, readonly [string, string]> = {
  regular: [
    `${FAMILY}/400Regular/SofiaSansSemiCondensed_400Regular.ttf`,
    'dejavu-fonts-ttf/ttf/DejaVuSansCondensed.ttf',
  ],
  semibold: [
    `${FAMILY}/600SemiBold/SofiaSansSemiCondensed_600SemiBold.ttf`,
    'dejavu-fonts-ttf/ttf/DejaVuSansCondensed-Bold.ttf',
  ],
};

let shipped: Record<Weight, FontFile[]> | undefined;

/**
 * The shipped fonts, read once a process; no font is ever taken from a user.
 * @returns for each weight the family and its fallback, in the order they are tried
 */
export function shippedFonts(): Record<Weight, FontFile[]> {
  shipped ??= {
    regular: FILES.regular.map((file, at) => ({ name: `regular-${at}`, data: readFileSync(find(file)) })),
    semibold: FILES.semibold.map((file, at) => ({ name: `semibold-${at}`, data: readFileSync(find(file)) })),
  };
  return shipped;
}

/** A stretch of text that one font draws. */
export interface Run {
  font: string;
  text: string;
}

/**
 * Splits a text into runs by the first font that draws each character, marks kept with the letter they stand on.
 * @param text plain text on one line
 * @param fonts fonts of the weight wanted, in the order they are tried
 * @param covers asks whether a font draws a code point
 * @returns runs in order; a character that no font draws is shown by its code, "U+65E5", never left blank
 */
export function splitRuns(text: string, fonts: readonly string[], covers: Coverage): Run[] {
  const parts = clusters(text).map((cluster) => {
    const font = fonts.find((name) => coversAll(name, cluster, covers));
    return font === undefined ? { text: codeOf(cluster), font: fonts[0]! } : { text: cluster, font };
  });
  const runs: Run[] = [];
  parts.forEach(({ text: piece, font }, at) => {
    const last = runs.at(-1);
    const next = parts[at + 1];
    // a gap between two words of one script stays in their font, so that they are shaped together
    const bridges =
      isGap(piece) && last !== undefined && last.font === next?.font && covers(last.font, piece.codePointAt(0)!);
    const own = bridges ? last.font : font;
    if (last?.font === own) last.text += piece;
    else runs.push({ font: own, text: piece });
  });
  return runs;
}

function isGap(text: string): boolean {
  return text === ' ' || text === '\u00a0';
}

/** A letter with the marks that follow it. */
function clusters(text: string): string[] {
  return text.match(/\P{M}\p{M}*|\p{M}+/gsu) ?? [];
}

function coversAll(font: string, cluster: string, covers: Coverage): boolean {
  return [...cluster].every((letter) => covers(font, letter.codePointAt(0)!));
}

function codeOf(cluster: string): string {
  return [...cluster]
    .map((letter) => `U+${letter.codePointAt(0)!.toString(16).toUpperCase().padStart(4, '0')}`)
    .join('');
}
