import { couplesAtPrimary } from '../duty/limits-point.js';
import { siteNetwork } from '../network/network-model.js';
import { InputProblem, type Remark, remark } from '../problem.js';
import type { ZoneTable } from '../record/zone-table.js';
import type { EquipmentEntry } from '../requirement/estimate-input.js';
import { type LoadEstimate, loadEstimate } from '../requirement/load-estimate.js';
import type { Target } from '../requirement/need.js';
import type { Judged } from './judge-basis.js';
import { meteringOf } from './metering-of.js';
import { settleSite } from './settle-site.js';
import type { SettledSite } from './settled-site.js';
import type { Site } from './site.js';

/** A site and its estimated load: everything that does not depend on the bank. */
export interface EstimateStudy extends Judged {
  zone: ZoneTable;
  target: Target;
  load: LoadEstimate;
  assumptions: Remark[];
}

/**
 * Prepares a site without a record: defaults, load from bills or a list, network without the bank. The damping load is 0
 * unless given; distortion of the current is held against the sum of the distorting loads.
 * @param site validated site with an `estimate`
 * @param zone the site's zone over the months of the bills
 * @returns what every candidate bank is judged against
 * @throws InputProblem where there is no estimate or the inputs contradict each other
 * @source method-estimate
 */
export function studyEstimate(site: Site, zone: ZoneTable): EstimateStudy {
  const { estimate } = site;
  if (estimate === undefined) {
    throw new InputProblem([
      { code: 'missing', path: 'estimate', expected: 'bills or an equipment list', found: 'nothing' },
    ]);
  }
  const state = site.recordedBank?.state;
  if (state === 'logged' || state === 'switching') {
    const expected = '"none", "out", "fixed" or "unknown": bills don’t show what was connected when';
    throw new InputProblem([{ code: 'inconsistent', path: 'recordedBank.state', expected, found: `"${state}"` }]);
  }
  const { site: settled, assumptions } = settleSite(site, null);
  const metering = meteringOf(settled);
  const target: Target = { powerFactor: settled.targetPowerFactor, onExport: settled.onExport };
  const addedKvar = settled.recordedBank.state === 'fixed' ? settled.recordedBank.kvar : 0;
  const load = loadEstimate(estimate, { zone, metering, target, addedKvar });
  const { supply, loads, nominalV, topology } = settled;
  const loadA = (loads.distorting ?? []).reduce((sum, { fundamentalA }) => sum + fundamentalA, 0);
  return {
    site: settled,
    zone,
    target,
    load,
    assumptions: [...assumptions.map(withoutRecord), ...loadLines(settled, load, estimate.equipment ?? [], loadA)],
    model: siteNetwork(supply, loads, { nominalV, loadA, topology, primary: couplesAtPrimary(settled) }),
  };
}

/** Defaults whose sentence would speak of a record. */
const WITHOUT_RECORD: Readonly<Record<string, string>> = {
  'default.recordedBank': 'estimate.recordedBank',
  'default.loads.dampingKw.max': 'estimate.dampingKw',
};

function withoutRecord(line: Remark): Remark {
  return { ...line, code: WITHOUT_RECORD[line.code] ?? line.code };
}

function loadLines(
  site: SettledSite,
  load: LoadEstimate,
  equipment: readonly EquipmentEntry[],
  loadA: number,
): Remark[] {
  const lines = [remark('estimate.labelled', { basis: load.basis }, { path: 'estimate' })];
  if (load.months.length > 0) {
    lines.push(
      remark('estimate.calendarMonths', { timeZone: site.timeZone }, { path: 'estimate.bills' }),
      remark('estimate.peakFactor', {}, { path: 'estimate.bills' }),
    );
    if (site.meteredAt === 'primary') lines.push(remark('estimate.atMeter', {}, { path: 'meteredAt' }));
  }
  if (load.equipment !== null) {
    const full = equipment.filter(({ loadFactor }) => loadFactor === undefined).length;
    const together = equipment.filter(({ coincidence }) => coincidence === undefined).length;
    lines.push(remark('estimate.partLoad', {}, { path: 'estimate.equipment' }));
    if (full > 0) lines.push(remark('estimate.fullLoad', { entries: full }, { path: 'estimate.equipment' }));
    if (together > 0) lines.push(remark('estimate.together', { entries: together }, { path: 'estimate.equipment' }));
  }
  if (loadA > 0) lines.push(remark('estimate.loadCurrent', { loadA }, { path: 'loads.distorting', unit: 'A' }));
  return lines;
}
