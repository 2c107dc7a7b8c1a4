import { formatNumber } from '#libs/present/format-number.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import type { RecordShown } from '../api/shown.js';
import type { Trace } from '../desk/look.js';
import { RowTable } from '../draw/row-table.js';
import { keptRawRows } from './raw-rows.js';

const ROWS = 4;

/** The first and last rows of the file beside what was read from them. */
export function RawBesideRead({ record, trace }: { record: RecordShown; trace: Trace | null }) {
  const raw = keptRawRows(record.id);
  return (
    <section className="section" aria-labelledby="raw">
      <h2 id="raw">First and last rows, as they stand and as they were read</h2>
      <p className="caption">
        {raw === null
          ? 'The file’s own rows are shown in the browser that sent it, where it is text.'
          : `${record.file.name ?? 'The file'}, as it stands. Each interval is named by its beginning, by the site’s clock.`}
      </p>
      <div className="split halves">
        {raw === null ? null : (
          <div>
            <pre className="raw-rows">{[...raw.first, '⋯', ...raw.last].join('\n')}</pre>
          </div>
        )}
        {trace === null ? null : (
          <RowTable
            name="First and last intervals"
            heads={['begins', 'kW', 'kvar']}
            right={[1, 2]}
            rows={ends(trace)}
          />
        )}
      </div>
    </section>
  );
}

function ends({ zone, firstS, intervalS, activeKw, reactiveKvar }: Trace): string[][] {
  const shown = (value: number) => formatNumber(Number(value.toPrecision(6)), 'given');
  const row = (at: number) => [
    formatMoment(zone, firstS + at * intervalS),
    shown(activeKw[at]!),
    shown(reactiveKvar[at]!),
  ];
  const n = activeKw.length;
  const first: number[] = [];
  for (let at = 0; at < n && first.length < ROWS; at++) if (!Number.isNaN(activeKw[at])) first.push(at);
  const last: number[] = [];
  for (let at = n - 1; at > first.at(-1)! && last.length < ROWS; at--)
    if (!Number.isNaN(activeKw[at])) last.unshift(at);
  return [...first.map(row), ['⋯', '', ''], ...last.map(row)];
}
