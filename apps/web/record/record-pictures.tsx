import { useState } from 'react';
import { formatNumber } from '#libs/present/format-number.js';
import { recordWorkings } from '#libs/present/headline-workings.js';
import { dayBeginS } from '#libs/present/local-stamp.js';
import { noonOfDayS } from '#libs/present/year-map.js';
import type { RecordShown } from '../api/shown.js';
import type { Trace } from '../desk/look.js';
import { useDesk } from '../desk/use-desk.js';
import { YearFigure } from '../draw/year-figure.js';
import { Headline } from '../working/headline.js';
import { FirstLook } from './first-look.js';
import { stepWords } from './step-words.js';
import { TraceFigure } from './trace-figure.js';

const DAY_S = 86_400;

/** The record at a glance: its figures, a first look while nothing is planned, the year, and the intervals of a day. */
export function RecordPictures({ record, trace }: { record: RecordShown; trace: Trace | null }) {
  const { state } = useDesk();
  const [dayS, setDayS] = useState<number | null>(null);
  const { record: summary } = record;
  const year = state.charts.record?.year;
  const [read, missing, greatest] = recordWorkings(summary);
  return (
    <>
      <Headline
        figures={[
          { value: summary.intervals, under: 'intervals read', digits: 'given', working: read },
          { value: summary.missing, under: 'missing', digits: 'given', working: missing },
          { value: summary.maxKw, unit: 'kW', under: 'highest', working: greatest },
          { value: summary.powerFactorLagging, under: 'factor of the record', id: 'record.powerFactorLagging' },
        ]}
      >
        {`${lengthWords(summary)} in steps of ${stepWords(summary.intervalS)}${summary.missing === 0 ? ', without a gap' : ''}.`}
      </Headline>
      {state.kept !== null || state.look === null ? null : <FirstLook result={state.look.result} />}
      {year === undefined ? null : (
        <YearFigure
          map={trace === null ? year : { ...year, caption: `${year.caption} A click shows the day below.` }}
          working={['record.powerFactorLagging', 'record.powerFactorNet']}
          {...(trace === null ? {} : { onDay: (day: number) => setDayS(dayAfter(trace, day)) })}
        />
      )}
      <TraceFigure record={record} trace={trace} dayS={dayS} />
    </>
  );
}

/** Beginning of a day of the map, counted from the record's first [s]. */
function dayAfter({ zone, firstS }: Trace, day: number): number {
  return dayBeginS(zone, noonOfDayS(zone, firstS, day));
}

function lengthWords({ beginS, endS }: { beginS: number; endS: number }): string {
  const days = Math.round((endS - beginS) / DAY_S);
  return days >= 364 && days <= 367 ? 'A year of readings' : `${formatNumber(days, 'given')} days of readings`;
}
