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
        {findings.map(({ level, what, value, limit, source, consequence }, at) => (
          <li key={at} className="finding">
            <span className={LOOK[level]}>{level}</span>
            <div>
              <p>{what}</p>
              <p className="caption">
                {[value === '' ? '' : limit === '' ? value : `${value}, limit ${limit}`, source, consequence]
                  .filter((part) => part !== '')
                  .join(' · ')}
              </p>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}
