import { afterEach, describe, expect, it } from 'vitest';
import {
  formatApart,
  formatNumber,
  formatQuantity,
  formatRange,
  formatShare,
  inPoints,
  inShownMark,
  setDecimalMark,
  unitOfName,
} from './format-number.js';

describe('a number for people', () => {
  it.each([
    [261.353, '261', 'three digits, since whole units are enough from 100 on'],
    [37.333, '37.3', 'three digits'],
    [0.9504, '0.950', 'a power factor keeps three decimals'],
    [0.95, '0.950', 'a column stays aligned where a value happens to be short'],
    [35_040, '35\u00a0040', 'thousands stand apart'],
    [2977, '2\u00a0977', 'from four digits on'],
    [959_636.71, '959\u00a0637', 'never fewer than its whole units'],
    [-1250.4, '\u22121\u00a0250', 'a true minus'],
    [0.0842, '0.0842', 'three digits below 1 as well'],
    [99.96, '100', 'rounding up to another power of ten costs no digit'],
    [0.9996, '1.00', 'the same below 1'],
    [-0, '0', 'no minus on nothing'],
    [-3e-13, '0', 'what rounding left of an exact zero reads as 0'],
  ])('%d reads %s: %s', (value, text) => {
    expect(formatNumber(value)).toBe(text);
  });

  it('prints what was entered as it was entered', () => {
    expect(formatNumber(0.95, 'given')).toBe('0.95');
    expect(formatNumber(1250, 'given')).toBe('1\u00a0250');
    expect(formatNumber(528.0000000001, 'given')).toBe('528');
    // 2.27·17/19 − 0.27 has no short form, so it is a computed number
    expect(formatNumber((2.27 * 17) / 19 - 0.27, 'given')).toBe('1.76');
  });

  it('refuses what is no number', () => {
    expect(() => formatNumber(Number.NaN)).toThrow('finite');
    expect(() => formatNumber(Number.POSITIVE_INFINITY)).toThrow('finite');
  });

  it('joins number and unit so that no line breaks between them', () => {
    expect(formatQuantity(37.333, 'kvar')).toBe('37.3\u00a0kvar');
    expect(formatQuantity(0.95, '')).toBe('0.950');
    expect(formatQuantity(null, 'kvar')).toBe('–');
  });

  it('writes a range with an en dash, and one number where there is no range', () => {
    expect(formatRange({ low: 180, high: 250 }, 'MVA')).toBe('180–250\u00a0MVA');
    expect(formatRange({ low: 250, high: 250 }, 'MVA')).toBe('250\u00a0MVA');
  });
});

describe('a value beside its limit', () => {
  it('takes more digits until the two read apart', () => {
    expect(formatApart(480.2, 480)).toEqual({ value: '480.2', limit: '480' });
    expect(formatApart(8.0004, 8)).toEqual({ value: '8.0004', limit: '8' });
    expect(formatApart(479.9, 480)).toEqual({ value: '479.9', limit: '480' });
  });

  it('reads as the limit where it is the limit', () => {
    expect(formatApart(480, 480)).toEqual({ value: '480', limit: '480' });
  });

  it('stays short where it is far away', () => {
    expect(formatApart(456.3, 528)).toEqual({ value: '456', limit: '528' });
  });
});

describe('a share in a narrow cell', () => {
  it('never rounds across 100 from the other side', () => {
    expect(formatShare(99.7)).toBe('99.7');
    expect(formatShare(100.3)).toBe('100.3');
    expect(formatShare(52.4)).toBe('52');
    expect(formatShare(1152.2)).toBe('1\u00a0152');
  });
});

describe('the unit a name ends in', () => {
  it.each([
    ['levelKvar', 'kvar'],
    ['laggingKvarh', 'kvarh'],
    ['faultLevelMva', 'MVA'],
    ['reconnectDelayS', 's'],
    ['presentOrderH', ''],
    ['sharePct', '%'],
    ['requiredOhm', 'Ω'],
    ['capacitanceFactor', ''],
    ['group', ''],
    ['highestV', 'V'],
  ])('%s is in "%s"', (name, unit) => {
    expect(unitOfName(name)).toBe(unit);
  });
});

describe('the decimal mark of the reader', () => {
  afterEach(() => setDecimalMark('.'));

  it('is the only thing that changes: thousands stay apart by a gap, so that no number reads two ways', () => {
    setDecimalMark(',');
    expect(formatNumber(37.333)).toBe('37,3');
    expect(formatNumber(-1234.5, 'given')).toBe('\u22121\u00a0234,5');
    expect(formatRange({ low: 0.95, high: 1.5 }, 'kV')).toBe('0,95–1,5\u00a0kV');
    setDecimalMark('.');
    expect(formatNumber(37.333)).toBe('37.3');
  });

  it('leaves a value and its limit as far apart as they were', () => {
    const points = formatApart(100.04, 100);
    setDecimalMark(',');
    expect(formatApart(100.04, 100)).toEqual({ value: points.value.replace('.', ','), limit: points.limit });
    expect(formatApart(0.9499, 0.95)).toEqual({ value: '0,9499', limit: '0,95' });
  });

  it('reaches numbers of a sentence made elsewhere, not the numbers of a version or a standard', () => {
    const text = 'Engine 0.1.0: 1\u00a0234.5 kvar at 0.95, by IEC 61000-2-4:2002.';
    expect(inShownMark(text)).toBe(text);
    setDecimalMark(',');
    expect(inShownMark(text)).toBe('Engine 0.1.0: 1\u00a0234,5 kvar at 0,95, by IEC 61000-2-4:2002.');
    expect(inPoints('1\u00a0234,5')).toBe('1\u00a0234.5');
  });
});
