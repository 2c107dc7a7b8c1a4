import { isTimeZone, zoneTable } from '#libs/contract/time-zone.js';

/** Any year shows a zone's clock put on and back. */
const YEAR_S = [Date.UTC(2025, 0, 1) / 1000, Date.UTC(2026, 0, 1) / 1000] as const;

/** A meter whose clock is not put on in spring writes an hour that the site's clock leaves out: by which it runs is asked. */
export function RunningClock({ timeZone, onAnswer }: { timeZone: string; onAnswer: (zone: string) => void }) {
  const standard = standardOffset(timeZone);
  return (
    <section className="notice" aria-label="by which clock the meter runs">
      <h3>by which clock the meter runs</h3>
      <p className="caption">A meter that is not put on in spring keeps one of these all year. Choose one.</p>
      {standard === null || standard === '+00:00' ? null : (
        <p className="row gap">
          <button type="button" className="button" onClick={() => onAnswer(standard)}>
            UTC{standard}
          </button>
          <span className="caption">standard time of {timeZone}</span>
        </p>
      )}
      <p className="row gap">
        <button type="button" className="button" onClick={() => onAnswer('UTC')}>
          UTC
        </button>
      </p>
    </section>
  );
}

/** @returns "+01:00": the least offset of a year, that of the time no clock is put on; null for an unknown zone */
function standardOffset(zone: string): string | null {
  if (!isTimeZone(zone)) return null;
  const leastS = Math.min(...zoneTable(zone, ...YEAR_S).offsetS);
  const minutes = Math.abs(leastS) / 60;
  const two = (part: number) => String(part).padStart(2, '0');
  return `${leastS < 0 ? '-' : '+'}${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
