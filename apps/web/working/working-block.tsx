import { useEffect, useRef } from 'react';
import type { Figure } from '#libs/engine/index.js';
import { formatNumber, GAP } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { keptEstimate } from '../line/kept-estimate.js';
import { latestResult } from '../line/latest-result.js';
import { useAskedFigure } from './asked-figure.js';

/** The working of several figures. */
export function WorkingBlocks({ ids }: { ids: readonly string[] }) {
  const { state } = useDesk();
  const figures = (latestResult(state) ?? keptEstimate(state))?.figures ?? [];
  const found = ids.flatMap((id) =>
    figures.filter((figure) => figure.id === id || (id.endsWith('*') && figure.id.startsWith(id.slice(0, -1)))),
  );
  if (found.length === 0) return <p className="working soft">The engine gives no working for these figures yet.</p>;
  return (
    <>
      {found.map((figure) => (
        <WorkingBlock key={figure.id} figure={figure} />
      ))}
    </>
  );
}

/** A number with its formula, the values put in, its source and a link to copy. */
export function WorkingBlock({ figure }: { figure: Figure }) {
  const { label, value, unit, formula, working, source, id } = figure;
  const shown = unit === '' ? '' : `${GAP}${unit}`;
  const block = useRef<HTMLElement | null>(null);
  const isAsked = useAskedFigure() === id;
  useEffect(() => {
    if (isAsked) block.current?.scrollIntoView({ block: 'center' });
  }, [isAsked]);
  return (
    <section className="working" aria-label={`Working: ${label}`} ref={block}>
      <p className="top">
        <span className="num">
          <b>{formatNumber(value)}</b>
          {shown}
        </span>
        <span className="caption">{label}</span>
      </p>
      <p className="formula">{formula}</p>
      <p className="formula num">= {working}</p>
      <p className="formula num">
        = {formatNumber(value, 'answer')}
        {shown}
      </p>
      <ul className="caption">
        {figure.inputs.map((input) => (
          <li key={input.symbol} className="num">
            {input.symbol} = {formatNumber(input.value, 'working')}
            {input.unit === '' ? '' : `${GAP}${input.unit}`}
          </li>
        ))}
      </ul>
      <p className="foot caption">
        <span>source: {source}</span>
        <button type="button" className="way" onClick={() => void navigator.clipboard?.writeText(linkTo(id))}>
          Copy link
        </button>
      </p>
    </section>
  );
}

function linkTo(id: string): string {
  const [path = ''] = window.location.href.split('?');
  return `${path}?figure=${encodeURIComponent(id)}`;
}
