import { type DragEvent, useEffect, useState } from 'react';
import { mergedMap } from '#libs/contract/merged-map.js';
import { ask } from '../api/ask.js';
import type { KeptMapShown } from '../api/shown.js';
import { useDesk } from '../desk/use-desk.js';
import { Mark } from '../draw/verdict-mark.js';
import { AskedInPlace } from './asked-in-place.js';
import { FileChoices } from './file-choices.js';
import { ImportProgress } from './import-progress.js';
import { KeepAnswers } from './keep-answers.js';
import { RunningClock } from './running-clock.js';
import { useMeterFile } from './use-meter-file.js';

/** Where a meter file is dropped, what it leaves open is asked, and what could not be read is said. */
export function MeterFileDrop() {
  const { desk, state } = useDesk();
  const { state: reading, read, answer } = useMeterFile(desk);
  const [keptMaps, setKeptMaps] = useState<KeptMapShown[]>([]);
  const [keptMap, setKeptMap] = useState('');
  const [isFurther, setFurther] = useState(false);
  const [isOver, setOver] = useState(false);
  useEffect(() => {
    ask<{ keptMaps: KeptMapShown[] }>('/api/kept-maps').then(
      ({ body }) => setKeptMaps(body.keptMaps),
      () => undefined,
    );
  }, []);
  const take = (file: File | undefined) => {
    if (file !== undefined) read(file, { answers: {}, keptMap, extendsId: (isFurther && state.records[0]?.id) || '' });
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    take(event.dataTransfer.files[0]);
  };
  const { answers } = reading.said;
  const used = keptMaps.find(({ name }) => name === reading.said.keptMap);
  return (
    <section className="section no-print" aria-labelledby="drop">
      <h2 id="drop">{state.records.length === 0 ? 'The meter file' : 'Another meter file'}</h2>
      <FileChoices
        record={state.records[0]}
        keptMaps={keptMaps}
        chosen={{ isFurther, keptMap }}
        onChoose={(chosen) => {
          setFurther(chosen.isFurther);
          setKeptMap(chosen.keptMap);
        }}
      />
      <label
        className={isOver ? 'drop over' : 'drop'}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        Drop it here, or choose it. Time, active and reactive power or energy, in any of the usual spellings; NEM12 as
        well.
        <br />
        <input type="file" disabled={reading.isReading} onChange={({ target }) => take(target.files?.[0])} />
      </label>
      <p className="row" role="status">
        {reading.isReading ? `Reading ${reading.file?.name ?? 'the file'}.` : ''}
      </p>
      {reading.job === null ? null : <ImportProgress job={reading.job} />}
      {reading.refusals.map((words) => (
        <p key={words} className="refusal" role="alert">
          <Mark verdict="avoid" />
          <span>{words}</span>
        </p>
      ))}
      {reading.isClockRunning && reading.file !== null ? (
        <RunningClock
          timeZone={String(state.document?.timeZone ?? 'UTC')}
          onAnswer={(zone) => answer({ answers: { timeZone: zone } })}
        />
      ) : null}
      {reading.offered.map(({ id, name }) => (
        <p key={id} className="row gap">
          <button type="button" className="button" onClick={() => answer({ keptMap: name })}>
            Read it with the answers kept as “{name}”
          </button>
          <span className="caption">They were given for a file with the same header.</span>
        </p>
      ))}
      {reading.questions.map((question) => (
        <AskedInPlace
          key={question.id}
          question={question}
          timeZone={state.site?.site.timeZone ?? 'UTC'}
          onAnswer={reading.file === null ? undefined : (chosen) => answer({ answers: chosen })}
        />
      ))}
      {reading.read === null ? null : (
        <KeepAnswers
          key={reading.read.id}
          answers={used === undefined || isEmpty(answers) ? answers : mergedMap(used.map, answers)}
          record={reading.read}
          onKept={(kept) => setKeptMaps([...keptMaps, kept])}
        />
      )}
    </section>
  );
}

/** Answers that were only taken from a name need no other. */
function isEmpty(answers: object): boolean {
  return Object.keys(answers).length === 0;
}
