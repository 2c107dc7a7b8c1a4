import type { ChartTable } from '#libs/present/chart.js';
import { ScrollTable } from './scroll-table.js';

/** The numbers of a figure. */
export function ChartTableView({ table, name }: { table: ChartTable; name: string }) {
  const side = (at: number) => (table.columns[at]?.right ? 'right' : undefined);
  return (
    <ScrollTable name={`Table: ${name}`}>
      <thead>
        <tr>
          {table.columns.map(({ head }, at) => (
            <th key={at} scope="col" className={side(at)}>
              {head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {table.rows.map((row, k) => (
          <tr key={k}>
            {row.map((text, at) => (
              <td key={at} className={side(at)}>
                {text}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </ScrollTable>
  );
}
