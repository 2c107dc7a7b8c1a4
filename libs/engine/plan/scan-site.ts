import { bankLevels, type Level } from '../layout/levels.js';
import { bankColumn, networkColumns, seenSquareInto } from '../network/bus-columns.js';
import type { Corner } from '../network/corners.js';
import { siteNetwork } from '../network/network-model.js';
import { PeakFinder } from '../network/peaks.js';
import { stageAdmittance, stageBranch } from '../network/stage-admittance.js';
import { InputProblem } from '../problem.js';
import { settleBank } from './settle-bank.js';
import { settleSite } from './settle-site.js';
import type { Site } from './site.js';

/** |Z| at the bus over order, in one corner. */
export interface ScannedLevel {
  bus: string;
  levelKvar: number;
  corner: Corner;
  parallelOrderH: number | null;
  peakOhm: number | null;
  orders: number[];
  impedanceOhm: number[];
}

/** A level asked for may be this far from one the bank has [kvar]. */
const LEVEL_REACH_KVAR = 0.5;

/**
 * Network impedance over order at one level, nominal and every corner. Without a record the damping load is 0 unless
 * the site gives it.
 * @param site validated site
 * @param options level [kvar], the bank's highest where absent; orders h ≥ 1 to compute
 * @returns one entry a corner, nominal first
 * @throws InputProblem where no level is within 0.5 kvar of the one asked for
 * @source method-network
 */
export function scanSite(
  site: Site,
  options: { levelKvar?: number; ordersH: Float64Array },
): { levels: ScannedLevel[] } {
  const { site: settled } = settleSite(site, null);
  const { bank } = settleBank(site.bank ?? { stages: [] }, site.frequencyHz);
  const level = chosenLevel(bankLevels(bank, settled.nominalV), options.levelKvar);
  const vector = level.vectors[0]!;
  const model = siteNetwork(settled.supply, settled.loads, {
    nominalV: settled.nominalV,
    loadA: 0,
    topology: settled.topology,
  });
  const finder = new PeakFinder(model, bank);
  const { ordersH } = options;
  const square = new Float64Array(ordersH.length);
  const exponent = settled.supply.resistanceExponent;
  const columns = model.corners.networks.map((_, network) => networkColumns(model, network, ordersH));
  return {
    levels: model.buses.flatMap((name, bus) =>
      model.corners.corners.map((corner) => {
        const factors = model.corners.factors[corner.factors]!;
        const stages = bank.groups.map((group) => stageAdmittance(stageBranch(group, factors, exponent), ordersH));
        seenSquareInto(columns[corner.network]![bus]!, bankColumn(stages, vector, ordersH.length), square);
        const peak = finder.greatest(vector, corner, bus);
        return {
          bus: name,
          levelKvar: level.levelKvar,
          corner: corner.corner,
          parallelOrderH: peak?.orderH ?? null,
          peakOhm: peak?.impedanceOhm ?? null,
          orders: Array.from(ordersH),
          impedanceOhm: Array.from(square, (y) => 1 / Math.sqrt(y)),
        };
      }),
    ),
  };
}

function chosenLevel(levels: readonly Level[], levelKvar: number | undefined): Level {
  if (levelKvar === undefined) return levels[levels.length - 1]!;
  const nearest = levels.reduce((best, level) =>
    Math.abs(level.levelKvar - levelKvar) < Math.abs(best.levelKvar - levelKvar) ? level : best,
  );
  if (Math.abs(nearest.levelKvar - levelKvar) <= LEVEL_REACH_KVAR) return nearest;
  throw new InputProblem([
    {
      code: 'unknown-level',
      path: 'level',
      expected: `one of the levels ${levels.map((level) => level.levelKvar).join(', ')}`,
      found: `${levelKvar}`,
      unit: 'kvar',
    },
  ]);
}
