import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** The command line as it is shipped. */
export const PROGRAM = join(root, 'dist', 'apps', 'cli', 'main.js');

/** Builds the program where a source has changed since. */
export function buildProgram(): void {
  execFileSync(process.execPath, [join(root, '.config', 'built.mjs')], {
    cwd: root,
    stdio: ['ignore', 'ignore', 'inherit'],
  });
}

/** How a run of the program ended. */
export interface Run {
  code: number | null;
  stdout: string;
  stderr: string;
}

/** Files of one test's own, made when asked for. */
export class Workplace {
  readonly dir = mkdtempSync(join(tmpdir(), 'varwright-cli-'));
  #count = 0;

  /** Writes a file and gives its path; anything but text is written as JSON. */
  file(content: unknown, ending = 'json'): string {
    const path = join(this.dir, `${++this.#count}.${ending}`);
    writeFileSync(path, typeof content === 'string' ? content : JSON.stringify(content));
    return path;
  }

  /** Runs the program here. */
  run(args: string[], input = ''): Run {
    const { status, stdout, stderr } = spawnSync(process.execPath, [PROGRAM, ...args], {
      cwd: this.dir,
      input,
      encoding: 'utf8',
      maxBuffer: 1 << 28,
      env: { PATH: process.env.PATH, TZ: 'Pacific/Chatham' }, // the machine's own zone must not matter
    });
    return { code: status, stdout, stderr };
  }

  remove(): void {
    rmSync(this.dir, { recursive: true, force: true });
  }
}

/** An invented site; `changes` replace whole keys, undefined ones leave them out. */
export function site(changes: Record<string, unknown> = {}): Record<string, unknown> {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400, highestV: 420 },
    meteredAt: 'bus',
    target: { powerFactor: 0.95 },
    supply: {
      faultLevelMva: { max: 250, min: 180 },
      transformers: [{ ratedKva: 630, impedancePct: 4, loadLossKw: 6.5 }],
    },
    loads: { distorting: [], backgroundPct: [] },
    bank: { stages: [{ count: 4, ratedKvar: 25, ratedV: 440 }] },
    ...changes,
  };
}

/**
 * An invented record: 15 minutes, two shifts on weekdays.
 * @param days how many days, from Monday 5 January 2026
 * @param change changes a row's cells, or gives null to leave it out; row 0 is the header
 */
export function meterCsv(
  days: number,
  change: (cells: string[], row: number) => string[] | null = (cells) => cells,
): string {
  const rows = [['time begin', 'active power (kW)', 'reactive power (kvar)']];
  for (let i = 0; i < days * 96; i++) {
    const time = new Date(Date.UTC(2026, 0, 5) + i * 900_000).toISOString().slice(0, 16).replace('T', ' ');
    const working = i % 672 < 480 && i % 96 >= 24 && i % 96 < 88;
    const kw = working ? 150 + ((i * 37) % 50) : 20;
    rows.push([time, kw.toFixed(1), (working ? kw * 0.75 : 8).toFixed(1)]);
  }
  const changed = rows.map((cells, row) => change([...cells], row)).filter((cells) => cells !== null);
  return changed.map((cells) => `${cells.join(',')}\n`).join('');
}
