import { bankOf } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt, withValueAt } from '../field/document-path.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';
import { type QuantityPlace, TypedQuantity } from '../field/quantity-field.js';

/** A part of the bank under study, wherever that bank comes from: what is entered is the hand's. */
function useBankPart(path: string) {
  const { desk, state } = useDesk();
  const bank = bankOf(state);
  const put = (value: unknown) => {
    if (bank !== null) desk.tryBank(withValueAt({ bank }, path, value).bank);
  };
  return { value: valueAt({ bank }, path), put, refusal: refusalOf(state.problems, path) };
}

/** A quantity of the bank under study; its path begins with `bank`. */
export function BankQuantityField(place: QuantityPlace) {
  const { value, put } = useBankPart(place.path);
  return <TypedQuantity {...place} kept={value} onType={(_, read) => read !== null && put(read.value)} />;
}

/** One of a few words, or yes and no, of the bank under study. */
export function BankChoiceField<T extends string | boolean>({
  path,
  label,
  choices,
}: {
  path: string;
  label: string;
  choices: readonly (readonly [value: T, words: string])[];
}) {
  const { value, put, refusal } = useBankPart(path);
  return (
    <FieldFrame path={path} label={label} refusal={refusal}>
      <select
        id={`field:${path}`}
        value={value === undefined ? '' : String(value)}
        onChange={({ target }) => put(choices.find(([one]) => String(one) === target.value)?.[0])}
      >
        <option value="">not entered</option>
        {choices.map(([one, words]) => (
          <option key={words} value={String(one)}>
            {words}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}
