import { useDesk } from '../desk/use-desk.js';
import { valueAt } from './document-path.js';
import { FieldFrame, refusalOf } from './field-frame.js';

/** A name of the site file. */
export function TextField({ path, label, isWide = false }: { path: string; label: string; isWide?: boolean }) {
  const { desk, state } = useDesk();
  const value = valueAt(state.document, path);
  return (
    <FieldFrame path={path} label={label} refusal={refusalOf(state.problems, path)}>
      <input
        id={`field:${path}`}
        value={typeof value === 'string' ? value : ''}
        className={isWide ? 'wide' : undefined}
        autoComplete="off"
        onChange={({ target }) =>
          desk.type(path, target.value, { value: target.value === '' ? undefined : target.value })
        }
      />
    </FieldFrame>
  );
}
