import { siteAddress } from '../address.js';
import type { RecordShown } from '../api/shown.js';
import { useDesk } from '../desk/use-desk.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { EstimateFields } from './estimate-fields.js';
import { MeterFileDrop } from './meter-file-drop.js';
import { RawBesideRead } from './raw-beside-read.js';
import { ReadingFindings } from './reading-findings.js';
import { RecordPictures } from './record-pictures.js';
import { RecordRevisions } from './record-revisions.js';
import { stepWords } from './step-words.js';
import { useTrace } from './use-trace.js';

/** The meter's record: what was read, how it was understood, the year at a glance. */
export function RecordSheet() {
  const { state } = useDesk();
  const record = state.records[0];
  const trace = useTrace(record?.id);
  return (
    <>
      {record === undefined ? (
        <div className="headline">
          <h1>Drop a meter file, and the year is read from it; or enter bills or equipment below.</h1>
        </div>
      ) : (
        <RecordPictures record={record} trace={trace} />
      )}
      <div className="split halves">
        <MeterFileDrop />
        <Understanding record={record} />
      </div>
      {record === undefined ? null : (
        <>
          <ReadingFindings record={record} timeZone={String(valueAt(state.document, 'timeZone'))} />
          <RawBesideRead record={record} trace={trace} />
          <RecordRevisions record={record} records={state.records} />
        </>
      )}
      {record === undefined || valueAt(state.document, 'estimate') !== undefined ? <EstimateFields /> : null}
    </>
  );
}

/** By which clock and convention the record is read, and what stood at the bus meanwhile. */
function Understanding({ record }: { record: RecordShown | undefined }) {
  const { desk, state } = useDesk();
  return (
    <section className="section" aria-labelledby="clock">
      <h2 id="clock">How the record is understood</h2>
      {record === undefined ? null : (
        <p className="caption">
          {`Each interval is ${stepWords(record.record.intervalS)} long, named by its beginning, and holds the mean over it. Times are those of the clock of ${String(valueAt(state.document, 'timeZone'))}.`}
        </p>
      )}
      <div className="fields">
        <TextField path="timeZone" label="zone of the site" />
        <ChoiceField
          path="recordedBank.state"
          label="a bank, while it was taken"
          otherwise="none, assumed"
          choices={[
            ['none', 'there was none'],
            ['out', 'stood out'],
            ['fixed', 'was in, fixed'],
            ['switching', 'was switching'],
            ['logged', 'is in the record'],
            ['unknown', 'not known'],
          ]}
        />
        {valueAt(state.document, 'recordedBank.state') === 'fixed' ? (
          <QuantityField path="recordedBank.kvar" label="it gave" unit="kvar" />
        ) : null}
      </div>
      <p className="row gap">
        <a href={siteAddress(desk.siteId, 'record').replace('/record', '/survey')}>A sheet for the visit, to print</a>
      </p>
    </section>
  );
}
