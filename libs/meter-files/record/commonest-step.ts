/**
 * The commonest step between neighbouring moments, the shorter of two equally common ones.
 * @param momentS moments, ascending in the given order [s]
 * @param order indices of the moments that count, in time order; all of them as they stand without it
 * @returns NaN where there are fewer than two [s]
 */
export function commonestStepS(momentS: Float64Array, order?: Int32Array): number {
  const n = order?.length ?? momentS.length;
  const at = (i: number) => momentS[order === undefined ? i : order[i]!]!;
  const counts = new Map<number, number>();
  // most steps are alike: a run of them is counted at once
  let runS = n < 2 ? Number.NaN : at(1) - at(0);
  let run = Math.min(1, n - 1);
  for (let i = 2; i < n; i++) {
    const stepS = at(i) - at(i - 1);
    if (stepS === runS) {
      run++;
      continue;
    }
    counts.set(runS, (counts.get(runS) ?? 0) + run);
    runS = stepS;
    run = 1;
  }
  counts.set(runS, (counts.get(runS) ?? 0) + run);
  let bestS = Number.NaN;
  let most = 0;
  for (const [stepS, count] of counts) {
    if (!(stepS > 0) || count < most || (count === most && stepS > bestS)) continue;
    bestS = stepS;
    most = count;
  }
  return bestS;
}
