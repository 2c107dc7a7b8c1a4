import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { monthAfter } from '../field/month-after.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';

const PATH = 'tariff.billed';

/** Bills that were really paid: the reckoned ones are held against them. */
export function BilledFields({ currency }: { currency: string }) {
  const { desk, state } = useDesk();
  const list = (valueAt(state.document, PATH) as { month?: string; total?: number }[] | undefined) ?? [];
  const put = (next: object[]) => desk.type(PATH, '', { value: next.length === 0 ? undefined : next });
  return (
    <section className="section" aria-labelledby="billed">
      <div className="plot-head">
        <h2 id="billed">Bills that were paid</h2>
        <span className="ways">
          <button
            type="button"
            className="way"
            id={`field:${PATH}`}
            onClick={() => put([...list, { month: monthAfter(list.at(-1)?.month) }])}
          >
            Add a bill that was paid
          </button>
        </span>
      </div>
      <p className="caption">
        A tariff that gives what was really billed is the right one; each month tells the difference.
      </p>
      {list.map((_, at) => (
        <fieldset key={at} className="sentence" aria-label={`Bill ${at + 1}`}>
          <span>For</span>
          <TextField path={`${PATH}[${at}].month`} label="month, as 2025-01" />
          <span>the bill was</span>
          <QuantityField path={`${PATH}[${at}].total`} label={currency} />
          <button type="button" className="way" onClick={() => put(list.toSpliced(at, 1))}>
            Remove<span className="hidden"> bill {at + 1}</span>
          </button>
        </fieldset>
      ))}
    </section>
  );
}
