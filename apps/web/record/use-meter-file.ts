import { useCallback, useEffect, useRef, useState } from 'react';
import { mergedMap } from '#libs/contract/merged-map.js';
import type { MeterMap } from '#libs/contract/meter-map.js';
import type { QuestionAsked } from '#libs/contract/question.js';
import { NoConnection, Refused } from '../api/ask.js';
import type { JobShown, RecordShown } from '../api/shown.js';
import { keptJob } from '../desk/follow-job.js';
import type { SiteDesk } from '../desk/site-desk.js';
import { keepRawRows, type RawRows, rowsAtEnds } from './raw-rows.js';
import { followImport, type Listening, type Said, sendMeterFile } from './send-meter-file.js';

/** How far the reading of a dropped file is, and what it wants to know. */
export interface MeterFileState {
  file: File | null;
  said: Said;
  isReading: boolean;
  job: JobShown | null;
  refusals: string[];
  /** a value stands in an hour that the site's clock leaves out: the meter's runs through */
  isClockRunning: boolean;
  questions: readonly QuestionAsked[];
  /** kept answers for files with this header: nothing of them is taken unasked */
  offered: readonly { id: string; name: string }[];
  /** what was made of the last file */
  read: RecordShown | null;
}

const NOTHING: MeterFileState = {
  file: null,
  said: { answers: {}, keptMap: '', extendsId: '' },
  isReading: false,
  job: null,
  refusals: [],
  isClockRunning: false,
  questions: [],
  offered: [],
  read: null,
};

/** A meter file on its way to a record: sent, followed, asked about, answered. */
export function useMeterFile(desk: SiteDesk) {
  const [state, setState] = useState(NOTHING);
  const leaving = useRef(new AbortController());
  const wait = useCallback(
    async (begin: (listening: Listening) => Promise<RecordShown | null>, rows?: Promise<RawRows | null>) => {
      const { signal } = leaving.current;
      const put = (part: Partial<MeterFileState>) => {
        if (!signal.aborted) setState((before) => ({ ...before, ...part }));
      };
      try {
        const read = await begin({ moved: (job) => put({ job }), signal });
        if (read !== null) {
          keepRawRows(read.id, rows === undefined ? null : await rows);
          await desk.recordAdded();
        }
        put({ read });
      } catch (error) {
        put(refusedWith(error));
      }
      put({ isReading: false, job: null });
    },
    [desk],
  );
  useEffect(() => {
    leaving.current = new AbortController();
    const jobId = keptJob(desk.siteId, 'import');
    if (jobId !== null) {
      setState({ ...NOTHING, isReading: true });
      void wait((listening) => followImport(desk.siteId, jobId, listening));
    }
    return () => leaving.current.abort();
  }, [desk, wait]);
  const read = (file: File, said: Said) => {
    setState({ ...NOTHING, file, said, isReading: true });
    void wait((listening) => sendMeterFile(desk.siteId, file, said, listening), rowsAtEnds(file));
  };
  /** Reads the same file again, with more said about it. */
  const answer = ({ answers = {}, keptMap }: { answers?: MeterMap; keptMap?: string }) => {
    const { file, said } = state;
    if (file === null) return;
    read(file, { ...said, answers: mergedMap(said.answers, answers), keptMap: keptMap ?? said.keptMap });
  };
  return { state, read, answer };
}

/** What a reading that was refused leaves to be asked or said. */
function refusedWith(error: unknown): Partial<MeterFileState> {
  const problem = error instanceof Refused ? error.problem : null;
  const questions = problem?.questions ?? [];
  return {
    questions,
    offered: problem?.offered ?? [],
    refusals: questions.length === 0 ? refusalWords(error) : [],
    isClockRunning: problem?.problems.some(({ code, path }) => code === 'bad-time' && path === 'timeZone') ?? false,
  };
}

function refusalWords(error: unknown): string[] {
  if (error instanceof NoConnection) return ['No connection. Drop the file again when it is back.'];
  if (!(error instanceof Refused)) return [String(error)];
  const { problems, detail } = error.problem;
  if (problems.length === 0) return [detail];
  return problems.slice(0, 12).map(({ row, column, expected, found }) => {
    const place = row === undefined ? '' : `Row ${row}${column === undefined ? '' : `, column ${column}`}: `;
    return `${place === '' ? 'Needs' : `${place}needs`} ${expected}; found ${found}.`;
  });
}
