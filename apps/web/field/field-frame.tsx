import type { ReactNode } from 'react';
import type { Problem } from '#libs/engine/index.js';
import { expectedWords } from '#libs/present/path-words.js';
import { Mark } from '../draw/verdict-mark.js';

/** Label above, value on a rule, unit after, as understood below; a refusal stands at its field. */
export function FieldFrame({
  path,
  label,
  unit,
  echo,
  refusal,
  children,
}: {
  path: string;
  label: string;
  unit?: string | undefined;
  echo?: ReactNode;
  refusal: string | null;
  children: ReactNode;
}) {
  return (
    <div className={refusal === null ? 'field' : 'field refused'}>
      <label htmlFor={`field:${path}`}>{label}</label>
      <span className="rule">
        {children}
        {unit === undefined || unit === '' ? null : <span className="unit">{unit}</span>}
      </span>
      {echo === undefined || echo === null ? null : <span className="echo num">{echo}</span>}
      {refusal === null ? null : (
        <span className="refusal" id={`refusal:${path}`} role="alert">
          <Mark verdict="avoid" />
          <span>{refusal}</span>
        </span>
      )}
    </div>
  );
}

/** What to do about a refusal, in the words of the one that refused. */
export function refusalOf(problems: readonly Problem[], path: string): string | null {
  const problem = problems.find((one) => one.path === path);
  if (problem === undefined) return null;
  return `Needs ${expectedWords(problem.expected)}; found ${problem.found}.`;
}
