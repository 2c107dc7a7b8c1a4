import type { ReactNode } from 'react';
import { ScrollTable } from './scroll-table.js';

/** Rows of cells under their heads; the first cell names its row. */
export function RowTable({
  name,
  heads,
  rows,
  right = [],
}: {
  name: string;
  heads: readonly string[];
  rows: readonly (readonly ReactNode[])[];
  /** places of the columns that stand to the right */
  right?: readonly number[];
}) {
  const side = (at: number) => (right.includes(at) ? 'right' : undefined);
  return (
    <ScrollTable name={name}>
      <thead>
        <tr>
          {heads.map((head, at) => (
            <th key={head} scope="col" className={side(at)}>
              {head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row, k) => (
          <tr key={k}>
            {row.map((cell, at) =>
              at === 0 ? (
                <th key={heads[at]} scope="row" className={side(at)}>
                  {cell}
                </th>
              ) : (
                <td key={heads[at]} className={side(at)}>
                  {cell}
                </td>
              ),
            )}
          </tr>
        ))}
      </tbody>
    </ScrollTable>
  );
}
