import { type PointerEvent, useRef, useState } from 'react';
import type { BankInput } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { bankOf } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import type { Figured } from '../draw/chart-figure.js';
import { ChartFigure } from '../draw/chart-figure.js';
import { usePlotWidth } from '../draw/plot-size.js';
import { latestResult } from '../line/latest-result.js';
import { stagesOf, withStageAdded, withStageMoved, withStageRemoved } from './stage-edits.js';

const HEIGHT = 190;
const FLOOR = 136;
/** Dragged so far off the floor, a stage is removed. */
const OFF_PX = 60;

/** Stages side by side, as high as their effective kvar: dragged to another place, or off to remove; keys do the same. */
export function StagesFigure() {
  const { desk, state } = useDesk();
  const [place, width] = usePlotWidth();
  const bank = bankOf(state);
  const effective = latestResult(state)?.bank.stages.map(({ effectiveKvar }) => effectiveKvar) ?? [];
  if (bank === null) return null;
  const change = (next: BankInput) => desk.tryBank(next.stages.length === 0 ? null : next);
  return (
    <ChartFigure figure={figureOf(bank, effective)} steps={false} working={['bank.group*', 'bank.effectiveKvar']}>
      <div ref={place} className="stages-plot">
        {width === 0 ? null : <StageRow {...{ bank, effective, width, change }} />}
      </div>
      <p className="row">
        <button type="button" className="way" onClick={() => change(withStageAdded(bank))}>
          Add a stage
        </button>
        {state.trial === null ? (
          <OtherBanks />
        ) : (
          <button type="button" className="way" onClick={() => desk.tryBank(null)}>
            Put the kept bank back
          </button>
        )}
      </p>
    </ChartFigure>
  );
}

/** The ways to another bank: one designed for the record, or the one the site file holds beside a plan. */
function OtherBanks() {
  const { desk, state } = useDesk();
  const own = state.document?.bank as BankInput | undefined;
  const isBusy = state.saving || state.job !== null;
  return (
    <>
      {state.kept?.kind === 'plan' ? null : (
        <button type="button" className="way" disabled={isBusy} onClick={() => void desk.keep('plan')}>
          Design a bank
        </button>
      )}
      {state.kept?.kind === 'plan' && own !== undefined ? (
        <button type="button" className="way" onClick={() => desk.tryBank(own)}>
          Try the bank of the site file
        </button>
      ) : null}
    </>
  );
}

interface RowProps {
  bank: BankInput;
  effective: readonly number[];
  width: number;
  change: (bank: BankInput) => void;
}

function StageRow({ bank, effective, width, change }: RowProps) {
  const stages = stagesOf(bank);
  const [drag, setDrag] = useState<{ at: number; dx: number; dy: number } | null>(null);
  const from = useRef({ x: 0, y: 0 });
  const pitch = Math.min(62, (width - 4) / (stages.length + 1));
  const most = Math.max(1, ...effective);
  const target = drag === null ? 0 : Math.max(0, Math.min(stages.length - 1, drag.at + Math.round(drag.dx / pitch)));
  const isOff = drag !== null && Math.abs(drag.dy) > OFF_PX;
  const down = (event: PointerEvent<SVGGElement>, at: number) => {
    event.currentTarget.setPointerCapture(event.pointerId);
    from.current = { x: event.clientX, y: event.clientY };
    setDrag({ at, dx: 0, dy: 0 });
  };
  const move = (event: PointerEvent) => {
    if (drag === null) return;
    setDrag({ ...drag, dx: event.clientX - from.current.x, dy: event.clientY - from.current.y });
  };
  const up = () => {
    if (drag === null) return;
    if (isOff) change(withStageRemoved(bank, drag.at));
    else if (target !== drag.at) change(withStageMoved(bank, drag.at, target));
    setDrag(null);
  };
  const press = (key: string, at: number) => {
    if (key === 'ArrowLeft' && at > 0) change(withStageMoved(bank, at, at - 1));
    else if (key === 'ArrowRight' && at < stages.length - 1) change(withStageMoved(bank, at, at + 1));
    else if (key === 'Delete' || key === 'Backspace') change(withStageRemoved(bank, at));
    else if (key === '+') change(withStageAdded(bank));
    else return false;
    return true;
  };
  return (
    // biome-ignore lint/a11y/useSemanticElements: a drawing is no set of fields
    <svg
      width={width}
      height={HEIGHT}
      role="group"
      aria-label="Stages; arrow keys move one, Delete removes it, + adds one"
    >
      {stages.map((stage, at) => {
        const kvar = effective[at] ?? stage.ratedKvar;
        const held = drag?.at === at ? drag : null;
        return (
          <g
            key={at}
            className={held === null ? 'moved' : undefined}
            transform={`translate(${at * pitch + (held?.dx ?? 0)} ${held?.dy ?? 0})`}
            opacity={held !== null && isOff ? 0.35 : 1}
          >
            {/* biome-ignore lint/a11y/useSemanticElements: a part of a drawing can be no button element */}
            <g
              className="stage"
              role="button"
              tabIndex={0}
              aria-label={`Stage ${at + 1}, ${formatQuantity(kvar, 'kvar')}`}
              onPointerDown={(event) => down(event, at)}
              onPointerMove={move}
              onPointerUp={up}
              onKeyDown={(event) => {
                if (press(event.key, at)) event.preventDefault();
              }}
            >
              <StageBlock at={at} pitch={pitch} height={Math.max(26, (104 * kvar) / most)} />
            </g>
            <StageWords {...{ at, pitch, kvar }} rated={stage.ratedKvar} ratedV={stage.ratedV} />
          </g>
        );
      })}
      <path className="zero" d={`M0 ${FLOOR}H${width}`} />
    </svg>
  );
}

function StageBlock({ at, pitch, height }: { at: number; pitch: number; height: number }) {
  const wide = blockWidth(pitch);
  const top = FLOOR - height;
  return (
    <>
      <rect
        className={`stroke-bank ${at % 2 === 0 ? 'fill-wash' : 'fill-wash2'}`}
        x={0.6}
        y={top}
        width={wide}
        height={height}
      />
      {height < 44 ? null : <path className="stroke-bank" d={`M${wide / 2 - 7} ${top + 7}h14m-14 4h14m-14 4h14`} />}
    </>
  );
}

function blockWidth(pitch: number): number {
  return pitch - Math.min(12, pitch / 5);
}

function StageWords({
  at,
  pitch,
  kvar,
  rated,
  ratedV,
}: {
  at: number;
  pitch: number;
  kvar: number;
  rated: number;
  ratedV: number;
}) {
  const middle = blockWidth(pitch) / 2;
  return (
    <g style={{ pointerEvents: 'none' }}>
      {pitch < 34 ? null : (
        <text className="bank" fontWeight="600" x={middle} y={FLOOR - 6} textAnchor="middle">
          {formatNumber(kvar)}
        </text>
      )}
      <text className="strong" x={middle} y={FLOOR + 17} textAnchor="middle">
        {at + 1}
      </text>
      {pitch < 44 ? null : (
        <>
          <text className="axis" x={middle} y={FLOOR + 33} textAnchor="middle">
            {formatQuantity(rated, 'kvar', 'given')}
          </text>
          <text className="axis" x={middle} y={FLOOR + 48} textAnchor="middle">
            {formatQuantity(ratedV, 'V', 'given')}
          </text>
        </>
      )}
    </g>
  );
}

function figureOf(bank: BankInput, effective: readonly number[]): Figured {
  const stages = stagesOf(bank);
  const rows = stages.map((stage, at) => [
    String(at + 1),
    formatQuantity(stage.ratedKvar, 'kvar', 'given'),
    formatQuantity(stage.ratedV, 'V', 'given'),
    formatQuantity(stage.reactorPct ?? 0, '%', 'given'),
    effective[at] === undefined ? '–' : formatQuantity(effective[at], 'kvar'),
  ]);
  return {
    id: 'stages',
    finding: 'Stages as they stand',
    caption: 'Drag to reorder, drag off to remove. Height is effective kvar.',
    sentence: rows.map(([at, kvar, volt]) => `Stage ${at}: ${kvar} at ${volt}.`).join(' '),
    table: {
      columns: ['stage', 'rated', 'at', 'reactor', 'effective'].map((head) => ({ head, right: true })),
      rows,
    },
  };
}
