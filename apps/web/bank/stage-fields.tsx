import { useState } from 'react';
import type { BankInput, StageGroupInput } from '#libs/engine/index.js';
import { formatNumber } from '#libs/present/format-number.js';
import { bankOf } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';
import { readTyped } from '../field/read-typed.js';

type Part = 'count' | 'ratedKvar' | 'ratedV' | 'reactorPct';
const PARTS: { part: Part; label: string; unit: string; step: number }[] = [
  { part: 'count', label: 'stages alike', unit: '', step: 1 },
  { part: 'ratedKvar', label: 'rated', unit: 'kvar', step: 2.5 },
  { part: 'ratedV', label: 'at', unit: 'V', step: 5 },
  { part: 'reactorPct', label: 'reactor ratio', unit: '%', step: 0.5 },
];

/** The groups of equal stages as fields; the year is run again while one types or steps with the arrow keys. */
export function StageFields() {
  const { desk, state } = useDesk();
  const bank = bankOf(state);
  if (bank === null) return null;
  const change = (at: number, group: StageGroupInput | null) => {
    const stages = group === null ? bank.stages.toSpliced(at, 1) : bank.stages.with(at, group);
    desk.tryBank(stages.length === 0 ? null : { ...bank, stages });
  };
  return (
    <section className="section" aria-labelledby="groups">
      <div className="plot-head">
        <h2 id="groups">Groups of equal stages</h2>
        <span className="caption">The year is run again while you type; arrow keys step.</span>
      </div>
      {bank.stages.map((group, at) => (
        <fieldset key={at} aria-label={`Group ${at + 1}`}>
          <div className="fields">
            {PARTS.map((one) => (
              <GroupField key={one.part} {...one} at={at} group={group} change={change} />
            ))}
            <p className="row">
              <button
                type="button"
                className="way"
                disabled={bank.stages.length === 1}
                onClick={() => change(at, null)}
              >
                Remove the group
              </button>
            </p>
          </div>
        </fieldset>
      ))}
      <p className="row gap">
        <button type="button" className="way" onClick={() => desk.tryBank(withGroup(bank))}>
          Add a group
        </button>
      </p>
    </section>
  );
}

function withGroup(bank: BankInput): BankInput {
  return { ...bank, stages: [...bank.stages, { ...bank.stages.at(-1)!, count: 1 }] };
}

function GroupField({
  part,
  label,
  unit,
  step,
  at,
  group,
  change,
}: (typeof PARTS)[number] & {
  at: number;
  group: StageGroupInput;
  change: (at: number, group: StageGroupInput) => void;
}) {
  const { state } = useDesk();
  const [text, setText] = useState<string | null>(null);
  const path = `bank.stages[${at}].${part}`;
  const value = group[part] ?? 0;
  const shown = text ?? formatNumber(value, 'working').replaceAll('\u00a0', ' ');
  const read = readTyped(shown, unit);
  const fault = 'fault' in read ? read.fault : null;
  const take = (next: number) =>
    change(at, { ...group, [part]: part === 'count' ? Math.max(1, Math.round(next)) : next });
  const type = (typed: string) => {
    setText(typed);
    const now = readTyped(typed, unit);
    if ('value' in now && now.value >= 0) take(now.value);
  };
  const stepBy = (steps: number) => {
    setText(null);
    take(Math.max(part === 'reactorPct' ? 0 : step, value + steps * step));
  };
  return (
    <FieldFrame
      path={path}
      label={label}
      unit={unit}
      echo={'echo' in read ? read.echo : null}
      refusal={fault ?? refusalOf(state.problems, path)}
    >
      <input
        id={`field:${path}`}
        value={shown}
        inputMode="decimal"
        autoComplete="off"
        onChange={({ target }) => type(target.value)}
        onBlur={() => setText(null)}
        onKeyDown={(event) => {
          if (event.key !== 'ArrowUp' && event.key !== 'ArrowDown') return;
          event.preventDefault();
          stepBy(event.key === 'ArrowUp' ? 1 : -1);
        }}
      />
    </FieldFrame>
  );
}
