/**
 * A meter file of minutes, of any length. Its cells are quoted, so that reading it takes time on any machine.
 * @param minutes how many rows
 * @param peakKw greatest power [kW]
 */
export function minuteFile(minutes: number, peakKw = 90): string {
  const firstMs = Date.UTC(2023, 0, 1);
  const parts = ['begin,active (kW),reactive (kvar)\n'];
  for (let i = 0; i < minutes; i++) {
    const stamp = new Date(firstMs + i * 60_000).toISOString();
    parts.push(`"${stamp}","${(i % peakKw) + 0.5}","${(i % 40) + 0.25}"\n`);
  }
  return parts.join('');
}
