import { useDesk } from '../desk/use-desk.js';
import { valueAt } from './document-path.js';
import { FieldFrame, refusalOf } from './field-frame.js';

/** One of a few words or numbers of the site file. */
export function ChoiceField<T extends string | number>({
  path,
  label,
  choices,
  otherwise,
}: {
  path: string;
  label: string;
  choices: readonly (readonly [value: T, words: string])[];
  /** what no choice means; absent, one must be made */
  otherwise?: string;
}) {
  const { desk, state } = useDesk();
  const value = valueAt(state.document, path) as T | undefined;
  return (
    <FieldFrame path={path} label={label} refusal={refusalOf(state.problems, path)}>
      <select
        id={`field:${path}`}
        className={value === undefined ? 'unset' : undefined}
        value={value === undefined ? '' : String(value)}
        onChange={({ target }) => {
          const chosen = choices.find(([one]) => String(one) === target.value)?.[0];
          desk.type(path, target.value, { value: chosen });
        }}
      >
        {otherwise === undefined && value !== undefined ? null : <option value="">{otherwise ?? 'choose'}</option>}
        {choices.map(([one, words]) => (
          <option key={one} value={String(one)}>
            {words}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}
