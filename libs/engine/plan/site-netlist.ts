import { closingPeak } from '../duty/closing-circuit.js';
import { closingNetlist } from '../duty/closing-netlist.js';
import { closingStandings } from '../duty/closing-standings.js';
import { type Closing, closings } from '../duty/inrush.js';
import type { Corner } from '../network/corners.js';
import { networkNetlist } from '../network/network-netlist.js';
import { InputProblem } from '../problem.js';
import { chosenCorner, chosenLevel, chosenOrders, type NetworkScene, networkScene } from './network-scene.js';
import type { ScanOptions } from './scan-site.js';
import type { Site } from './site.js';

/** A site as netlists for any circuit simulator. */
export interface SiteNetlist {
  /** network at a level and corner, one copy an order */
  network: string;
  /** the closing with the greatest peak; null without a bank */
  inrush: string | null;
}

/** Orders of a netlist where none are asked for and none are present. */
const CUSTOMARY_ORDERS_H = [5, 7, 11, 13];
/** Most orders of one netlist: each is a copy of the whole network. */
const MOST_ORDERS = 1000;

/**
 * A site's network at a level and corner, and its gravest closing, as plain SPICE netlists for a second opinion.
 * @param site validated site
 * @param options level, corner (nominal where absent), orders (those present where absent, else 5, 7, 11, 13)
 * @returns texts
 * @throws InputProblem where there is no such level or corner, or too many orders
 * @source method-network
 */
export function siteNetlist(site: Site, options: Partial<ScanOptions>): SiteNetlist {
  const scene = networkScene(site);
  const { bank, levels, model } = scene;
  const level = chosenLevel(levels, options.levelKvar);
  const corner = chosenCorner(model, options.corner ?? 0);
  const present = model.excitation.ordersH;
  const usual = present.length > 0 ? present : Float64Array.from(CUSTOMARY_ORDERS_H);
  const ordersH = chosenOrders(options.ordersH ?? usual);
  if (ordersH.length > MOST_ORDERS) {
    const expected = `at most ${MOST_ORDERS} orders, each being a copy of the network`;
    throw new InputProblem([{ code: 'too-large', path: 'orders', expected, found: `${ordersH.length}` }]);
  }
  const gravest = gravestClosing(scene);
  return {
    network: networkNetlist(model, {
      bank,
      vector: level.vectors[0]!,
      corner,
      ordersH,
      frequencyHz: site.frequencyHz,
      title: `${site.name}: ${level.levelKvar} kvar connected, ${cornerWords(corner.corner)}`,
    }),
    inrush:
      gravest === null
        ? null
        : closingNetlist(
            gravest.circuit,
            `${site.name}: one stage of group ${gravest.group + 1} closed onto ${stagesWords(gravest)}`,
          ),
  };
}

function gravestClosing({ site, bank, levels, model }: NetworkScene): (Closing & { group: number }) | null {
  const place = {
    nominalV: site.nominalV,
    frequencyHz: site.frequencyHz,
    standings: closingStandings(model, site.frequencyHz),
    vectors: levels.flatMap(({ vectors }) => vectors),
  };
  let gravest: (Closing & { group: number }) | null = null;
  let mostA = 0;
  for (const group of bank.groups.keys()) {
    for (const closing of closings(bank, group, place)) {
      const { peakA } = closingPeak(closing.circuit);
      if (peakA <= mostA) continue;
      mostA = peakA;
      gravest = { ...closing, group };
    }
  }
  return gravest;
}

function cornerWords(corner: Corner): string {
  const { faultLevelMva, capacitanceFactor, inductanceFactor, dampingKw, standing } = corner;
  const { networkCapacitanceFactor: capacitance, networkInductanceFactor: inductance } = corner;
  const parts = [
    `fault level ${faultLevelMva} MVA`,
    `capacitance x ${capacitanceFactor}`,
    `inductance x ${inductanceFactor}`,
    `damping ${dampingKw} kW`,
  ];
  return [
    ...parts,
    ...(standing === undefined ? [] : [standing]),
    ...(capacitance === undefined
      ? []
      : [`network's capacitors: capacitance x ${capacitance}, inductance x ${inductance}`]),
  ].join(', ');
}

function stagesWords({ vector, standing }: Closing): string {
  const connected = Array.from(vector, (count, g) => (count > 0 ? `${count} of group ${g + 1}` : ''));
  const bank = connected.filter((part) => part !== '').join(', ') || 'the supply alone';
  return standing === '' ? bank : `${bank}, ${standing}`;
}
