import { useState } from 'react';
import type { EstimateResult, Remark, Result } from '#libs/engine/index.js';
import { MONEY_FIGURES } from '#libs/present/effect-words.js';
import { formatNumber, formatQuantity, formatRange, inShownMark } from '#libs/present/format-number.js';
import { messageOf, remarkConsequence } from '#libs/present/remark-words.js';
import { siteAddress, type Station, stationOfCode, stationOfPath } from '../address.js';
import { useDesk } from '../desk/use-desk.js';
import { keptEstimate } from './kept-estimate.js';
import { latestResult } from './latest-result.js';

/** One thing the plan rests on. */
interface Point {
  key: string;
  text: string;
  why: string;
  path: string | null;
  /** where it is looked at, without a field of its own */
  station: Station;
  /** how far it moves the figure it moves most, where that was computed */
  spread: number | null;
  effect: string;
  /** it was assumed, and nobody asks about it */
  isAssumed: boolean;
  /** the plan cannot be issued with it */
  blocks: boolean;
}

/** Everything the plan still rests on, in order of how far each moves the result, each opening its field. */
export function OpenPoints({ siteId }: { siteId: string }) {
  const { state } = useDesk();
  const [isUnfolded, setUnfolded] = useState(false);
  const result = latestResult(state) ?? keptEstimate(state);
  const points = result === null ? [] : openPoints(result, String(state.document?.currency ?? ''));
  const most = Math.max(0, ...points.map(({ spread }) => spread ?? 0));
  return (
    <aside className="rests" aria-label="What this plan still rests on">
      <div className="earth">
        <span className="segment" />
        <EarthSymbol />
        <div className="words">
          <h2 className="word">What this plan still rests on</h2>
          <span className="deciding">
            {result === null ? 'nothing computed' : `${points.length} open ${points.length === 1 ? 'point' : 'points'}`}
          </span>
          <span className="third caption">{gravestWords(points, most)}</span>
        </div>
        <button
          type="button"
          className="rail-toggle"
          aria-expanded={isUnfolded}
          aria-label={`What this plan still rests on: ${points.length} open points`}
          onClick={() => setUnfolded(!isUnfolded)}
        >
          {points.length}
        </button>
      </div>
      <div className={isUnfolded ? 'points unfolded' : 'points'}>
        <p className="caption">
          {most > 0
            ? 'What blocks the issue first, then by how far each moves the result.'
            : 'Findings first, then what was assumed.'}{' '}
          Open one to settle it where it is entered.
        </p>
        <PointList points={points.filter((point) => !isQuiet(point))} most={most} siteId={siteId} />
        <QuietPoints points={points.filter(isQuiet)} siteId={siteId} />
      </div>
    </aside>
  );
}

/** What weighs most, in a few words. */
function gravestWords(points: readonly Point[], most: number): string {
  const blocking = points.filter(({ blocks }) => blocks).length;
  const deciding = points.filter(({ effect }) => effect === DECIDES).length;
  if (blocking > 0) return `${formatNumber(blocking, 'given')} ${blocking === 1 ? 'blocks' : 'block'} the issue`;
  if (most === 0) return 'effects not computed yet';
  return `${deciding === 0 ? 'none' : formatNumber(deciding, 'given')} could change the verdict`;
}

function PointList({ points, most, siteId }: { points: readonly Point[]; most: number; siteId: string }) {
  return (
    <ul>
      {points.map((point) => (
        <PointRow key={point.key} point={point} most={most} siteId={siteId} />
      ))}
    </ul>
  );
}

/** What was assumed and moves no deciding figure that was worked out: behind one line, so that the others are read. */
function QuietPoints({ points, siteId }: { points: readonly Point[]; siteId: string }) {
  if (points.length === 0) return null;
  const count = formatNumber(points.length, 'given');
  return (
    <details className="quiet-points">
      <summary className="way">{`${count} ${points.length === 1 ? 'assumption' : 'assumptions'} without a worked-out effect`}</summary>
      <PointList points={points} most={0} siteId={siteId} />
    </details>
  );
}

function PointRow({ point, most, siteId }: { point: Point; most: number; siteId: string }) {
  const { text, why, path, station, spread, effect, blocks } = point;
  const share = blocks ? 1 : spread === null || most === 0 ? 0 : Math.max(0.04, reachOf(spread) / reachOf(most));
  return (
    <li className="point">
      <div>
        {spread === null && !blocks ? (
          <div className="measure unmeasured" />
        ) : (
          <div className="measure" style={{ width: `${72 * share}px` }} />
        )}
      </div>
      <div>
        <a
          href={
            path === null ? siteAddress(siteId, station) : siteAddress(siteId, stationOfPath(path), { field: path })
          }
        >
          {text}
        </a>
        <p>{why}</p>
        {effect === '' ? null : <p>{effect}</p>}
      </div>
    </li>
  );
}

function EarthSymbol() {
  return (
    <svg className="symbol" width="24" height="34" viewBox="0 0 24 34" aria-hidden="true">
      <path d="M12 0V20M2 20H22M6 25H18M10 30H14" stroke="var(--ink)" strokeWidth="1.6" fill="none" />
    </svg>
  );
}

const DECIDES = 'Could change the verdict';

// A limit overrun eighty times would leave every other bar a dot: a spread of one whole is half the way.
function reachOf(spread: number): number {
  return spread / (1 + spread);
}

/** What blocks the issue, then what has a computed effect by its size, then reasons, the record's notes and assumptions. */
function openPoints({ reasons, record, assumptions, duties }: Result | EstimateResult, currency: string): Point[] {
  const open = duties.filter(({ verdict }) => verdict === null).length;
  const unjudged: Point[] =
    open === 0
      ? []
      : [
          {
            key: 'unjudged',
            text: `${open} ${open === 1 ? 'duty is' : 'duties are'} not judged`,
            why: 'A limit or a load is missing.',
            path: 'loads.distorting',
            station: 'supply',
            spread: null,
            effect: '',
            isAssumed: false,
            blocks: false,
          },
        ];
  const unsettled = reasons.filter(({ code }) => messageOf(code)?.level !== 'information');
  const points = [
    ...unsettled.map((remark) => pointOf(remark, currency)),
    ...unjudged,
    ...(record?.notes ?? []).map((remark) => ({ ...pointOf(remark, currency), station: 'record' as const })),
    ...assumptions.map((remark) => ({ ...pointOf(remark, currency), isAssumed: true })),
  ];
  return points
    .map((point, at) => ({ ...point, key: `${at}:${point.key}` }))
    .sort((a, b) => Number(b.blocks) - Number(a.blocks) || (b.spread ?? -1) - (a.spread ?? -1));
}

function pointOf(remark: Remark, currency: string): Point {
  const { code, path, text, effect } = remark;
  return {
    key: code,
    text: inShownMark(text.replace(/\.$/, '')),
    why: remarkConsequence(remark),
    path,
    station: stationOfCode(code),
    spread: effect === null ? null : spreadOf(effect),
    effect: effect === null ? '' : effect.changesVerdict ? DECIDES : rangeWords(effect, currency),
    isAssumed: false,
    blocks: messageOf(code)?.level === 'blocks issue',
  };
}

/** Folded away: an assumption whose effect was not worked out, or is nothing beside the others. */
function isQuiet({ isAssumed, spread, effect }: Point): boolean {
  return isAssumed && spread === null && effect === '';
}

// A duty's effect is a share of its limit; an amount of money is brought to a share of itself.
function spreadOf({ figure, low, high }: NonNullable<Remark['effect']>): number {
  const whole = figure.startsWith('money.') ? Math.max(Math.abs(low), Math.abs(high), 1) : 1;
  return Math.abs(high - low) / whole;
}

function rangeWords({ figure, low, high }: NonNullable<Remark['effect']>, currency: string): string {
  const duty = /^duties\.(.+)$/.exec(figure)?.[1];
  if (duty !== undefined) {
    const percent = { low: Math.round(100 * low), high: Math.round(100 * high) };
    return `${duty}: ${formatRange(percent, '%')} of its limit`;
  }
  const money = MONEY_FIGURES[figure];
  if (money !== undefined)
    return `${money}: ${formatRange({ low: Math.round(low), high: Math.round(high) }, currency)}`;
  if (/kvar$/i.test(figure)) return `± ${formatQuantity(Math.abs(high - low) / 2, 'kvar')}`;
  return formatRange({ low, high }, '', 'computed');
}
