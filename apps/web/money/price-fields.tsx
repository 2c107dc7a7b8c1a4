import type { PriceBook } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { RowFields } from './row-fields.js';
import { SharedPaper } from './shared-paper.js';

/** What a bank costs to build and to run, and how money over the years is reckoned. */
export function PriceFields({ currency }: { currency: string }) {
  const { state } = useDesk();
  const isInvented = valueAt(state.document, 'prices.invented') === true;
  return (
    <>
      <section className="section" aria-labelledby="prices">
        <h2 id="prices">{isInvented ? 'The price book, invented' : 'The price book'}</h2>
        <SharedPaper kind="prices">
          <OwnPrices currency={currency} isInvented={isInvented} />
        </SharedPaper>
      </section>
      <section className="section" aria-labelledby="finance">
        <h2 id="finance">Money over the years</h2>
        <div className="fields">
          <QuantityField path="finance.discountPct" label="discounted a year at" unit="%" otherwise="8, taken" />
          <QuantityField path="finance.horizonYears" label="looked ahead" unit="years" otherwise="10, taken" />
          <QuantityField path="finance.billGrowthPct" label="bills grow a year by" unit="%" otherwise="0, taken" />
          <QuantityField path="finance.costGrowthPct" label="costs grow a year by" unit="%" otherwise="0, taken" />
        </div>
      </section>
    </>
  );
}

function OwnPrices({ currency, isInvented }: { currency: string; isInvented: boolean }) {
  return (
    <>
      <p className="caption">
        {`${currency === 'amount' ? 'Amounts without a currency' : `In ${currency}`}; kvar are rated kvar. What is left empty costs nothing.`}
        {isInvented ? ' These prices are made up: put real ones in before anything is decided.' : ''}
      </p>
      <div className="fields">
        <TextField path="prices.name" label="name of the price book" isWide />
        <TextField path="prices.validFrom" label="valid from, 2026-01-31" />
        <TextField path="prices.validTo" label="until" />
        <Invented />
        <QuantityField path="prices.perKvar" label="capacitors, per kvar" />
        <QuantityField path="prices.perStage" label="each stage" />
        <QuantityField path="prices.installationFixed" label="installation" />
        <QuantityField path="prices.installationPerKvar" label="installation, per kvar" />
        <QuantityField path="prices.fixed" label="controller, engineering" />
        <QuantityField path="prices.contingencyPct" label="contingency" unit="%" />
        <QuantityField path="prices.maintenancePerYear" label="maintenance a year" />
        <QuantityField path="prices.maintenancePerStage" label="of each stage a year" />
        <QuantityField path="prices.lossWPerKvar.plain" label="loss, plain stage" unit="W/kvar" />
        <QuantityField path="prices.lossWPerKvar.reactor" label="loss, with reactor" unit="W/kvar" />
        <QuantityField path="prices.lossPricePerKwh" label="losses, per kWh" />
        <QuantityField path="prices.capacitorLifeYears" label="capacitors last" unit="years" otherwise="for ever" />
        <QuantityField path="prices.replacementFactor" label="replacing, over new" otherwise="1, taken" />
      </div>
      <RowFields
        path="prices.reactors"
        row="reactor price"
        starter={{ reactorPct: 7, perKvar: 0 }}
        columns={[
          { key: 'reactorPct', label: 'reactors of', unit: '%' },
          { key: 'perKvar', label: 'per kvar' },
        ]}
      />
      <Switches />
      <Cabinets />
    </>
  );
}

function Invented() {
  const { desk, state } = useDesk();
  const path = 'prices.invented';
  return (
    <label className="tick">
      <input
        id={`field:${path}`}
        type="checkbox"
        checked={valueAt(state.document, path) === true}
        onChange={({ target }) => desk.type(path, '', { value: target.checked ? true : undefined })}
      />
      invented
    </label>
  );
}

function useEntries<T>(path: string) {
  const { desk, state } = useDesk();
  const list = (valueAt(state.document, path) as T[] | undefined) ?? [];
  const put = (next: T[]) => desk.type(path, '', { value: next.length === 0 ? undefined : next });
  return { list, put };
}

function Switches() {
  const path = 'prices.switches';
  const { list, put } = useEntries<NonNullable<PriceBook['switches']>[number]>(path);
  return (
    <>
      {list.map(({ kind }, at) => (
        <fieldset key={at} className="sentence" aria-label={`Switch ${kind}`}>
          <TextField path={`${path}[${at}].kind`} label="switch" />
          <QuantityField path={`${path}[${at}].perStage`} label="each stage" />
          <QuantityField path={`${path}[${at}].perKvar`} label="per kvar" />
          <QuantityField path={`${path}[${at}].lifeSwitchings`} label="lasts, switchings" otherwise="for ever" />
          <button type="button" className="way" onClick={() => put(list.toSpliced(at, 1))}>
            Remove<span className="hidden"> {kind}</span>
          </button>
        </fieldset>
      ))}
      <p className="row">
        <button
          type="button"
          className="way"
          id={`field:${path}`}
          onClick={() => put([...list, { kind: `switch ${list.length + 1}` }])}
        >
          Add a kind of switch
        </button>
      </p>
    </>
  );
}

function Cabinets() {
  const path = 'prices.cabinets';
  const { list, put } = useEntries<NonNullable<PriceBook['cabinets']>[number]>(path);
  return (
    <>
      {list.map(({ name }, at) => (
        <fieldset key={at} className="sentence" aria-label={`Cabinet ${name}`}>
          <TextField path={`${path}[${at}].name`} label="cabinet" />
          <QuantityField path={`${path}[${at}].price`} label="price" />
          <button type="button" className="way" onClick={() => put(list.toSpliced(at, 1))}>
            Remove<span className="hidden"> {name}</span>
          </button>
        </fieldset>
      ))}
      <p className="row">
        <button
          type="button"
          className="way"
          id={`field:${path}`}
          onClick={() => put([...list, { name: `cabinet ${list.length + 1}`, price: 0 }])}
        >
          Add a cabinet
        </button>
      </p>
    </>
  );
}
