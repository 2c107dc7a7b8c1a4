import { type ReactNode, useState } from 'react';
import type { Figure } from '#libs/engine/index.js';
import { useOpenSite } from '../desk/use-desk.js';
import { Quantity } from '../draw/quantity.js';
import { keptEstimate } from '../line/kept-estimate.js';
import { latestResult } from '../line/latest-result.js';
import { useAskedFigure } from './asked-figure.js';
import { WorkingBlock, WorkingBlocks } from './working-block.js';

/** A figure beside the headline; with an id it opens its working. */
export interface KeyFigure {
  value: number | null;
  unit?: string;
  under: ReactNode;
  /** of the figure in the result whose working it opens */
  id?: string;
  /** the working itself, where the result holds none of it */
  working?: Figure;
  digits?: 'given' | 'whole';
}

/** The answer of a station in a sentence, with the figures that decide it. */
export function Headline({ children, figures }: { children: ReactNode; figures: readonly KeyFigure[] }) {
  const state = useOpenSite();
  const asked = useAskedFigure();
  const [opened, setOpened] = useState<string | null>(null);
  const own = figures.flatMap(({ working }) => working ?? []);
  const kept = state === null ? null : (latestResult(state) ?? keptEstimate(state));
  const known = [...own, ...(kept?.figures ?? [])];
  const open = opened ?? (known.some(({ id }) => id === asked) ? asked : null);
  const shown = own.find(({ id }) => id === open);
  return (
    <>
      <div className="headline">
        <h1>{children}</h1>
        <div className="figures">
          {figures.map((figure, at) => (
            <KeyFigureView
              key={at}
              figure={figure}
              isOpen={idOf(figure) !== undefined && idOf(figure) === open}
              onOpen={() => setOpened(open === idOf(figure) ? '' : (idOf(figure) ?? ''))}
            />
          ))}
        </div>
      </div>
      {shown === undefined ? null : <WorkingBlock figure={shown} />}
      {shown !== undefined || open === null || open === '' ? null : <WorkingBlocks ids={[open]} />}
    </>
  );
}

function idOf({ id, working }: KeyFigure): string | undefined {
  return working?.id ?? id;
}

function KeyFigureView({ figure, isOpen, onOpen }: { figure: KeyFigure; isOpen: boolean; onOpen: () => void }) {
  const { value, unit, under, digits } = figure;
  const body = (
    <>
      <span className="value">
        <Quantity value={value} unit={unit} digits={digits} />
      </span>
      <span className="under">{under}</span>
    </>
  );
  if (idOf(figure) === undefined) return <div className="plain">{body}</div>;
  return (
    <button type="button" aria-expanded={isOpen} onClick={onOpen}>
      {body}
    </button>
  );
}
