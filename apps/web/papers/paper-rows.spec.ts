// Rows worked out by hand.
import { describe, expect, it } from 'vitest';
import { paperRows } from './paper-rows.js';

describe('the rows of a paper', () => {
  it('are one a field, a list of plain values in one, in the order of the paper', () => {
    const document = {
      name: 'N',
      clauses: [
        { name: 'a', months: [1, 2] },
        { name: 'b', pricePerUnit: 0.1 },
      ],
    };
    expect(paperRows(document)).toEqual([
      ['name', 'N'],
      ['clauses[0].name', 'a'],
      ['clauses[0].months', '1; 2'],
      ['clauses[1].name', 'b'],
      ['clauses[1].pricePerUnit', '0.1'],
    ]);
  });
});
