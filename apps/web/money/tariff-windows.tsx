import type { TariffWindow } from '#libs/engine/index.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { NumberListField } from './number-list-field.js';

const PATH = 'tariff.windows';

/** Named parts of the year by the local clock, weekday and month. */
export function TariffWindows() {
  const { desk, state } = useDesk();
  const windows = (valueAt(state.document, PATH) as TariffWindow[] | undefined) ?? [];
  const put = (next: TariffWindow[]) => desk.type(PATH, '', { value: next.length === 0 ? undefined : next });
  const another = (): TariffWindow => ({ name: `window${windows.length + 1}`, hours: [[8, 20]] });
  return (
    <>
      {windows.map(({ name, hours }, at) => (
        <fieldset key={at} className="sentence" aria-label={`Window ${name}`}>
          <span>The window</span>
          <TextField path={`${PATH}[${at}].name`} label="name" />
          <span>is</span>
          {(hours ?? []).map((_, k) => (
            <span key={k} className="sentence">
              <QuantityField path={`${PATH}[${at}].hours[${k}][0]`} label="from, hour" />
              <QuantityField path={`${PATH}[${at}].hours[${k}][1]`} label="to, hour" />
            </span>
          ))}
          <NumberListField path={`${PATH}[${at}].days`} label="days, 1 Monday" most={8} />
          <NumberListField path={`${PATH}[${at}].months`} label="months" most={12} />
          <button type="button" className="way" onClick={() => put(windows.toSpliced(at, 1))}>
            Remove<span className="hidden"> {name}</span>
          </button>
        </fieldset>
      ))}
      <p className="row">
        <button type="button" className="way" id={`field:${PATH}`} onClick={() => put([...windows, another()])}>
          Add a window of time
        </button>
      </p>
    </>
  );
}
