import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { RowFields } from '../money/row-fields.js';

const PATH = 'loads.measured';

/** A reading of harmonics at the bus: it checks the model and is never added to its sources. */
export function MeasuredFields() {
  const { desk, state } = useDesk();
  const measured = valueAt(state.document, PATH);
  return (
    <section className="section" aria-labelledby="measured-fields">
      <div className="plot-head">
        <h2 id="measured-fields">A measurement, to check the model</h2>
        <span className="ways">
          {measured === undefined ? (
            <button
              type="button"
              className="way"
              id={`field:${PATH}`}
              onClick={() => desk.type(PATH, '', { value: { bankKvar: 0, voltagePct: [{ orderH: 5, pct: 0 }] } })}
            >
              Enter a measurement
            </button>
          ) : (
            <button type="button" className="way" onClick={() => desk.type(PATH, '', { value: undefined })}>
              Remove the measurement
            </button>
          )}
        </span>
      </div>
      <p className="caption">
        {measured === undefined
          ? 'What an instrument read at the bus, with the kvar connected then; compared at the network.'
          : 'Compared at the network with the level of the same kvar.'}
      </p>
      {measured === undefined ? null : (
        <>
          <div className="fields">
            <QuantityField path={`${PATH}.bankKvar`} label="connected then" unit="kvar" />
            <QuantityField path={`${PATH}.loadKw`} label="load then" unit="kW" />
            <TextField path={`${PATH}.date`} label="day, as 2026-01-31" />
          </div>
          <RowFields
            path={`${PATH}.voltagePct`}
            row="voltage reading"
            starter={{ orderH: 7, pct: 0 }}
            columns={[
              { key: 'orderH', label: 'order' },
              { key: 'pct', label: 'voltage', unit: '%' },
            ]}
          />
          <RowFields
            path={`${PATH}.currentA`}
            row="current reading"
            starter={{ orderH: 5, a: 0 }}
            columns={[
              { key: 'orderH', label: 'order' },
              { key: 'a', label: 'current of the supply', unit: 'A' },
            ]}
          />
        </>
      )}
    </section>
  );
}
