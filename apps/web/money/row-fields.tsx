import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';

/** A list of like rows of numbers, each with its fields; rows are added at the end and removed one by one. */
export function RowFields({
  path,
  columns,
  starter,
  row,
}: {
  path: string;
  columns: readonly { key: string; label: string; unit?: string; otherwise?: string }[];
  starter: object;
  /** what one row is called */
  row: string;
}) {
  const { desk, state } = useDesk();
  const list = (valueAt(state.document, path) as unknown[] | undefined) ?? [];
  const put = (next: unknown[]) => desk.type(path, '', { value: next.length === 0 ? undefined : next });
  return (
    <>
      {list.map((_, at) => (
        <fieldset key={at} className="sentence" aria-label={`${row} ${at + 1}`}>
          {columns.map(({ key, ...field }) => (
            <QuantityField key={key} path={`${path}[${at}].${key}`} {...field} />
          ))}
          <button type="button" className="way" onClick={() => put(list.toSpliced(at, 1))}>
            Remove<span className="hidden"> {`${row} ${at + 1}`}</span>
          </button>
        </fieldset>
      ))}
      <p className="row">
        <button type="button" className="way" id={`field:${path}`} onClick={() => put([...list, starter])}>
          {`Add a ${row}`}
        </button>
      </p>
    </>
  );
}
