import type { Site } from './site.js';

const STEP = 0.01;

/**
 * Set points a plan tries, ascending: the site's own alone; else the catalogue's; else the target, each hundredth above
 * it, and 1.
 * @param site validated site
 * @param targetPowerFactor λ of the target
 * @returns set points
 * @source method-controller
 */
export function setPointsOf(site: Site, targetPowerFactor: number): number[] {
  const given = site.control?.setPointPowerFactor;
  if (given !== undefined) return [given];
  const listed = site.catalogue?.setPoints;
  if (listed !== undefined) return [...new Set(listed)].sort((a, b) => a - b);
  const points = [targetPowerFactor];
  for (let k = 1; targetPowerFactor + STEP * k < 1 - 1e-9; k++) {
    points.push(Number((targetPowerFactor + STEP * k).toFixed(6)));
  }
  if (targetPowerFactor < 1) points.push(1);
  return points;
}
