import { Fragment } from 'react';
import type { ReactorTrial } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { peakWords, trialReason } from '#libs/present/trial-rows.js';
import { bankOf } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { VerdictWords } from '../draw/verdict-mark.js';
import { latestResult } from '../line/latest-result.js';
import { withRatio } from './stage-edits.js';

/** The same stages at each customary reactor ratio; a row is put in place by its button. */
export function RatioTable() {
  const { desk, state } = useDesk();
  const rows = latestResult(state)?.reactorTrials ?? [];
  const bank = bankOf(state);
  return (
    <section className="section" aria-labelledby="ratios">
      <h2 id="ratios">The same stages at other reactor ratios</h2>
      <p className="caption">One row is one bank, judged at every level and corner. Choose a row to put it in place.</p>
      <ScrollTable name="Reactor ratios">
        <thead>
          <tr>
            <th scope="col">reactors, rating</th>
            <th scope="col" className="right">
              tuned order
            </th>
            <th scope="col" className="right">
              peaks
            </th>
            <th scope="col">verdict</th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <Fragment key={row.reactorPct}>
              <tr className={row.chosen ? 'headed own' : 'headed'}>
                <th scope="row" className="nowrap">
                  <span className="trial">
                    {row.filter ? 'filter ' : ''}
                    {ratioWords(row.reactorPct)}, {formatQuantity(row.ratedV, 'V', 'given')}
                  </span>
                </th>
                <TrialCells row={row} />
              </tr>
              <tr>
                <td colSpan={4}>
                  <span className="trial-told">
                    {row.chosen || bank === null ? (
                      <span className="caption">as it stands</span>
                    ) : (
                      <button
                        type="button"
                        className="way"
                        onClick={() => desk.tryBank(withRatio(bank, row.reactorPct, row.ratedV))}
                      >
                        Put in place<span className="hidden"> {ratioWords(row.reactorPct)}</span>
                      </button>
                    )}
                    <span className="caption">{trialWords(row)}</span>
                  </span>
                </td>
              </tr>
            </Fragment>
          ))}
        </tbody>
      </ScrollTable>
      {rows.length > 0 ? null : (
        <p className="caption">
          {isMixed(bank)
            ? 'The groups differ in their ratio, so there is none to compare.'
            : 'Judged once the hand rests.'}
        </p>
      )}
    </section>
  );
}

function isMixed(bank: ReturnType<typeof bankOf>): boolean {
  return new Set(bank?.stages.map(({ reactorPct }) => reactorPct ?? 0)).size > 1;
}

function TrialCells({ row }: { row: ReactorTrial }) {
  const { tunedOrderH, verdict } = row;
  return (
    <>
      <td className="right">{tunedOrderH === null ? '–' : formatNumber(tunedOrderH)}</td>
      <td className="right nowrap">{peakWords(row)}</td>
      <td>
        <VerdictWords verdict={verdict} />
      </td>
    </>
  );
}

/** The duty nearest to its limit, and why the row is not the bank's, each number once. */
function trialWords(row: ReactorTrial): string {
  const reason = row.chosen ? '' : trialReason(row);
  if (row.worstDuty === null || row.worstRatio === null || reason.includes(row.worstDuty)) return reason;
  const nearest = `nearest its limit: ${row.worstDuty}, ${formatQuantity(100 * row.worstRatio, '%', 'whole')}`;
  return reason === '' ? nearest : `${reason}; ${nearest}`;
}

function ratioWords(pct: number): string {
  return pct === 0 ? 'none' : formatQuantity(pct, '%', 'given');
}
