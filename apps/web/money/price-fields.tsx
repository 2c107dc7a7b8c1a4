import type { PriceBook } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { RowFields } from './row-fields.js';

/** What a bank costs to build and to run, and how money over the years is reckoned. */
export function PriceFields({ currency }: { currency: string }) {
  const { state } = useDesk();
  const isInvented = valueAt(state.document, 'prices.invented') === true;
  return (
    <>
      <section className="section" aria-labelledby="prices">
        <h2 id="prices">{isInvented ? 'The price book, invented' : 'The price book'}</h2>
        <p className="caption">
          {`In ${currency}; kvar are rated kvar. What is left empty costs nothing.`}
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

function Switches() {
  const { state } = useDesk();
  const switches = (valueAt(state.document, 'prices.switches') as PriceBook['switches']) ?? [];
  return switches.map(({ kind }, at) => (
    <fieldset key={at} className="sentence" aria-label={`Switch ${kind}`}>
      <TextField path={`prices.switches[${at}].kind`} label="switch" />
      <QuantityField path={`prices.switches[${at}].perStage`} label="each stage" />
      <QuantityField path={`prices.switches[${at}].perKvar`} label="per kvar" />
      <QuantityField path={`prices.switches[${at}].lifeSwitchings`} label="lasts, switchings" otherwise="for ever" />
    </fieldset>
  ));
}

function Cabinets() {
  const { state } = useDesk();
  const cabinets = (valueAt(state.document, 'prices.cabinets') as PriceBook['cabinets']) ?? [];
  return cabinets.map(({ name }, at) => (
    <fieldset key={at} className="sentence" aria-label={`Cabinet ${name}`}>
      <TextField path={`prices.cabinets[${at}].name`} label="cabinet" />
      <QuantityField path={`prices.cabinets[${at}].price`} label="price" />
    </fieldset>
  ));
}
