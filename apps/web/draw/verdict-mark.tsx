import type { Verdict } from '#libs/engine/index.js';
import { verdictWords } from '#libs/present/verdict-words.js';

/** The mark of a verdict: the more ink, the worse. Open ring, half-filled lozenge, barred square; a dash where nothing was judged. */
export function Mark({ verdict }: { verdict: Verdict | null }) {
  return (
    <svg className="mark" viewBox="0 0 14 14" aria-hidden="true">
      <MarkShape verdict={verdict} />
    </svg>
  );
}

function MarkShape({ verdict }: { verdict: Verdict | null }) {
  switch (verdict) {
    case 'clear':
      return <circle cx="7" cy="7" r="5" fill="none" stroke="var(--ink)" strokeWidth="1.8" />;
    case 'watch':
      return (
        <>
          <path d="M7 1 13 7 7 13 1 7Z" fill="var(--sheet)" stroke="var(--watch)" strokeWidth="1.4" />
          <path d="M7 1V13L1 7Z" fill="var(--watch)" />
        </>
      );
    case 'avoid':
      return (
        <>
          <rect x="1" y="1" width="12" height="12" fill="var(--avoid-fill)" />
          <path d="M3.5 10.5 10.5 3.5" stroke="var(--on-avoid)" strokeWidth="2" />
        </>
      );
    case null:
      return <path d="M2 7H12" stroke="var(--soft)" strokeWidth="1.6" />;
  }
}

/** A verdict in words with its mark. */
export function VerdictWords({ verdict }: { verdict: Verdict | null }) {
  return (
    <span className={`verdict ${verdict ?? 'none'}`}>
      <Mark verdict={verdict} />
      {verdictWords(verdict)}
    </span>
  );
}
