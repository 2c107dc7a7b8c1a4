import type { ReactNode } from 'react';
import { ScrollTable } from './scroll-table.js';

/** More columns than this are set one below the other in a narrow window. */
const MOST_NARROW = 3;

/** A dash holds its place in a column; where there are no columns it says nothing. */
function lookOf(cell: ReactNode, look: string | undefined): string | undefined {
  return cell === '–' ? `absent ${look ?? ''}`.trim() : look;
}

/** Rows of cells under their heads; the first cell names its row. */
export function RowTable({
  name,
  heads,
  rows,
  right = [],
  judged = -1,
}: {
  name: string;
  heads: readonly string[];
  rows: readonly (readonly ReactNode[])[];
  /** places of the columns that stand to the right */
  right?: readonly number[];
  /** place of the column that a narrow window keeps beside the row's name */
  judged?: number;
}) {
  const side = (at: number) => (right.includes(at) ? 'right' : undefined);
  return (
    <ScrollTable name={name} look={heads.length > MOST_NARROW ? 'table restacked' : 'table'}>
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
                <td key={heads[at]} data-head={heads[at]} className={lookOf(cell, at === judged ? 'judged' : side(at))}>
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
