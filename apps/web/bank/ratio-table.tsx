import { Fragment } from 'react';
import type { ReactorTrial } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { capitalIn, peakWords, trialReason } from '#libs/present/trial-rows.js';
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
  const isPriced = rows.some((row) => capitalIn(row) !== null);
  const heads = headsOf(isPriced ? String(state.document?.currency ?? '') : null);
  return (
    <section className="section" aria-labelledby="ratios">
      <h2 id="ratios">The same stages at other reactor ratios</h2>
      <p className="caption">
        One row is one bank, judged at every level and corner. Choose a row to put it in place.
        {isPriced ? ' A dash: the price book names no such reactor.' : ''}
      </p>
      <ScrollTable name="Reactor ratios" look="table restacked">
        <thead>
          <tr>
            {heads.map((head, at) => (
              <th key={head} scope="col" className={at > 0 && head !== 'verdict' ? 'right' : undefined}>
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <Fragment key={row.reactorPct}>
              <tr className={row.chosen ? 'headed own' : 'headed'}>
                <th scope="row" className="nowrap">
                  <span className="trial">
                    {row.filter ? 'filter ' : ''}
                    {ratioWords(row.reactorPct)}
                  </span>
                </th>
                {cellsOf(row, isPriced).map((cell, at) => (
                  <td
                    key={heads[at + 1]}
                    data-head={heads[at + 1]}
                    className={cell === '–' ? 'absent right' : 'right nowrap'}
                  >
                    {cell}
                  </td>
                ))}
                <td className="judged">
                  <VerdictWords verdict={row.verdict} />
                </td>
              </tr>
              <tr>
                <td colSpan={heads.length}>
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

/** @param currency of the prices; null where no row is priced */
function headsOf(currency: string | null): string[] {
  const cost = currency === null ? [] : [currency === '' ? 'costs new' : `costs new, ${currency}`];
  return ['reactors', 'tuned order', 'peaks', 'effective kvar', ...cost, 'verdict'];
}

function cellsOf(row: ReactorTrial, isPriced: boolean): string[] {
  const { tunedOrderH, effectiveKvar } = row;
  const capital = capitalIn(row);
  return [
    tunedOrderH === null ? '–' : formatNumber(tunedOrderH),
    peakWords(row),
    formatNumber(effectiveKvar),
    ...(isPriced ? [capital === null ? '–' : formatNumber(capital, 'whole')] : []),
  ];
}

function isMixed(bank: ReturnType<typeof bankOf>): boolean {
  return new Set(bank?.stages.map(({ reactorPct }) => reactorPct ?? 0)).size > 1;
}

/** The rating it takes, why the row is not the bank's, and the duty nearest to its limit, each number once. */
function trialWords(row: ReactorTrial): string {
  const told = judgedWords(row);
  const rating = `capacitors for ${formatQuantity(row.ratedV, 'V', 'given')}`;
  return told === '' ? rating : `${rating}; ${told}`;
}

function judgedWords(row: ReactorTrial): string {
  const reason = row.chosen ? '' : trialReason(row);
  if (row.worstDuty === null || row.worstRatio === null || reason.includes(row.worstDuty)) return reason;
  const nearest = `nearest its limit: ${row.worstDuty}, ${formatQuantity(100 * row.worstRatio, '%', 'whole')}`;
  return reason === '' ? nearest : `${reason}; ${nearest}`;
}

function ratioWords(pct: number): string {
  return pct === 0 ? 'none' : formatQuantity(pct, '%', 'given');
}
