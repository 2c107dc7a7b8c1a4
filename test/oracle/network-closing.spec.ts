// Reference: ngspice 45 as packed in eecircuit-engine 1.8.0, a general-purpose circuit simulator: transients of the whole
// network round a closing, other capacitors at other buses in their steady state. Second method: the same network with its
// capacitors moved to the bank's own bus, where the circuit is a single loop.
import { beforeAll, describe, expect, it } from 'vitest';
import {
  type Closing,
  closingNetlist,
  closingPeak,
  closingStandings,
  closings,
  networkScene,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { CircuitSimulator } from '../support/circuit-simulator.js';
import { madeBuses } from '../support/made-buses.js';
import { runs, SEED } from '../support/soak.js';

const simulator = new CircuitSimulator();
beforeAll(() => simulator.start(), 60_000);

/** The stated limit: a tenth of a per cent of the simulator's transient. */
const RELATIVE = 1e-3;

function allClosings(number: number): Closing[] {
  const site = madeBuses(chance(SEED + 613 * number));
  const { bank, levels, model } = networkScene(site);
  const place = {
    nominalV: site.bus.nominalV,
    frequencyHz: site.frequencyHz,
    standings: closingStandings(model, site.frequencyHz),
    vectors: levels.flatMap(({ vectors }) => vectors),
  };
  return bank.groups.flatMap((_, g) => closings(bank, g, place));
}

// A few of every generated network that has capacitors behind an impedance.
const cases = Array.from({ length: runs(24, 400) }, (_, number) =>
  allClosings(number)
    .filter(({ circuit }) => circuit.network !== undefined)
    .filter((_, k, all) => k === 0 || k === all.length - 1)
    .map(({ circuit }, k) => ({ number, k, circuit })),
).flat();

describe(`closing in a network with other capacitors, against a circuit simulator (seed ${SEED})`, () => {
  it('has cases', () => expect(cases.length).toBeGreaterThan(10));

  it.each(cases)(
    'network $number, closing $k: reaches the peak in the transient that the netlist describes',
    async ({ circuit }) => {
      const { peakA } = closingPeak(circuit);
      const netlist = closingNetlist(circuit, 'a stage is closed').replace('.end\n', '.save i(vclosing)\n.end\n');
      const { value } = await simulator.greatest(netlist, 'i(vclosing)');
      expect(Math.abs(value / peakA - 1), JSON.stringify({ peakA, value, circuit })).toBeLessThan(RELATIVE);
    },
    120_000,
  );
});
