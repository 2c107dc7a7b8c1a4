import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import type { RecordShown } from '../api/shown.js';
import { ScrollTable } from '../draw/scroll-table.js';

/** Every revision of the record that is looked at, the latest first: each stays as it was. */
export function RecordRevisions({ record, records }: { record: RecordShown; records: readonly RecordShown[] }) {
  const line = lineOf(record, records);
  if (line.length < 2) return null;
  return (
    <section className="section" aria-labelledby="record-revisions">
      <h2 id="record-revisions">Every revision of the record is kept</h2>
      <ScrollTable name="Revisions of the record">
        <thead>
          <tr>
            <th scope="col">revision</th>
            <th scope="col">file that was added</th>
            <th scope="col" className="right">
              intervals
            </th>
            <th scope="col" className="right">
              missing
            </th>
            <th scope="col" className="right">
              active energy
            </th>
            <th scope="col" className="right">
              highest
            </th>
          </tr>
        </thead>
        <tbody>
          {line.map(({ id, revision, file, record: summary }) => (
            <tr key={id}>
              <th scope="row">{revision}</th>
              <td>{file.name ?? 'without a name'}</td>
              <td className="right">{formatNumber(summary.intervals, 'given')}</td>
              <td className="right">{formatNumber(summary.missing, 'given')}</td>
              <td className="right">{formatQuantity(summary.activeKwh / 1000, 'MWh')}</td>
              <td className="right">{formatQuantity(summary.maxKw, 'kW')}</td>
            </tr>
          ))}
        </tbody>
      </ScrollTable>
    </section>
  );
}

function lineOf(record: RecordShown, records: readonly RecordShown[]): RecordShown[] {
  const line = [record];
  for (let before = record.previousId; before !== null; before = line.at(-1)!.previousId) {
    const found = records.find(({ id }) => id === before);
    if (found === undefined) break;
    line.push(found);
  }
  return line;
}
