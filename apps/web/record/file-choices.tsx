import type { KeptMapShown, RecordShown } from '../api/shown.js';
import { FieldFrame } from '../field/field-frame.js';

/** What is chosen before a file is dropped. */
export interface FileChosen {
  /** it extends the record that is looked at */
  isFurther: boolean;
  /** empty for none */
  keptMap: string;
}

/** What the next file is to become, and which kept answers it is read with. */
export function FileChoices({
  record,
  keptMaps,
  chosen,
  onChoose,
}: {
  record: RecordShown | undefined;
  keptMaps: readonly KeptMapShown[];
  chosen: FileChosen;
  onChoose: (chosen: FileChosen) => void;
}) {
  if (record === undefined && keptMaps.length === 0) return null;
  return (
    <div className="fields">
      {record === undefined ? null : (
        <FieldFrame path="file.becomes" label="the file is" refusal={null}>
          <select
            id="field:file.becomes"
            value={chosen.isFurther ? 'further' : 'own'}
            onChange={({ target }) => onChoose({ ...chosen, isFurther: target.value === 'further' })}
          >
            <option value="own">a record of its own</option>
            <option value="further">added to this record</option>
          </select>
        </FieldFrame>
      )}
      {keptMaps.length === 0 ? null : (
        <FieldFrame path="file.keptMap" label="read with" refusal={null}>
          <select
            id="field:file.keptMap"
            value={chosen.keptMap}
            onChange={({ target }) => onChoose({ ...chosen, keptMap: target.value })}
          >
            <option value="">no kept answers</option>
            {keptMaps.map(({ id, name }) => (
              <option key={id} value={name}>
                {name}
              </option>
            ))}
          </select>
        </FieldFrame>
      )}
    </div>
  );
}
