import { useEffect, useState } from 'react';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { bankOf } from '../desk/desk-state.js';
import type { RatioRow } from '../desk/look.js';
import { useDesk } from '../desk/use-desk.js';
import { VerdictWords } from '../draw/verdict-mark.js';
import { withRatio } from './stage-edits.js';

/** The rows, asked for once the hand rests. */
export function useRatios(): RatioRow[] {
  const { desk, state } = useDesk();
  const [rows, setRows] = useState<RatioRow[]>([]);
  const { look } = state;
  useEffect(() => {
    if (look?.depth !== 'full') return undefined;
    let isCurrent = true;
    desk
      .ratios()
      .then((found) => isCurrent && setRows(found))
      .catch(() => isCurrent && setRows([]));
    return () => {
      isCurrent = false;
    };
  }, [desk, look]);
  return rows;
}

/** The same stages at each common reactor ratio; a row is put in place by its button. */
export function RatioTable({ isWide = false }: { isWide?: boolean }) {
  const { desk, state } = useDesk();
  const rows = useRatios();
  const bank = bankOf(state);
  return (
    <section className="section" aria-labelledby="ratios">
      <h2 id="ratios">The same stages at other reactor ratios</h2>
      <p className="caption">
        {isWide ? 'Percentages are of the limit, in the worst corner.' : 'One row is one bank.'} Choose a row to put it
        in place.
      </p>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a table that scrolls must be reached by keyboard */}
      <section className="table" tabIndex={0} aria-label="Reactor ratios">
        <table>
          <thead>
            <tr>
              <th scope="col">reactors, rating</th>
              <th scope="col" className="right">
                effective kvar
              </th>
              {isWide ? (
                <th scope="col" className="right">
                  tuned order
                </th>
              ) : null}
              <th scope="col" className="right">
                peak, all in
              </th>
              {isWide ? <WideHeads /> : null}
              <th scope="col">verdict</th>
              <th scope="col">
                <span className="hidden">put in place</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.reactorPct} className={row.isOwn ? 'own' : undefined}>
                <RatioCells row={row} isWide={isWide} />
                <td>
                  {row.isOwn || bank === null ? (
                    'as it stands'
                  ) : (
                    <button type="button" className="way" onClick={() => desk.tryBank(withRatio(bank, row.reactorPct))}>
                      Put in place<span className="hidden"> {ratioWords(row.reactorPct)}</span>
                    </button>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </section>
      {rows.length === 0 ? <p className="caption">Judged once the hand rests.</p> : null}
    </section>
  );
}

function WideHeads() {
  return ['harmonic voltage', 'capacitor voltage', 'capacitor current'].map((head) => (
    <th key={head} scope="col" className="right">
      {head}
    </th>
  ));
}

function RatioCells({ row, isWide }: { row: RatioRow; isWide: boolean }) {
  const share = (value: number | null) => (
    <td className="right">{value === null ? '–' : formatQuantity(value, '%', 'whole')}</td>
  );
  const order = (value: number | null) => <td className="right">{value === null ? '–' : formatNumber(value)}</td>;
  return (
    <>
      <th scope="row" className="nowrap">
        {ratioWords(row.reactorPct)}, {formatQuantity(row.ratedV, 'V', 'given')}
      </th>
      <td className="right">{formatNumber(row.effectiveKvar)}</td>
      {isWide ? order(row.tunedOrderH) : null}
      {order(row.parallelOrderH)}
      {isWide ? (
        <>
          {share(row.harmonicVoltagePct)}
          {share(row.capacitorVoltagePct)}
          {share(row.capacitorCurrentPct)}
        </>
      ) : null}
      <td>
        <VerdictWords verdict={row.verdict} />
      </td>
    </>
  );
}

function ratioWords(pct: number): string {
  return pct === 0 ? 'none' : formatQuantity(pct, '%', 'given');
}
