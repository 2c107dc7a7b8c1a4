import type { DistortingLoad } from '../network/loads.js';
import { injectedOrders, zeroSequenceOrders } from '../network/spectra.js';
import type { Problem } from '../problem.js';
import type { Site } from './site.js';

/**
 * Distorting loads that stand nowhere, or whose spectrum comes to nothing: either would drop out of the flow unseen.
 * @param site validated site
 * @returns a problem for each such load
 * @source method-network
 */
export function loadProblems(site: Site): Problem[] {
  return (site.loads?.distorting ?? []).flatMap((load, i) => {
    const path = `loads.distorting[${i}]`;
    return [
      ...placeProblems(site, load, `${path}.bus`),
      ...spectrumProblems(load, path),
      ...sequenceProblems(load, path),
    ];
  });
}

function placeProblems(site: Site, { bus }: DistortingLoad, path: string): Problem[] {
  if (bus === undefined) return [];
  const buses = site.network?.buses.map(({ name }) => name) ?? [];
  if (buses.includes(bus)) return [];
  const expected =
    buses.length === 0
      ? 'no bus, since the site has no network part'
      : `one of the buses ${buses.map((name) => `"${name}"`).join(', ')}`;
  return [{ code: 'inconsistent', path, expected, found: `"${bus}"` }];
}

function spectrumProblems(load: DistortingLoad, path: string): Problem[] {
  if (load.orders === undefined || load.fundamentalA === 0) return [];
  if (injectedOrders(load).length > 0 || zeroSequenceOrders(load).some(({ pct }) => pct > 0)) return [];
  const expected = 'an order up to 50 above 0 %, or no such load';
  return [{ code: 'inconsistent', path: `${path}.orders`, expected, found: 'orders that come to nothing' }];
}

// In three equal phases only multiples of three are alike; anything else said to be would vanish from the flow.
function sequenceProblems(load: DistortingLoad, path: string): Problem[] {
  return (load.orders ?? []).flatMap(({ orderH, sequence }, k): Problem[] => {
    if (sequence !== 'zero' || orderH % 3 === 0) return [];
    const expected = 'a multiple of three; other orders of a balanced load flow through the bank';
    return [
      { code: 'inconsistent', path: `${path}.orders[${k}].sequence`, expected, found: `"zero" at order ${orderH}` },
    ];
  });
}
