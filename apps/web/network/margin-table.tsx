import type { Figure } from '#libs/engine/index.js';
import type { Chart, Mark } from '#libs/present/chart.js';
import { useDesk } from '../desk/use-desk.js';
import { ChartFigure } from '../draw/chart-figure.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { latestResult } from '../line/latest-result.js';
import { marginPicture } from './margin-picture.js';

type Cell = Extract<Mark, { kind: 'cell' }>;

/** Level by order, each cell its share of the limit: a table with fills that mean what its numbers say. */
export function MarginTable({
  chart,
  workings,
  isPickable = false,
}: {
  chart: Chart;
  workings: readonly Figure[];
  isPickable?: boolean;
}) {
  const { desk, state } = useDesk();
  const levels = [...(latestResult(state)?.bank.levelsKvar ?? [])].reverse();
  const cells = chart.marks.filter((mark): mark is Cell => mark.kind === 'cell');
  const picked = isPickable ? pickedRow(levels, state.picks.levelKvar) : -1;
  return (
    <ChartFigure figure={chart} workings={workings} steps={false} picture={() => marginPicture(chart)}>
      <ScrollTable look="map" name={`Map: ${chart.finding}`}>
        <thead>
          <tr>
            {chart.table.columns.map(({ head }) => (
              <th key={head} scope="col">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {chart.table.rows.map((row, at) => (
            <tr key={row[0]} className={at === picked ? 'picked' : undefined}>
              <th scope="row">
                {isPickable ? (
                  <button
                    type="button"
                    aria-pressed={at === picked}
                    onClick={() => desk.pick({ levelKvar: levels[at] ?? null })}
                  >
                    {row[0]}
                  </button>
                ) : (
                  row[0]
                )}
              </th>
              {row.slice(1).map((text, column) => (
                <td key={column} className={cells.find((cell) => cell.row === at && cell.column === column)?.fill}>
                  <span>{text}</span>
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </ScrollTable>
      <MapLegend />
    </ChartFigure>
  );
}

function pickedRow(levels: readonly number[], levelKvar: number | null): number {
  if (levelKvar === null) return 0;
  return Math.max(
    0,
    levels.findIndex((kvar) => kvar <= levelKvar + 1e-6),
  );
}

function MapLegend() {
  const fills = [
    ['blank', 'to 50'],
    ['quiet', 'to 80'],
    ['hatch', 'near, to 100'],
    ['solid', 'over 100'],
  ] as const;
  return (
    <p className="legend">
      <span>%&nbsp;of limit</span>
      {fills.map(([fill, words]) => (
        <span key={fill} className="nowrap">
          <span className={`swatch ${fill}`} />
          {words}
        </span>
      ))}
    </p>
  );
}
