import type { Chart, Mark } from './chart.js';
import { monthLetters } from './local-stamp.js';

/** More months than this are told by a letter each. */
const MOST_SPELT = 8;

/**
 * The axis of a figure with one place a month, from 0 on.
 * @param months "2018-01" each
 * @param strong the month that stands out
 * @returns axis with a tick a month
 */
export function monthAxis(months: readonly string[], strong: string | null = null): Chart['x'] {
  const letters = (month: string) => (months.length > MOST_SPELT ? monthLetters(month)[0]! : monthLetters(month));
  return {
    label: '',
    unit: '',
    scale: 'linear',
    from: -0.5,
    to: months.length - 0.5,
    ticks: months.map((month, at) => ({ at, text: letters(month), strong: month === strong })),
  };
}

/**
 * Two values of a month, a ring and a disc, joined where both are known.
 * @param at place of the month
 * @param ring value of the ring
 * @param disc value of the disc
 */
export function pairMarks(at: number, ring: number | null, disc: number | null): Mark[] {
  const marks: Mark[] = [];
  if (ring !== null && disc !== null) marks.push({ kind: 'join', x: at, from: ring, to: disc });
  if (ring !== null) marks.push({ kind: 'ring', x: at, y: ring });
  if (disc !== null) marks.push({ kind: 'disc', x: at, y: disc });
  return marks;
}
