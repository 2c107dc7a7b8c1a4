import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { ListEntry } from '../field/list-entry.js';
import { monthAfter } from '../field/month-after.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';

const BILLS = 'estimate.bills';
const EQUIPMENT = 'estimate.equipment';

/** Bills and an equipment list, where there is no meter file. */
export function EstimateFields() {
  const { state } = useDesk();
  return (
    <>
      <p className="caption">
        {state.records.length === 0
          ? 'Without a meter file a bank can be estimated from monthly bills or from a list of equipment. Every figure is then called an estimate.'
          : 'Bills and list are not used while there is a meter record.'}
      </p>
      <Bills />
      <Equipment />
    </>
  );
}

function useList(path: string) {
  const { desk, state } = useDesk();
  const list = (valueAt(state.document, path) as Record<string, unknown>[] | undefined) ?? [];
  const put = (next: Record<string, unknown>[]) => desk.type(path, '', { value: next.length === 0 ? undefined : next });
  return { list, put };
}

function Bills() {
  const { list, put } = useList(BILLS);
  return (
    <section className="section" aria-labelledby="bills">
      <div className="plot-head">
        <h2 id="bills">Monthly bills</h2>
        <span className="ways">
          <button
            type="button"
            className="way"
            id={`field:${BILLS}`}
            onClick={() => put([...list, { month: monthAfter(list.at(-1)?.month) }])}
          >
            Add a bill
          </button>
        </span>
      </div>
      <p className="caption">Reactive energy or power factor, and the greatest demand in kW or kVA.</p>
      {list.map((_, at) => (
        <ListEntry key={at} name={`Bill ${at + 1}`} remove={() => put(list.toSpliced(at, 1))}>
          <TextField path={`${BILLS}[${at}].month`} label="month" />
          <QuantityField path={`${BILLS}[${at}].activeKwh`} label="active energy" unit="kWh" />
          <QuantityField path={`${BILLS}[${at}].laggingKvarh`} label="reactive energy" unit="kvarh" />
          <QuantityField path={`${BILLS}[${at}].powerFactor`} label="or power factor" />
          <QuantityField path={`${BILLS}[${at}].maxKw`} label="greatest demand" unit="kW" />
          <QuantityField path={`${BILLS}[${at}].maxKva`} label="or, in kVA" unit="kVA" />
        </ListEntry>
      ))}
    </section>
  );
}

function Equipment() {
  const { list, put } = useList(EQUIPMENT);
  return (
    <section className="section" aria-labelledby="equipment">
      <div className="plot-head">
        <h2 id="equipment">Equipment list</h2>
        <span className="ways">
          <button
            type="button"
            className="way"
            id={`field:${EQUIPMENT}`}
            onClick={() => put([...list, { name: `equipment ${list.length + 1}` }])}
          >
            Add equipment
          </button>
        </span>
      </div>
      <p className="caption">Efficiency and power factor at the load each runs at, as its data sheet has them.</p>
      {list.map((_, at) => (
        <ListEntry key={at} name={`Equipment ${at + 1}`} remove={() => put(list.toSpliced(at, 1))}>
          <TextField path={`${EQUIPMENT}[${at}].name`} label="name" />
          <QuantityField path={`${EQUIPMENT}[${at}].count`} label="number" otherwise="1" />
          <QuantityField path={`${EQUIPMENT}[${at}].ratedKw`} label="rated" unit="kW" />
          <QuantityField path={`${EQUIPMENT}[${at}].efficiencyPct`} label="efficiency" unit="%" />
          <QuantityField path={`${EQUIPMENT}[${at}].powerFactor`} label="power factor" />
          <QuantityField path={`${EQUIPMENT}[${at}].loadFactor`} label="load factor" otherwise="1, full load" />
          <QuantityField path={`${EQUIPMENT}[${at}].coincidence`} label="coincidence" otherwise="1, all together" />
        </ListEntry>
      ))}
    </section>
  );
}
