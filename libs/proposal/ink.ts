/** One ink in four strengths; all are greys, so that a paper prints alike everywhere. */
export const INK = '#000000';
/** captions, axes, units: 7.0 on white */
export const SOFT = '#595959';
/** rules between rows; never text */
export const HAIR = '#bdbdbd';
/** the bank's wash, quiet cells */
export const WASH = '#e3e3e3';
/** windows around orders, the lightest fill */
export const FAINT = '#efefef';
export const PAPER = '#ffffff';

/** Widths of lines [pt]. */
export const STROKE = { line: 3, tap: 2, heavy: 1.8, load: 1.2, frame: 1.4, tick: 0.75, hair: 0.6, grid: 0.4 } as const;
