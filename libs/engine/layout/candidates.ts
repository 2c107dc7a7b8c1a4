import { InputProblem } from '../problem.js';
import type { Bank, StageGroup } from './bank.js';
import type { CatalogueInput, KvarBasis } from './catalogue.js';
import { nameplateKvar } from './stage.js';

/** The shipped list of preferred sizes; common practice, no source. */
export const COMMON_CATALOGUE = {
  stageKvar: [5, 7.5, 10, 12.5, 15, 20, 25, 30, 40, 50, 60, 75, 100],
  ratedV: [230, 400, 415, 440, 480, 525, 600, 690, 800],
  reactorPct: [0, 5.67, 7, 14],
  maxStages: 12,
} as const;

/** The catalogue a layout is proposed from, every list ascending. */
export interface SettledCatalogue {
  stageKvar: number[];
  kvarBasis: KvarBasis;
  ratedV: number[];
  reactorPct: number[];
  maxStages: number;
  /** most effective kvar, or null */
  maxTotalKvar: number | null;
  interStageUh: number;
  interStageGiven: boolean;
}

/**
 * The site's catalogue with the shipped lists where it gives none.
 * @param input the site file's catalogue
 * @param interStageUh customary inductance between stages [µH]
 * @returns the catalogue and the keys that were taken from the shipped lists
 * @throws InputProblem where the inductance between stages is not above 0
 */
export function settleCatalogue(
  input: CatalogueInput | undefined,
  interStageUh: number,
): { catalogue: SettledCatalogue; absent: (keyof typeof COMMON_CATALOGUE)[] } {
  const keys = Object.keys(COMMON_CATALOGUE) as (keyof typeof COMMON_CATALOGUE)[];
  const ascending = (list: readonly number[]): number[] => [...new Set(list)].sort((a, b) => a - b);
  const betweenUh = input?.interStageUh ?? interStageUh;
  if (!(betweenUh > 0)) {
    throw new InputProblem([
      {
        code: 'out-of-range',
        path: 'catalogue.interStageUh',
        expected: 'more than 0: with none the closed form of the inrush has no end',
        found: `${betweenUh}`,
        unit: 'µH',
      },
    ]);
  }
  return {
    catalogue: {
      stageKvar: ascending(input?.stageKvar ?? COMMON_CATALOGUE.stageKvar),
      kvarBasis: input?.kvarBasis ?? 'rated',
      ratedV: ascending(input?.ratedV ?? COMMON_CATALOGUE.ratedV),
      reactorPct: ascending(input?.reactorPct ?? COMMON_CATALOGUE.reactorPct),
      maxStages: input?.maxStages ?? COMMON_CATALOGUE.maxStages,
      maxTotalKvar: input?.maxTotalKvar ?? null,
      interStageUh: betweenUh,
      interStageGiven: input?.interStageUh !== undefined,
    },
    absent: keys.filter((key) => input?.[key] === undefined),
  };
}

/** A layout before voltage and reactors are chosen: stages of one size, or with one or two of half that size. */
export interface Layout {
  /** full-size stages */
  count: number;
  sizeKvar: number;
  /** stages of half the size: 0, 1 or 2 */
  halves: number;
}

/**
 * Every layout of a catalogue: n stages of one size, or one or two of half that size and the rest of it.
 * @param catalogue sizes [kvar] and the most stages
 * @returns layouts, by size and count
 * @source method-layout
 */
export function layouts(catalogue: Pick<SettledCatalogue, 'stageKvar' | 'maxStages'>): Layout[] {
  const listed = (kvar: number): boolean => catalogue.stageKvar.some((size) => Math.abs(size - kvar) <= 1e-9 * kvar);
  const found: Layout[] = [];
  for (const sizeKvar of catalogue.stageKvar) {
    for (const halves of listed(sizeKvar / 2) ? [0, 1, 2] : [0]) {
      for (let count = 1; count + halves <= catalogue.maxStages; count++) found.push({ count, sizeKvar, halves });
    }
  }
  return found;
}

/**
 * The bank a layout makes with a rated voltage and a reactor ratio; smaller stages first.
 * @param layout sizes and counts
 * @param build rated voltage and bus voltage [V], reactor ratio [%], catalogue, reactor quality
 * @returns the bank
 */
export function bankOf(
  layout: Layout,
  build: { ratedV: number; nominalV: number; reactorPct: number; reactorQuality: number; catalogue: SettledCatalogue },
): Bank {
  const group = (count: number, kvar: number): StageGroup => ({
    count,
    ratedKvar: nameplateKvar(kvar, build, build.catalogue.kvarBasis),
    ratedV: build.ratedV,
    reactorPct: build.reactorPct,
    reactorQuality: build.reactorQuality,
    dischargeOhm: null,
    reactorMaxA: null,
    switchPeakA: null,
    fixed: false,
  });
  const halves = layout.halves === 0 ? [] : [group(layout.halves, layout.sizeKvar / 2)];
  return {
    groups: [...halves, group(layout.count, layout.sizeKvar)],
    interStageUh: build.catalogue.interStageUh,
    interStageGiven: build.catalogue.interStageGiven,
    ambientCategory: null,
  };
}

/** A candidate that can be ordered: how much, how many, how fine, with what reactors. */
export interface Sized {
  effectiveKvar: number;
  stages: number;
  smallestKvar: number;
  reactorPct: number;
}

/**
 * Order in which candidates are preferred: plain before detuned, then least effective total, fewest stages,
 * larger smallest stage, lower reactor ratio.
 * @param a a candidate
 * @param b another
 * @returns below 0 where a comes first
 * @source method-layout
 */
export function preferred(a: Sized, b: Sized): number {
  const detuned = (candidate: Sized): number => (candidate.reactorPct > 0 ? 1 : 0);
  const nearKvar = Math.abs(a.effectiveKvar - b.effectiveKvar) <= 1e-9 * Math.max(a.effectiveKvar, b.effectiveKvar);
  return (
    detuned(a) - detuned(b) ||
    (nearKvar ? 0 : a.effectiveKvar - b.effectiveKvar) ||
    a.stages - b.stages ||
    b.smallestKvar - a.smallestKvar ||
    a.reactorPct - b.reactorPct
  );
}
