import type { Robustness, StandingRange } from '#libs/engine/index.js';
import { formatNumber, GAP } from '#libs/present/format-number.js';
import { verdictWords } from '#libs/present/verdict-words.js';
import { useDesk } from '../desk/use-desk.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { latestResult } from '../line/latest-result.js';

/** How far each uncertain quantity may move before the verdict does. */
export function Firmness() {
  const { state } = useDesk();
  const robustness = latestResult(state)?.robustness ?? null;
  if (robustness === null) return null;
  return (
    <section className="section" aria-labelledby="firmness">
      <h2 id="firmness">{heading(robustness)}</h2>
      <p className="caption">Each quantity moved by itself, times its own value, until the verdict is another one.</p>
      <ScrollTable name="How firm the verdict is">
        <thead>
          <tr>
            <th scope="col">moved</th>
            <th scope="col">stands down to</th>
            <th scope="col">stands up to</th>
          </tr>
        </thead>
        <tbody>
          {robustness.ranges.map((range) => (
            <tr key={range.quantity}>
              <th scope="row">{range.quantity}</th>
              <td>{endWords(range.lowFactor, range.leastTried, range.verdictBelow)}</td>
              <td>{endWords(range.highFactor, range.mostTried, range.verdictAbove)}</td>
            </tr>
          ))}
        </tbody>
      </ScrollTable>
    </section>
  );
}

function heading({ ranges }: Robustness): string {
  const moved = ranges.filter(({ lowFactor, highFactor }) => lowFactor !== null || highFactor !== null);
  if (moved.length === 0) return 'The verdict stands over every range that was tried';
  return `The verdict changes with ${moved.map(({ quantity }) => quantity).join(', ')}`;
}

function endWords(factor: number | null, tried: number, beyond: StandingRange['verdictBelow']): string {
  const times = (value: number) => `×${GAP}${formatNumber(value)}`;
  if (factor === null) return `${times(tried)}, as far as tried`;
  return `${times(factor)}, beyond it ${verdictWords(beyond)}`;
}
