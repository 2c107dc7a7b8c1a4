/** How long work takes, leaving out the time in which other programs had the processor [ms]. */
export async function timed<T>(work: () => Promise<T>): Promise<{ outcome: T; ms: number }> {
  const startMs = performance.now();
  const start = process.cpuUsage();
  const outcome = await work();
  const { user, system } = process.cpuUsage(start);
  return { outcome, ms: Math.min(performance.now() - startMs, (user + system) / 1000) };
}
