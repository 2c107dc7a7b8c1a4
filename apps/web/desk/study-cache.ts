import {
  type LoadRecord,
  needColumn,
  percentile,
  type Site,
  type Study,
  studySite,
  summarizeRequirement,
  type ZoneTable,
} from '#libs/engine/index.js';
import type { TargetSweep } from '#libs/present/target-curve.js';

/** Parts of a site that a study does not depend on. */
const APART: readonly (keyof Site)[] = ['bank', 'control', 'catalogue', 'tariff', 'prices', 'finance', 'name', 'asOf'];

/** Targets at which the need is tabled. */
const TARGETS = Array.from({ length: 31 }, (_, i) => Math.round(850 + 5 * i) / 1000);

/** Keeps the last study, so that a change of the bank does not go over the record again. */
export class StudyCache {
  #study: Study | null = null;
  #key = '';
  #keyWithoutTarget = '';
  #sweep: { key: string; sweep: TargetSweep } | null = null;

  constructor(
    readonly record: LoadRecord,
    readonly zone: ZoneTable,
  ) {}

  /** @returns the study of a site, made anew only where it must be */
  of(site: Site): Study {
    const key = keyOf(site, APART);
    if (this.#study !== null && key === this.#key) return this.#study;
    const keyWithoutTarget = keyOf(site, [...APART, 'target']);
    const before = keyWithoutTarget === this.#keyWithoutTarget ? this.#study : null;
    this.#study = before === null ? studySite(site, this.record, this.zone) : retargeted(before, site);
    this.#key = key;
    this.#keyWithoutTarget = keyWithoutTarget;
    return this.#study;
  }

  /** @returns the need at a row of targets for a study of this cache */
  sweep(study: Study): TargetSweep {
    if (this.#sweep?.key === this.#keyWithoutTarget) return this.#sweep.sweep;
    const sweep: TargetSweep = { powerFactors: TARGETS, maxKvar: [], p95Kvar: [], p50Kvar: [] };
    for (const powerFactor of TARGETS) {
      const need = needColumn(study.load, { ...study.target, powerFactor }, study.record.beginS).sort();
      sweep.maxKvar.push(need.at(-1)!);
      sweep.p95Kvar.push(percentile(need, 0.95));
      sweep.p50Kvar.push(percentile(need, 0.5));
    }
    this.#sweep = { key: this.#keyWithoutTarget, sweep };
    return sweep;
  }
}

/** Only the target differs: the load at the bus and the network stand. */
function retargeted(study: Study, site: Site): Study {
  const powerFactor = site.target?.powerFactor ?? study.site.targetPowerFactor;
  const onExport = site.target?.onExport ?? study.site.onExport;
  const target = { powerFactor, onExport };
  const needKvar = needColumn(study.load, target, study.record.beginS);
  return {
    ...study,
    site: { ...study.site, targetPowerFactor: powerFactor, onExport },
    assumptions: study.assumptions.filter(({ path }) => !path?.startsWith('target.')),
    target,
    needKvar,
    requirement: summarizeRequirement(study.record, needKvar, study.months, powerFactor),
  };
}

function keyOf(site: Site, apart: readonly string[]): string {
  return JSON.stringify(Object.fromEntries(Object.entries(site).filter(([name]) => !apart.includes(name))));
}
