import { type Finding, findingNumbers } from '#libs/present/findings.js';
import type { FindingLevel } from '#libs/present/message.js';
import { useDesk } from '../desk/use-desk.js';

const LOOK: Record<FindingLevel, string> = {
  'blocks issue': 'level blocks',
  'to be accepted': 'level accepted',
  'to be noted': 'level noted',
  information: 'level',
};

/** What a reviewer has to know, gravest first. */
export function FindingsList() {
  const { state } = useDesk();
  const findings = state.look?.findings ?? [];
  if (findings.length === 0) return null;
  return (
    <section className="section" aria-labelledby="findings">
      <h2 id="findings">Findings on the paper</h2>
      <p className="caption">The more ink a level carries, the graver it is.</p>
      <ul>
        {findings.map((finding) => (
          <li key={finding.id} className="finding">
            <span className={LOOK[finding.level]}>{finding.level}</span>
            <div>
              <p>{finding.what}</p>
              <p className="caption">{besides(finding)}</p>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}

/** Value, limit, source and consequence on one line. */
function besides(finding: Finding): string {
  const { value, limit } = findingNumbers(finding);
  const numbers = limit === '' ? value : `${value}, limit ${limit}`;
  return [numbers, finding.source, finding.consequence].filter((part) => part !== '').join(' · ');
}
