import type { ReactNode } from 'react';
import { formatNumber } from '#libs/present/format-number.js';
import { headlineSaving } from '#libs/present/saving-words.js';
import { verdictWords } from '#libs/present/verdict-words.js';
import { STATIONS, type Station, siteAddress, stationOfPath } from '../address.js';
import { bankOf, type DeskState, staleFrom } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { Quantity } from '../draw/quantity.js';
import { Mark } from '../draw/verdict-mark.js';
import { keptEstimate } from './kept-estimate.js';
import { latestResult } from './latest-result.js';

const WORDS: Record<Station, string> = {
  record: 'Record',
  supply: 'Supply',
  need: 'Need',
  bank: 'Bank',
  network: 'Network',
  money: 'Money',
  proposal: 'Proposal',
};

/** The line with its seven stations, each with its one deciding figure; it shows how far the plan is settled. */
export function StationLine({ siteId, open }: { siteId: string; open: Station }) {
  const { state } = useDesk();
  return (
    <nav className="line-nav" aria-label="Stations of the plan">
      <ol className="stations">
        {STATIONS.map((station, at) => (
          <li
            key={station}
            className={station === open ? 'station open' : 'station'}
            style={{ '--at': at } as React.CSSProperties}
          >
            <Segment station={station} />
            <a href={siteAddress(siteId, station)} aria-current={station === open ? 'page' : undefined}>
              <span className="word">{WORDS[station]}</span>
              <Deciding station={station} state={state} />
            </a>
          </li>
        ))}
      </ol>
    </nav>
  );
}

/** A stretch of the line: solid, hollow from older inputs, filling while computed, broken where refused. */
function Segment({ station }: { station: Station }) {
  const { state } = useDesk();
  const at = STATIONS.indexOf(station);
  const refused = state.problems.flatMap(({ path }) =>
    path === undefined ? [] : [STATIONS.indexOf(stationOfPath(path))],
  );
  if (refused.length > 0 && at >= Math.min(...refused)) return <span className="segment broken" />;
  if (state.job !== null) {
    const done = Math.max(0, Math.min(1, state.job.progress * STATIONS.length - at));
    return <span className="segment filling" style={{ '--done': `${100 * done}%` } as React.CSSProperties} />;
  }
  const stale = staleFrom(state);
  const isHollow =
    state.kept === null ? at > 0 && state.records.length === 0 : stale !== null && at >= STATIONS.indexOf(stale);
  return <span className={isHollow ? 'segment hollow' : 'segment'} />;
}

function Deciding({ station, state }: { station: Station; state: DeskState }) {
  const { figure, third } = FIGURES[station](state);
  const isOpen = typeof figure === 'string';
  return (
    <>
      <span className={isOpen ? 'deciding open-question' : 'deciding'}>{figure}</span>
      <span className="third">{third}</span>
    </>
  );
}

/** The figure and the line under it; a bare text is a question that is still open. */
const FIGURES: Record<Station, (state: DeskState) => { figure: ReactNode; third: ReactNode }> = {
  record: ({ records, document }) => {
    const record = records[0];
    if (record === undefined && document?.estimate !== undefined) return { figure: 'estimate', third: 'no meter file' };
    if (record === undefined) return { figure: 'none yet', third: 'drop a meter file' };
    return { figure: <Quantity value={record.record.intervals} digits="given" />, third: 'intervals read' };
  },
  supply: (state) => {
    const result = latestResult(state) ?? keptEstimate(state);
    if (result === null) return { figure: 'not computed', third: 'supply, loads' };
    return { figure: <Quantity value={result.network.shortCircuitMva} unit="MVA" />, third: 'at the bus' };
  },
  need: (state) => {
    const result = latestResult(state);
    const upperKvar = keptEstimate(state)?.requirement.sizedKvar;
    if (result === null && upperKvar !== undefined)
      return { figure: <Quantity value={upperKvar} unit="kvar" />, third: 'at most, estimated' };
    if (result === null) return { figure: 'not computed', third: 'kvar to be held' };
    return { figure: <Quantity value={result.requirement.p99Kvar} unit="kvar" />, third: '99\u00a0% of the record' };
  },
  bank: (state) => {
    const result = latestResult(state) ?? keptEstimate(state);
    if (result === null || bankOf(state) === null) return { figure: 'none yet', third: 'design one' };
    const count = result.bank.stages.length;
    return {
      figure: <Quantity value={result.bank.effectiveKvar} unit="kvar" />,
      third: `${count} ${count === 1 ? 'stage' : 'stages'}`,
    };
  },
  network: (state) => {
    const result = latestResult(state) ?? keptEstimate(state);
    if (result === null) return { figure: 'not computed', third: 'limits' };
    if (bankOf(state) === null) return { figure: 'not judged', third: 'no bank yet' };
    return {
      figure: (
        <span className={`verdict ${result.verdict}`}>
          <Mark verdict={result.verdict} />
          {verdictWords(result.verdict)}
        </span>
      ),
      third: `all ${formatNumber(result.bank.levelsKvar.length, 'given')} levels`,
    };
  },
  money: (state) => {
    const result = latestResult(state);
    const money = result?.money ?? null;
    if (money === null)
      return {
        figure: 'not priced',
        third:
          state.document?.tariff === undefined && state.held.tariff === undefined ? 'no tariff entered' : 'no bank yet',
      };
    const currency = String(state.document?.currency ?? '');
    const saving = <Quantity value={headlineSaving(money)} unit={currency} digits="whole" />;
    // The money of a bank over a limit is there to compare, and is no offer.
    if (result?.verdict === 'avoid') return { figure: <span className="soft">{saving}</span>, third: 'not offered' };
    return { figure: saving, third: money.savingRange === null ? 'a year, ideal controller' : 'a year, estimated' };
  },
  proposal: ({ kept, review }) =>
    kept === null
      ? { figure: 'none yet', third: 'plan first' }
      : { figure: <b>Rev. {kept.revision}</b>, third: review?.stateText ?? 'kept' },
};
