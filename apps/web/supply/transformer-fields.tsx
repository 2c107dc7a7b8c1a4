import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { ListEntry } from '../field/list-entry.js';
import { QuantityField } from '../field/quantity-field.js';

/** Nameplates of the transformers, and where the meter stands. */
export function TransformerFields({ count }: { count: number }) {
  const { desk, state } = useDesk();
  const list = (valueAt(state.document, 'supply.transformers') as unknown[] | undefined) ?? [];
  const put = (transformers: unknown[]) =>
    desk.type('supply.transformers', '', { value: transformers.length === 0 ? undefined : transformers });
  return (
    <section className="section" aria-labelledby="transformers">
      <div className="plot-head">
        <h2 id="transformers">{count === 1 ? 'Transformer' : 'Transformers'}</h2>
        <span className="ways">
          <button type="button" className="way" onClick={() => put([...list, { ratedKva: 1000, impedancePct: 6 }])}>
            Add a transformer
          </button>
        </span>
      </div>
      {list.map((_, at) => (
        <ListEntry key={at} name={`Transformer ${at + 1}`} remove={() => put(list.toSpliced(at, 1))}>
          <QuantityField path={`supply.transformers[${at}].ratedKva`} label="rated" unit="kVA" />
          <QuantityField path={`supply.transformers[${at}].impedancePct`} label="impedance" unit="%" />
          <QuantityField
            path={`supply.transformers[${at}].impedanceTolerancePct`}
            label="its tolerance"
            unit="%"
            otherwise="10, assumed"
          />
          <QuantityField
            path={`supply.transformers[${at}].loadLossKw`}
            label="load loss"
            unit="kW"
            otherwise="0, assumed"
          />
          <QuantityField
            path={`supply.transformers[${at}].noLoadLossKw`}
            label="no-load loss"
            unit="kW"
            otherwise="0, assumed"
          />
          <QuantityField
            path={`supply.transformers[${at}].noLoadCurrentPct`}
            label="no-load current"
            unit="%"
            otherwise="0, assumed"
          />
        </ListEntry>
      ))}
      <div className="fields">
        <ChoiceField
          path="meteredAt"
          label="the meter stands"
          choices={[
            ['bus', 'at the bus'],
            ['primary', 'at the primary'],
          ]}
        />
        {count > 1 ? (
          <ChoiceField
            path="supply.arrangement"
            label="the transformers run"
            choices={[
              ['parallel', 'in parallel'],
              ['separate', 'apart'],
            ]}
          />
        ) : null}
      </div>
    </section>
  );
}
