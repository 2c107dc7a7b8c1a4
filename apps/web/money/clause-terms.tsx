import { useState } from 'react';
import type { Clause } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { QuantityField } from '../field/quantity-field.js';
import { NumberListField } from './number-list-field.js';

/** What a clause may say besides its price: its months, its period, tax, rounding and what earlier months leave behind. */
export function ClauseTerms({ path, clause }: { path: string; clause: Clause }) {
  const isBilled = clause.kind === 'demand' || clause.kind === 'kvarBeyondRatio';
  const [isOpen] = useState(() => termsOf(clause).length > 0);
  return (
    <details className="terms" open={isOpen}>
      <summary className="way">
        {isBilled ? 'Months, period, tax, ratchet' : 'Months, period, tax'}
        <span className="hidden"> of {clause.name}</span>
      </summary>
      <div className="sentence">
        <span>Billed in the months</span>
        <NumberListField path={`${path}.months`} label="months" most={12} />
        {clause.kind === 'contractedDemand' ? null : (
          <>
            <span>formed for each</span>
            <ChoiceField
              path={`${path}.per`}
              label="period"
              otherwise="month"
              choices={[
                ['day', 'day'],
                ['hour', 'hour'],
                ['interval', 'interval'],
              ]}
            />
          </>
        )}
        <span>and</span>
        <TaxedField path={path} clause={clause} />
      </div>
      {isBilled ? <BilledQuantity path={path} clause={clause} /> : null}
    </details>
  );
}

function termsOf(clause: Clause): unknown[] {
  const { months, per, taxed } = clause as { months?: unknown; per?: unknown; taxed?: unknown };
  const { ratchet, wholeUnits } = clause as { ratchet?: unknown; wholeUnits?: unknown };
  return [months, per, taxed, ratchet, wholeUnits].filter((term) => term !== undefined);
}

function TaxedField({ path, clause }: { path: string; clause: Clause }) {
  const { desk } = useDesk();
  return (
    <label className="tick">
      <input
        id={`field:${path}.taxed`}
        type="checkbox"
        checked={clause.taxed !== false}
        onChange={({ target }) => desk.type(`${path}.taxed`, '', { value: target.checked ? undefined : false })}
      />
      taxed
    </label>
  );
}

/** How the quantity that is billed comes from the month's own. */
function BilledQuantity({ path, clause }: { path: string; clause: Extract<Clause, { ratchet?: unknown }> }) {
  const { desk } = useDesk();
  const ratchet = `${path}.ratchet`;
  const put = (value: unknown) => desk.type(ratchet, '', { value });
  return (
    <div className="sentence">
      <span>The month’s own quantity is taken</span>
      <ChoiceField
        path={`${path}.wholeUnits`}
        label="in whole units"
        otherwise="as it is"
        choices={[
          ['up', 'rounded up'],
          ['down', 'rounded down'],
          ['nearest', 'to the nearest'],
        ]}
      />
      {clause.ratchet === undefined ? (
        <button type="button" className="way" onClick={() => put({ pct: 80, months: 11 })}>
          Add a ratchet<span className="hidden"> to {clause.name}</span>
        </button>
      ) : (
        <>
          <span>and is never less than</span>
          <QuantityField path={`${ratchet}.pct`} label="share" unit="%" />
          <span>of the greatest of</span>
          <QuantityField path={`${ratchet}.months`} label="months before" />
          <span>that lie in</span>
          <NumberListField path={`${ratchet}.of`} label="calendar months" most={12} />
          <button type="button" className="way" onClick={() => put(undefined)}>
            Remove the ratchet<span className="hidden"> of {clause.name}</span>
          </button>
        </>
      )}
    </div>
  );
}
