import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { DEMO_SITE } from '#apps/server/demo/demo-site.js';
import { madeUpMinutes, madeUpMinutesCsv } from './made-up-minutes.js';
import { madeUpYear, madeUpYearCsv } from './made-up-year.js';
import { median } from './stopwatch.js';

const LIMIT_S = 2.5;
const MINUTES_LIMIT_S = 5;
const MINUTES_LIMIT_MB = 400;
const RUNS = 5;
/** Says at its end the most memory that a process held. */
const SAY_MEMORY = `data:text/javascript,${encodeURIComponent(
  'process.on("exit", () => process.stderr.write("\\n" + (process.resourceUsage().maxRSS * 1024) / 1e6))',
)}`;

const site = {
  name: 'Made-up works',
  asOf: '2026-01-31',
  timeZone: 'UTC',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400 },
  meteredAt: 'bus',
  recordedBank: { state: 'none' },
  target: { powerFactor: 0.95 },
  supply: {
    faultLevelMva: { max: 250, min: 180 },
    transformers: [{ ratedKva: 1600, impedancePct: 6, loadLossKw: 15, noLoadLossKw: 2.2, noLoadCurrentPct: 1 }],
  },
  loads: { distorting: [{ name: 'drives', fundamentalA: 250, spectrum: 'six-pulse-choke' }], backgroundPct: [] },
};

/** Times `plan`, each time in a process of its own: a year of quarter hours with its proposal, a year of minutes searched. */
export function benchPlan(): boolean {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-bench-'));
  try {
    return [quarterHours(dir), searchedMinutes(dir)].every((met) => met);
  } finally {
    rmSync(dir, { recursive: true });
  }
}

function quarterHours(dir: string): boolean {
  const pdfFile = join(dir, 'proposal.pdf');
  const planned = plannedTimes(dir, { site, load: madeUpYearCsv(madeUpYear()), options: ['--pdf', pdfFile] });
  if (!readFileSync(pdfFile).subarray(0, 5).equals(Buffer.from('%PDF-'))) throw new Error('plan wrote no PDF');
  const met = planned.tookS < LIMIT_S;
  const said = `${planned.tookS.toFixed(2)} s, under ${LIMIT_S} s: ${met ? 'met' : 'MISSED'}`;
  console.log(`plan with its proposal, 35040 intervals, cold process: ${said}`);
  return met;
}

/** The example's tariff, prices and catalogue on a works of its size. */
function searchedMinutes(dir: string): boolean {
  const planned = plannedTimes(dir, { site: DEMO_SITE, load: madeUpMinutesCsv(madeUpMinutes()), options: [] });
  const met = planned.tookS < MINUTES_LIMIT_S && planned.heldMb < MINUTES_LIMIT_MB;
  const said = `${planned.tookS.toFixed(2)} s, under ${MINUTES_LIMIT_S} s, ${planned.heldMb.toFixed(0)} MB, under ${MINUTES_LIMIT_MB} MB`;
  console.log(`plan with its search, 525600 intervals, cold process: ${said}: ${met ? 'met' : 'MISSED'}`);
  return met;
}

/** Median time and greatest memory of the runs. */
function plannedTimes(
  dir: string,
  { site: of, load, options }: { site: object; load: string; options: string[] },
): { tookS: number; heldMb: number } {
  const [siteFile, loadFile] = ['site.json', 'load.csv'].map((name) => join(dir, name)) as [string, string];
  writeFileSync(siteFile, JSON.stringify(of));
  writeFileSync(loadFile, load);
  const program = fileURLToPath(new URL('../../apps/cli/main.js', import.meta.url));
  const args = ['--import', SAY_MEMORY, program, 'plan', siteFile, '--load', loadFile, ...options, '--json'];
  const runs = Array.from({ length: RUNS }, () => runOnce(args));
  return { tookS: median(runs.map(({ tookS }) => tookS)), heldMb: Math.max(...runs.map(({ heldMb }) => heldMb)) };
}

function runOnce(args: string[]): { tookS: number; heldMb: number } {
  const start = process.hrtime.bigint();
  const { status, stdout, stderr } = spawnSync(process.execPath, args, { encoding: 'utf8', maxBuffer: 1 << 28 });
  const tookS = Number(process.hrtime.bigint() - start) / 1e9;
  // 6 is a plan with a verdict of avoid: as much work as any other.
  if (status !== 0 && status !== 6) throw new Error(`plan ended with ${status}: ${stdout}${stderr}`);
  return { tookS, heldMb: Number(stderr.slice(stderr.lastIndexOf('\n'))) };
}
