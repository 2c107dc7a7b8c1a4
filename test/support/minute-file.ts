/**
 * A meter file of minutes, of any length: large enough that its reading takes time.
 * @param minutes how many rows
 * @param peakKw greatest power [kW]
 */
export function minuteFile(minutes: number, peakKw = 90): string {
  const firstMs = Date.UTC(2023, 0, 1);
  const parts = ['begin,active (kW),reactive (kvar)\n'];
  for (let i = 0; i < minutes; i++) {
    parts.push(new Date(firstMs + i * 60_000).toISOString(), `,${(i % peakKw) + 0.5},${(i % 40) + 0.25}\n`);
  }
  return parts.join('');
}
