import type { Clause, TariffWindow } from '#libs/engine/index.js';
import { paperNamed } from '../desk/held-papers.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { ClauseSentence } from './clause-sentence.js';
import { ClauseTerms } from './clause-terms.js';
import { DayListField } from './day-list-field.js';
import { SharedPaper } from './shared-paper.js';
import { TariffWindows } from './tariff-windows.js';

const KINDS: Record<Clause['kind'], string> = {
  fixed: 'fixed amount',
  energy: 'energy',
  energyByFactor: 'energy by power factor',
  kvarhBeyondRatio: 'kvarh beyond a ratio',
  kvarBeyondRatio: 'kvar beyond a ratio',
  demand: 'demand',
  contractedDemand: 'contracted demand',
  percent: 'percentage of lines',
  formula: 'formula',
};

/** A clause of each kind to begin with. */
function starter(kind: Clause['kind'], name: string): Clause {
  const scale = { form: 'ratio' as const, reference: 0.9, belowPct: 100, abovePct: 0 };
  switch (kind) {
    case 'fixed':
      return { name, kind, amountPerMonth: 0 };
    case 'energy':
      return { name, kind, pricePerUnit: 0 };
    case 'energyByFactor':
      return { name, kind, pricePerUnit: 0, scale };
    case 'kvarhBeyondRatio':
      return { name, kind, freeRatio: 0.33, pricePerUnit: 0 };
    case 'kvarBeyondRatio':
      return { name, kind, ratio: 0.33, pricePerUnit: 0 };
    case 'demand':
      return { name, kind, basis: 'kVA', pricePerUnit: 0 };
    case 'contractedDemand':
      return { name, kind, basis: 'kW', contracted: 0, pricePerUnit: 0, overrunPricePerUnit: 0 };
    case 'percent':
      return { name, kind, applies: 'all', scale };
    case 'formula':
      return { name, kind, expression: '0' };
  }
}

/** The tariff: the site's own, what holds for the whole bill and each clause as a sentence, or a shared one. */
export function TariffFields({ currency }: { currency: string }) {
  const { state } = useDesk();
  const isShared = paperNamed(state.document, 'tariff') !== undefined;
  return (
    <section className="section" aria-labelledby="tariff">
      <div className="plot-head">
        <h2 id="tariff">{isShared ? 'The tariff, shared' : 'The tariff, clause by clause'}</h2>
        {isShared ? null : (
          <span className="ways">
            <AddClause />
          </span>
        )}
      </div>
      <p className="caption">Each clause is one line of the bill, in this order. Fill in what the contract says.</p>
      <div className="fields">
        <TextField path="currency" label="currency, as EUR" />
      </div>
      <SharedPaper kind="tariff">
        <OwnTariff currency={currency} />
      </SharedPaper>
    </section>
  );
}

const CLAUSES = 'tariff.clauses';

function useClauses() {
  const { desk, state } = useDesk();
  const clauses = (valueAt(state.document, CLAUSES) as Clause[] | undefined) ?? [];
  const put = (next: Clause[]) => desk.type(CLAUSES, '', { value: next.length === 0 ? undefined : next });
  return { clauses, put };
}

function AddClause() {
  const { clauses, put } = useClauses();
  const names = new Set(clauses.map(({ name }) => name));
  let number = clauses.length + 1;
  while (names.has(`clause ${number}`)) number++;
  return (
    <button
      type="button"
      className="way"
      id={`field:${CLAUSES}`}
      onClick={() => put([...clauses, starter('energy', `clause ${number}`)])}
    >
      Add a clause
    </button>
  );
}

function OwnTariff({ currency }: { currency: string }) {
  const { clauses } = useClauses();
  return (
    <>
      <div className="fields">
        <TextField path="tariff.name" label="name of the tariff" isWide />
        <QuantityField path="tariff.taxPct" label="tax" unit="%" otherwise="none" />
        <QuantityField path="tariff.decimals" label="lines rounded to" otherwise="2 decimals" />
        <QuantityField path="tariff.demandS" label="demand blocks of" unit="s" otherwise="the record’s" />
      </div>
      <FactorSentence />
      <TariffWindows />
      <div className="sentence">
        <span>Holidays, on which day 8 holds instead of the weekday:</span>
        <DayListField path="tariff.holidays" label="days, as 2025-12-25" />
      </div>
      {clauses.map((clause, at) => (
        <ClauseFields key={at} at={at} clause={clause} currency={currency} />
      ))}
    </>
  );
}

function ClauseFields({ at, clause, currency }: { at: number; clause: Clause; currency: string }) {
  const { state } = useDesk();
  const { clauses, put } = useClauses();
  const path = `${CLAUSES}[${at}]`;
  return (
    <fieldset className="clause" aria-label={`Clause ${clause.name}`}>
      <div className="fields">
        <TextField path={`${path}.name`} label={`clause ${at + 1}`} />
        <FieldFrame path={`${path}.kind`} label="kind" refusal={refusalOf(state.problems, path)}>
          <select
            id={`field:${path}.kind`}
            value={clause.kind}
            onChange={({ target }) => put(clauses.with(at, starter(target.value as Clause['kind'], clause.name)))}
          >
            {Object.entries(KINDS).map(([kind, words]) => (
              <option key={kind} value={kind}>
                {words}
              </option>
            ))}
          </select>
        </FieldFrame>
        <p className="row">
          <button type="button" className="way" onClick={() => put(clauses.toSpliced(at, 1))}>
            Remove<span className="hidden"> {clause.name}</span>
          </button>
        </p>
      </div>
      <ClauseSentence path={path} currency={currency} />
      <ClauseWindows path={path} clause={clause} />
      <ClauseTerms path={path} clause={clause} />
    </fieldset>
  );
}

/** From which energies and with which rounding the tariff takes its power factor. */
function FactorSentence() {
  return (
    <div className="sentence">
      <span>The power factor is that of</span>
      <ChoiceField
        path="tariff.factor.basis"
        label="formed from"
        otherwise="the energies"
        choices={[
          ['atMaxKw', 'the block of greatest kW'],
          ['maxima', 'greatest kW over kVA'],
        ]}
      />
      <span>with</span>
      <ChoiceField
        path="tariff.factor.reactive"
        label="which kvarh"
        otherwise="lagging"
        choices={[
          ['leading', 'leading'],
          ['both', 'both, added'],
          ['net', 'lagging less leading'],
        ]}
      />
      <span>rounded to</span>
      <QuantityField path="tariff.factor.decimals" label="decimals" otherwise="not rounded" />
    </div>
  );
}

/** Which windows a clause looks at; none ticked is all the time. */
function ClauseWindows({ path, clause }: { path: string; clause: Clause }) {
  const { desk, state } = useDesk();
  const windows = (valueAt(state.document, 'tariff.windows') as TariffWindow[] | undefined) ?? [];
  if (windows.length === 0 || 'prices' in clause) return null;
  const chosen = clause.windows ?? [];
  const put = (next: string[]) => desk.type(`${path}.windows`, '', { value: next.length === 0 ? undefined : next });
  return (
    <p className="row windows">
      <span className="soft">{chosen.length === 0 ? 'At all times, or only in' : 'Only in'}</span>
      {windows.map(({ name }) => (
        <label key={name} className="tick">
          <input
            type="checkbox"
            checked={chosen.includes(name)}
            onChange={({ target }) =>
              put(target.checked ? [...chosen, name] : chosen.filter((other) => other !== name))
            }
          />
          {name}
        </label>
      ))}
    </p>
  );
}
