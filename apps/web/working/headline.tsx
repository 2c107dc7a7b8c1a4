import { type ReactNode, useState } from 'react';
import { useAddress } from '../address.js';
import { Quantity } from '../draw/quantity.js';
import { WorkingBlocks } from './working-block.js';

/** A figure beside the headline; with an id it opens its working. */
export interface KeyFigure {
  value: number | null;
  unit?: string;
  under: ReactNode;
  /** of the figure in the result whose working it opens */
  id?: string;
  digits?: 'given' | 'whole';
}

/** The answer of a station in a sentence, with the figures that decide it. */
export function Headline({ children, figures }: { children: ReactNode; figures: readonly KeyFigure[] }) {
  const address = useAddress();
  const asked = address.page === 'site' ? address.figure : null;
  const [opened, setOpened] = useState<string | null>(null);
  const open = opened ?? asked;
  return (
    <>
      <div className="headline">
        <h1>{children}</h1>
        <div className="figures">
          {figures.map((figure, at) => (
            <KeyFigureView
              key={at}
              figure={figure}
              isOpen={figure.id !== undefined && figure.id === open}
              onOpen={() => setOpened(open === figure.id ? '' : (figure.id ?? ''))}
            />
          ))}
        </div>
      </div>
      {open === null || open === '' ? null : <WorkingBlocks ids={[open]} />}
    </>
  );
}

function KeyFigureView({ figure, isOpen, onOpen }: { figure: KeyFigure; isOpen: boolean; onOpen: () => void }) {
  const { value, unit, under, id, digits } = figure;
  const body = (
    <>
      <span className="value">
        <Quantity value={value} unit={unit} digits={digits} />
      </span>
      <span className="under">{under}</span>
    </>
  );
  if (id === undefined) return <div className="plain">{body}</div>;
  return (
    <button type="button" aria-expanded={isOpen} onClick={onOpen}>
      {body}
    </button>
  );
}
