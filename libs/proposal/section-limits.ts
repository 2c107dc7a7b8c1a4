import {
  AMBIENT_CATEGORIES,
  type EstimateOutcome,
  isEstimate,
  type Outcome,
  OVERVOLTAGE_DURATIONS,
  siteCorners,
} from '#libs/engine/index.js';
import { estimateSpan } from '#libs/present/estimate-words.js';
import { engineName } from '#libs/present/engine-name.js';
import { countWord } from '#libs/present/findings.js';
import { formatNumber, formatQuantity, formatRange } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import type { Paper } from './paper.js';
import { drawTable } from './table.js';

/** Within what the verdict was found, and what was not looked at. */
export function drawValidity(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  paper.heading('12', say`Limits of validity: the verdict holds for what was computed`);
  const columns = [
    { head: say`what`, share: 26 },
    { head: say`judged for`, share: 74 },
  ];
  drawTable(paper, columns, validityRows(outcome), { after: 6 });
  paper.paragraph([
    say`How far the verdict stands when an input moves is in section 10. Beyond that, and with a transformer out of service or
      a load of another kind: plan again.`,
  ]);
  if (outcome.site.rules === 'iec' && outcome.bank.groups.length > 0) {
    const times = OVERVOLTAGE_DURATIONS.map(
      ({ ratio, duration }) => `${formatNumber(ratio, 'given')} ${engineName(duration)}`,
    ).join('; ');
    paper.paragraph([say`A capacitor carries, as a multiple of its rated voltage: ${times} (IEC 60831-1).`]);
  }
}

function validityRows(outcome: Outcome | EstimateOutcome): string[][] {
  const { site, bank, result } = outcome;
  const { corners } = siteCorners(site.supply, site.loads, site);
  const buses = result.limits.points.filter((point) => point !== 'primary').length;
  const { faultLevelMva } = site.supply;
  const present = (result.network.levels[0]?.orders ?? []).map(({ orderH }) => formatNumber(orderH, 'given'));
  const rows = [
    [say`load`, loadWords(outcome)],
    [
      say`voltage at the bus`,
      say`${formatQuantity(site.nominalV, 'V', 'given')} nominal, at most ${formatQuantity(site.highestV, 'V', 'given')}`,
    ],
    [say`fault level`, formatRange({ low: faultLevelMva.min, high: faultLevelMva.max }, 'MVA')],
    [say`damping load`, formatRange({ low: 0, high: site.loads.dampingKw.max }, 'kW')],
    [
      say`tolerances`,
      say`capacitance 0.95 to 1.10 and inductance 0.97 to 1.03 of the nameplate, all stages alike` +
        ((site.topology?.capacitors ?? []).length > 0
          ? say`; the network’s own capacitors as their nameplates say and at the same ends, all of them alike, whatever the bank’s`
          : ''),
    ],
    [say`corners`, say`${corners.length}, nominal included, at every one of ${result.bank.levelsKvar.length} levels`],
    [
      say`orders`,
      present.length === 0
        ? say`none present`
        : say`${present.join(', ')}; none above 50, none between whole orders unless listed`,
    ],
    [
      say`network`,
      say`balanced, ${buses === 1 ? say`one bus` : say`${countWord(buses)} buses`}; reactances in proportion to the order or its inverse`,
    ],
  ];
  if (site.asOf !== null) rows.push([say`as of`, site.asOf]);
  if (bank.ambientCategory !== null) {
    const [most, day, year] = AMBIENT_CATEGORIES[bank.ambientCategory];
    rows.push([
      say`ambient`,
      say`category ${bank.ambientCategory}: at most ${most} °C, ${day} °C over 24 h, ${year} °C over a year`,
    ]);
  } else if (bank.groups.length > 0) rows.push([say`ambient`, say`category not stated: temperatures are not judged`]);
  return rows;
}

function loadWords(outcome: Outcome | EstimateOutcome): string {
  if (isEstimate(outcome)) return say`an estimate from ${estimateSpan(outcome)}; the load itself was not recorded`;
  const { record, zone } = outcome;
  return say`the record from ${formatMoment(zone, record.firstS)} to ${formatMoment(zone, record.endS)}, no other time`;
}
