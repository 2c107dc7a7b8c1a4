import { useDesk } from '../desk/use-desk.js';
import { valueAt } from './document-path.js';

/** A yes or no of the site file that has a default; at its default it is left out. */
export function TickField({ path, label, otherwise }: { path: string; label: string; otherwise: boolean }) {
  const { desk, state } = useDesk();
  const value = (valueAt(state.document, path) as boolean | undefined) ?? otherwise;
  return (
    <label className="tick">
      <input
        id={`field:${path}`}
        type="checkbox"
        checked={value}
        onChange={({ target: { checked } }) =>
          desk.type(path, '', { value: checked === otherwise ? undefined : checked })
        }
      />
      {label}
    </label>
  );
}
