import type { BankOutcome } from '#libs/engine/index.js';
import { deviceTable, openDevices } from '#libs/present/device-words.js';
import { countWord } from '#libs/present/findings.js';
import { formatQuantity } from '#libs/present/format-number.js';
import { say, words } from '#libs/present/language.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, type Column, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 8.8 };

const COLUMNS: Column[] = words([
  { head: 'device', share: 25 },
  { head: 'meets', share: 31 },
  { head: 'needs', share: 30 },
  { head: 'site has', share: 15 },
  { head: 'stands', share: 11 },
  { head: 'basis', share: 18 },
]);

/** Every device with what it meets, the rating it needs and what the site has; never a product. */
export function drawDevices(paper: Paper, outcome: BankOutcome): void {
  const { result } = outcome;
  const open = openDevices(result.devices);
  const left = open === 0 ? say`every one is entered` : say`${countWord(open)} of ${result.devices.length} not entered`;
  paper.heading(
    '7.2',
    say`Devices: conductors and disconnector for ${formatQuantity(result.conductorMinA, 'A')} or more; ${left}`,
    {
      level: 3,
    },
  );
  const rows = deviceTable(outcome).map(({ device, met, need, fitted, state, basis }): Cell[] => [
    device,
    met,
    need,
    fitted,
    state === 'falls short' ? [{ text: state, weight: 'semibold' }] : state,
    basis,
  ]);
  drawTable(paper, COLUMNS, rows, { style: SMALL, padding: 2.4, after: 4 });
  paper.paragraph(
    [
      say`Ratings and settings, never a product. The equipment fault current has its own voltage factor, the least impedance of the
        transformers and the motors’ share in it, and is not the fault level that resonance is computed with. A fuse’s range,
        a reactor’s linearity, settings, heat and air are common practice without a source. Not computed: selectivity; cables
        by length, laying and temperature.`,
    ],
    { style: NOTE },
  );
}
