import { describe, expect, it } from 'vitest';
import { DutyRow, ratioVerdict } from './duty-row.js';
import { graver, type Verdict } from './rules.js';

const head = { name: 'capacitor current', group: 0, unit: 'A', source: 'somewhere', nearRatio: 0.8 };
const place = (levelKvar: number) => ({ levelKvar, corner: null, orderH: null });

describe('a value against its limit', () => {
  it.each([
    [0.8, 'clear', 'at the edge of near'],
    [0.8000001, 'watch', 'near'],
    [1, 'watch', 'at the limit itself'],
    [1 + 1e-10, 'watch', 'a rounding past it'],
    [1.0000001, 'avoid', 'exceeded'],
    [0, 'clear', 'nothing'],
  ] as const)('%d is %s: %s', (ratio, verdict, _why) => {
    expect(ratioVerdict(ratio, 0.8)).toBe(verdict);
  });
});

describe('a row of the duties', () => {
  it('is none until something was taken', () => {
    expect(new DutyRow(head).duty()).toBeNull();
  });

  it('keeps the largest ratio with its own value, limit and place', () => {
    const row = new DutyRow(head);
    row.take(50, 100, place(1));
    row.take(60, 200, place(2));
    row.take(55, 100, place(3));
    expect(row.duty()).toMatchObject({ value: 55, limit: 100, ratio: 0.55, levelKvar: 3, verdict: 'clear' });
  });

  it('keeps the earlier of two that differ by a rounding', () => {
    const row = new DutyRow(head);
    row.take(50, 100, place(1));
    row.take(50 * (1 + 1e-10), 100, place(2));
    expect(row.duty()!.levelKvar).toBe(1);
    row.take(50 * (1 + 1e-8), 100, place(3));
    expect(row.duty()!.levelKvar).toBe(3);
  });

  it('has the gravest verdict met anywhere, not that of the largest ratio', () => {
    const row = new DutyRow(head);
    row.take(150, 100, place(1), () => 'watch');
    row.take(110, 100, place(2), () => 'avoid');
    expect(row.duty()).toMatchObject({ value: 150, levelKvar: 1, verdict: 'avoid' });
  });

  it('whose limit is unknown is shown with its largest value and not judged', () => {
    const row = new DutyRow(head);
    row.takeUnjudged(40, place(1));
    row.takeUnjudged(60, place(2));
    row.takeUnjudged(50, place(3));
    expect(row.duty()).toMatchObject({ value: 60, limit: null, ratio: null, levelKvar: 2, verdict: null });
  });
});

describe('the graver of two verdicts', () => {
  const order: (Verdict | null)[] = [null, 'clear', 'watch', 'avoid'];

  it('is the later in this order, whichever comes first', () => {
    order.forEach((a, i) => {
      order.forEach((b, k) => {
        expect(graver(a, b)).toBe(order[Math.max(i, k)]);
      });
    });
  });
});
