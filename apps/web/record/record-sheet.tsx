import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { siteAddress } from '../address.js';
import { useDesk } from '../desk/use-desk.js';
import { YearFigure } from '../draw/year-figure.js';
import { ChoiceField } from '../field/choice-field.js';
import { valueAt } from '../field/document-path.js';
import { QuantityField } from '../field/quantity-field.js';
import { TextField } from '../field/text-field.js';
import { Headline } from '../working/headline.js';
import { EstimateFields } from './estimate-fields.js';
import { MeterFileDrop } from './meter-file-drop.js';
import { ReadingFindings } from './reading-findings.js';
import { RecordRevisions } from './record-revisions.js';
import { TraceFigure } from './trace-figure.js';

const DAY_S = 86_400;

/** The meter's record: what was read, how it was understood, the year at a glance. */
export function RecordSheet() {
  const { desk, state } = useDesk();
  const record = state.records[0];
  return (
    <>
      {record === undefined ? (
        <div className="headline">
          <h1>Drop a meter file, and the year is read from it; or enter bills or equipment below.</h1>
        </div>
      ) : (
        <Headline
          figures={[
            { value: record.record.intervals, under: 'intervals read', digits: 'given' },
            { value: record.record.missing, under: 'missing', digits: 'given' },
            { value: record.record.maxKw, unit: 'kW', under: 'highest' },
            { value: record.record.powerFactorLagging, under: 'factor of the record', id: 'record.powerFactorLagging' },
          ]}
        >
          {`${lengthWords(record.record)} in steps of ${stepWords(record.record.intervalS)}${record.record.missing === 0 ? ', without a gap' : ''}.`}
        </Headline>
      )}
      {state.charts.record === undefined ? null : (
        <YearFigure map={state.charts.record.year} working={['record.powerFactorLagging', 'record.powerFactorNet']} />
      )}
      {record === undefined ? null : <TraceFigure key={record.id} recordId={record.id} />}
      <div className="split halves">
        <MeterFileDrop />
        <section className="section" aria-labelledby="clock">
          <h2 id="clock">How the record is understood</h2>
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
                ['logged', 'is in the record'],
                ['switching', 'the bank was switching'],
                ['unknown', 'not known'],
              ]}
            />
            {valueAt(state.document, 'recordedBank.state') === 'fixed' ? (
              <QuantityField path="recordedBank.kvar" label="it gave" unit="kvar" />
            ) : null}
          </div>
          <p className="row gap">
            <a href={siteAddress(desk.siteId, 'record').replace('/record', '/survey')}>
              A sheet for the visit, to print
            </a>
          </p>
        </section>
      </div>
      {record === undefined ? null : (
        <ReadingFindings record={record} timeZone={String(valueAt(state.document, 'timeZone'))} />
      )}
      {record === undefined ? null : <RecordRevisions record={record} records={state.records} />}
      {record === undefined || valueAt(state.document, 'estimate') !== undefined ? <EstimateFields /> : null}
    </>
  );
}

function lengthWords({ beginS, endS }: { beginS: number; endS: number }): string {
  const days = Math.round((endS - beginS) / DAY_S);
  return days >= 364 && days <= 367 ? 'A year of readings' : `${formatNumber(days, 'given')} days of readings`;
}

function stepWords(intervalS: number): string {
  return intervalS % 60 === 0
    ? formatQuantity(intervalS / 60, 'min', 'given')
    : formatQuantity(intervalS, 's', 'given');
}
