import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { formatLength } from '#libs/present/local-stamp.js';
import { ask } from '../api/ask.js';
import type { JobShown } from '../api/shown.js';

/** How far a long reading is, at which rate, and the way to stop it. */
export function ImportProgress({ job }: { job: JobShown }) {
  const { progress, bytesPerS, remainingS, state } = job;
  const rate = bytesPerS === null ? '' : `, ${formatQuantity(bytesPerS / 1e6, 'MB/s')}`;
  const left = remainingS === null ? '' : `, about ${formatLength(remainingS)} left`;
  return (
    <p className="row gap">
      <progress value={progress} max={1} aria-label="read of the file" />
      <span className="num">
        {state === 'queued' ? 'waits for its turn' : `${formatNumber(100 * progress, 'given')} % read${rate}${left}`}
      </span>
      <button
        type="button"
        className="way"
        onClick={() => void ask(job.links.self, { method: 'DELETE' }).catch(() => undefined)}
      >
        Stop reading
      </button>
    </p>
  );
}
