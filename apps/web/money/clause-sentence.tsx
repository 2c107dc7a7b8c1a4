import type { Clause } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { PriceByWindow } from './price-by-window.js';
import { RowFields } from './row-fields.js';
import { ScaleFields } from './scale-fields.js';

interface Placed {
  path: string;
  currency: string;
}

/** What one clause says, as a sentence with its numbers to fill in. */
export function ClauseSentence({ path, currency }: Placed) {
  const { state } = useDesk();
  const clause = valueAt(state.document, path) as Clause;
  const placed = { path, currency };
  switch (clause.kind) {
    case 'fixed':
      return (
        <div className="sentence">
          <span>A month costs</span>
          <QuantityField path={`${path}.amountPerMonth`} label={currency} />
          <span>whatever is used.</span>
        </div>
      );
    case 'energy':
      return <EnergySentence {...placed} clause={clause} />;
    case 'energyByFactor':
      return (
        <>
          <div className="sentence">
            <span>Each kWh is charged a percentage of</span>
            <QuantityField path={`${path}.pricePerUnit`} label={`${currency} per kWh`} />
          </div>
          <ScaleFields path={`${path}.scale`} />
        </>
      );
    case 'kvarhBeyondRatio':
      return <KvarhSentence {...placed} clause={clause} />;
    case 'kvarBeyondRatio':
      return (
        <div className="sentence">
          <span>The greatest kvar beyond</span>
          <QuantityField path={`${path}.ratio`} label="kvar per kW" />
          <span>of the greatest kW cost</span>
          <QuantityField path={`${path}.pricePerUnit`} label={`${currency} per kvar`} />
          <span>a month.</span>
        </div>
      );
    case 'demand':
      return <DemandSentence {...placed} clause={clause} />;
    case 'contractedDemand':
      return <ContractSentence {...placed} clause={clause} />;
    case 'percent':
      return (
        <>
          <div className="sentence">
            <span>
              A percentage of {clause.applies === 'all' ? 'all earlier lines' : clause.applies.join(', ')} is added.
            </span>
          </div>
          <ScaleFields path={`${path}.scale`} />
        </>
      );
    case 'formula':
      return (
        <div className="sentence formula">
          <span>A month costs</span>
          <TextField path={`${path}.expression`} label={`${currency}, worked out from the month’s quantities`} isWide />
        </div>
      );
  }
}

function EnergySentence({ path, currency, clause }: Placed & { clause: Extract<Clause, { kind: 'energy' }> }) {
  const unit = clause.of ?? 'kWh';
  return (
    <>
      <div className="sentence">
        <span>Each</span>
        <ChoiceField
          path={`${path}.of`}
          label="unit"
          otherwise="kWh"
          choices={[
            ['kWh', 'kWh'],
            ['kVAh', 'kVAh'],
          ]}
        />
        <span>costs</span>
        {clause.blocks === undefined ? (
          <PriceByWindow path={path} unit={`${currency} per ${unit}`} />
        ) : (
          <span>by blocks of the month:</span>
        )}
      </div>
      {clause.blocks === undefined ? null : (
        <RowFields
          path={`${path}.blocks`}
          row="block"
          starter={{ upTo: null, pricePerUnit: 0.1 }}
          columns={[
            { key: 'upTo', label: `up to, ${unit}`, otherwise: 'the rest' },
            { key: 'pricePerUnit', label: `${currency} per ${unit}` },
          ]}
        />
      )}
    </>
  );
}

function KvarhSentence({ path, currency, clause }: Placed & { clause: Extract<Clause, { kind: 'kvarhBeyondRatio' }> }) {
  const side = (
    <ChoiceField
      path={`${path}.reactive`}
      label="which kvarh"
      otherwise="lagging"
      choices={[
        ['leading', 'leading'],
        ['both', 'both, added'],
        ['net', 'lagging less leading'],
      ]}
    />
  );
  if (clause.tiers === undefined) {
    return (
      <div className="sentence">
        <span>Reactive energy,</span>
        {side}
        <span>beyond</span>
        <QuantityField path={`${path}.freeRatio`} label="kvarh per kWh" />
        <span>of the active costs</span>
        <QuantityField path={`${path}.pricePerUnit`} label={`${currency} per kvarh`} />
      </div>
    );
  }
  return (
    <>
      <div className="sentence">
        <span>Reactive energy,</span>
        {side}
        <span>costs more the further it goes beyond the active:</span>
      </div>
      <RowFields
        path={`${path}.tiers`}
        row="tier"
        starter={{ aboveRatio: 0.75, pricePerUnit: 0.02 }}
        columns={[
          { key: 'aboveRatio', label: 'above, kvarh per kWh' },
          { key: 'pricePerUnit', label: `${currency} per kvarh` },
        ]}
      />
    </>
  );
}

function DemandSentence({ path, currency, clause }: Placed & { clause: Extract<Clause, { kind: 'demand' }> }) {
  const unit = clause.basis === 'kVA' ? 'kVA' : 'kW';
  return (
    <>
      <div className="sentence">
        <span>The greatest</span>
        <ChoiceField
          path={`${path}.basis`}
          label="demand"
          choices={[
            ['kW', 'kW'],
            ['kVA', 'kVA'],
            ['kWOrKvaShare', 'kW, or a share of kVA'],
          ]}
        />
        {clause.basis === 'kWOrKvaShare' ? <QuantityField path={`${path}.kvaShare`} label="share of kVA" /> : null}
        <span>of the month costs</span>
        <PriceByWindow path={path} unit={`${currency} per ${unit}`} />
        <span>and is billed for at least</span>
        <QuantityField path={`${path}.minimum`} label={unit} otherwise="no least" />
      </div>
      {clause.scale === undefined ? null : <ScaleFields path={`${path}.scale`} />}
    </>
  );
}

function ContractSentence({
  path,
  currency,
  clause,
}: Placed & { clause: Extract<Clause, { kind: 'contractedDemand' }> }) {
  const unit = clause.basis === 'kVA' ? 'kVA' : 'kW';
  return (
    <div className="sentence">
      <span>A contracted demand of</span>
      <QuantityField path={`${path}.contracted`} label={unit} />
      <ChoiceField
        path={`${path}.basis`}
        label="measured in"
        choices={[
          ['kW', 'kW'],
          ['kVA', 'kVA'],
          ['kWOrKvaShare', 'kW, or a share of kVA'],
        ]}
      />
      {clause.basis === 'kWOrKvaShare' ? <QuantityField path={`${path}.kvaShare`} label="share of kVA" /> : null}
      <span>costs</span>
      <QuantityField path={`${path}.pricePerUnit`} label={`${currency} per ${unit}`} />
      <span>a month, and what is drawn beyond it by more than</span>
      <QuantityField path={`${path}.tolerancePct`} label="tolerance" unit="%" otherwise="0" />
      <span>costs</span>
      <QuantityField path={`${path}.overrunPricePerUnit`} label={`${currency} per ${unit} of overrun`} />
    </div>
  );
}
