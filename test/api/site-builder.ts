import { DEMO_SITE } from '#apps/server/demo/demo-site.js';

/** A site file that is whole, with what a test wants different. */
export function siteFile(changes: Record<string, unknown> = {}): Record<string, unknown> {
  return { ...structuredClone(DEMO_SITE), name: 'Alder Works', asOf: '2026-01-31', ...changes };
}

/** Days of quarter hours around 300 kW at a power factor of about 0.74, as CSV. */
export function meterFile(days = 40): string {
  const lines = ['begin,active (kW),reactive (kvar)'];
  const firstS = Date.UTC(2025, 2, 1) / 1000;
  for (let i = 0; i < days * 96; i++) {
    const stamp = new Date((firstS + i * 900) * 1000).toISOString().replace(':00.000Z', 'Z');
    const activeKw = 210 + 90 * Math.sin((i / 96) * 2 * Math.PI) + (i % 7);
    lines.push(`${stamp},${activeKw.toFixed(1)},${(activeKw * 0.9 + (i % 5)).toFixed(1)}`);
  }
  return `${lines.join('\n')}\n`;
}
