import type { ScannedLevel } from '#libs/engine/index.js';
import { standingWords } from './duty-bars.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { plainName } from './plain-name.js';
import { finished, tableLines } from './terminal-lines.js';

/**
 * The scan of one level in every corner, for a terminal.
 * @param levels one entry a corner, nominal first
 * @returns a table of plain text, ending in a line end
 */
export function scanReport(levels: readonly ScannedLevel[]): string {
  const first = levels[0];
  if (first === undefined) return '';
  const severalBuses = levels.some(({ bus }) => bus !== first.bus);
  const severalStandings = levels.some(({ corner }) => standingWords(corner).length > 0);
  const head = [
    ...(severalBuses ? ['bus'] : []),
    'fault level',
    'capacitance',
    'inductance',
    'damping',
    'peak at order',
    'peak',
    ...(severalStandings ? ['standing'] : []),
  ];
  const rows = levels.map(({ bus, corner, parallelOrderH, peakOhm }) => [
    ...(severalBuses ? [plainName(bus)] : []),
    formatQuantity(corner.faultLevelMva, 'MVA', 'given'),
    `× ${formatNumber(corner.capacitanceFactor, 'given')}`,
    `× ${formatNumber(corner.inductanceFactor, 'given')}`,
    formatQuantity(corner.dampingKw, 'kW'),
    formatQuantity(parallelOrderH, ''),
    formatQuantity(peakOhm, 'Ω'),
    ...(severalStandings ? [standingWords(corner).join(', ') || 'normal'] : []),
  ]);
  return finished([
    `Impedance at ${severalBuses ? 'each bus' : 'the bus'} with ${formatQuantity(first.levelKvar, 'kvar')} connected; the first row is the nominal case.`,
    ...tableLines(head, rows),
  ]);
}
