import type { Earthing } from '#libs/engine/index.js';
import { BankChoiceField, BankQuantityField } from '../bank/bank-part-fields.js';
import { bankOf } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';

const EARTHINGS = ['TN-S', 'TN-C', 'TN-C-S', 'TT', 'IT'] as const satisfies readonly Earthing[];
const FITTED = [
  [true, 'fitted'],
  [false, 'not fitted'],
] as const;

/** What the site has of each device: what stays empty stays open in the table above. */
export function FittedFields() {
  const { state } = useDesk();
  const bank = bankOf(state);
  if (bank === null) return null;
  return (
    <section className="section" aria-labelledby="fitted">
      <h2 id="fitted">What the site has</h2>
      <p className="caption">From plates and settings. What is left empty stays open, and counts nowhere.</p>
      {bank.stages.map((_, at) => (
        <GroupFields key={at} at={at} isOnly={bank.stages.length === 1} />
      ))}
      <BankFields />
      <PlaceFields />
    </section>
  );
}

function GroupFields({ at, isOnly }: { at: number; isOnly: boolean }) {
  const path = `bank.stages[${at}]`;
  return (
    <fieldset aria-label={isOnly ? 'Each stage' : `Each stage of group ${at + 1}`}>
      <h3 className="fitted-head">{isOnly ? 'Each stage' : `Each stage of group ${at + 1}`}</h3>
      <div className="fields">
        <BankQuantityField path={`${path}.switchKvar`} label="switch, for capacitors" unit="kvar" />
        <BankQuantityField path={`${path}.switchPeakA`} label="switch makes, peak" unit="A" />
        <BankQuantityField path={`${path}.fuseA`} label="fuse" unit="A" />
        <BankQuantityField path={`${path}.reactorMaxA`} label="reactor, thermal" unit="A" />
        <BankQuantityField path={`${path}.reactorLinearA`} label="reactor, linear up to" unit="A" />
        <BankQuantityField path={`${path}.dischargeOhm`} label="discharge resistor" unit="Ω" />
        <BankQuantityField path={`${path}.measuredUf`} label="measured, one phase" unit="µF" />
        <BankQuantityField path={`${path}.reactorQuality`} label="X/R of the reactor" otherwise="30, customary" />
      </div>
    </fieldset>
  );
}

function BankFields() {
  const device = 'bank.mainDevice';
  const protection = 'bank.protection';
  return (
    <fieldset aria-label="Upstream device and protection">
      <h3 className="fitted-head">Upstream device and protection</h3>
      <div className="fields">
        <BankQuantityField path={`${device}.ratedA`} label="rated" unit="A" />
        <BankQuantityField path={`${device}.settingA`} label="overload setting" unit="A" />
        <BankQuantityField path={`${device}.instantaneousA`} label="instantaneous" unit="A" />
        <BankQuantityField path={`${device}.breakingKa`} label="breaking capacity" unit="kA" />
        <BankQuantityField path={`${device}.withstandKa`} label="busbars, peak" unit="kA" />
        <BankQuantityField path={`${device}.shortTimeKa`} label="busbars, 1 s" unit="kA" />
        <BankQuantityField path="bank.conductorA" label="conductors carry" unit="A" />
        <BankQuantityField path="bank.interStageUh" label="between stages" unit="µH" otherwise="2, customary" />
        <BankChoiceField path={`${protection}.earthFault`} label="earth fault" choices={FITTED} />
        <BankChoiceField path={`${protection}.overTemperature`} label="over-temperature" choices={FITTED} />
        <BankChoiceField path={`${protection}.overPressure`} label="over-pressure" choices={FITTED} />
        <BankChoiceField path={`${protection}.undervoltage`} label="undervoltage" choices={FITTED} />
        <BankChoiceField
          path="bank.connection"
          label="capacitors in"
          choices={[
            ['delta', 'delta'],
            ['star', 'unearthed star'],
            ['earthedStar', 'earthed star'],
          ]}
        />
        <BankChoiceField
          path="bank.ambientCategory"
          label="ambient category"
          choices={[
            ['A', 'A'],
            ['B', 'B'],
            ['C', 'C'],
            ['D', 'D'],
          ]}
        />
      </div>
    </fieldset>
  );
}

function PlaceFields() {
  return (
    <fieldset aria-label="Place and current transformer">
      <h3 className="fitted-head">Place and current transformer</h3>
      <div className="fields">
        <QuantityField path="place.ambientMaxC" label="air, at the hottest" unit="°C" />
        <QuantityField path="place.altitudeM" label="altitude" unit="m" />
        <TextField path="place.enclosureIp" label="enclosure, as IP31" />
        <ChoiceField
          path="place.ventilation"
          label="ventilation"
          otherwise="not entered"
          choices={[
            ['none', 'none'],
            ['natural', 'natural'],
            ['forced', 'forced'],
          ]}
        />
        <QuantityField path="place.airFlowM3PerH" label="air, m³ an hour" />
        <ChoiceField
          path="supply.earthing"
          label="earthing of the supply"
          otherwise="not entered"
          choices={EARTHINGS.map((name) => [name, name] as const)}
        />
        <QuantityField path="control.currentTransformer.ratioPrimaryA" label="current transformer" unit="A" />
        <QuantityField path="control.currentTransformer.ratioSecondaryA" label="its secondary" unit="A" />
        <ChoiceField
          path="control.currentTransformer.place"
          label="it stands"
          otherwise="not entered"
          choices={[
            ['incomer', 'at the incomer'],
            ['load', 'where it sees the loads alone'],
            ['bank', 'where it sees the bank alone'],
          ]}
        />
        <QuantityField path="control.currentTransformer.sensitivityA" label="controller answers to" unit="A" />
      </div>
    </fieldset>
  );
}
