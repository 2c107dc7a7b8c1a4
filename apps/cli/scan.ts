import { EXIT } from '#libs/contract/error-body.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { InputProblem, scanSite } from '#libs/engine/index.js';
import { scanReport } from '#libs/present/terminal-report.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { readJson } from './input-file.js';
import { write, writeJson } from './output.js';
import { inFile } from './refused-file.js';

const DEFAULT_ORDERS = '1:50:0.02';
const MOST_ORDERS = 100_000;
const PLAIN_NUMBER = /^(?:\d+\.?\d*|\.\d+)$/;

/** `scan SITE`: the network's impedance over order, nominal and at every corner. */
export async function run(line: CommandLine): Promise<number> {
  const ordersH = readOrders(line.values.get('orders') ?? DEFAULT_ORDERS);
  const levelKvar = readLevel(line.values.get('level'));
  const levels = await inFile(line.operand, async () => {
    const site = await readSiteWithMathjs(await readJson(line.operand));
    return scanSite(site, levelKvar === undefined ? { ordersH } : { levelKvar, ordersH }).levels;
  });
  if (line.flags.has('json')) await writeJson({ levels });
  else await write(scanReport(levels));
  return EXIT.done;
}

function readLevel(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  if (!PLAIN_NUMBER.test(text)) throw new InputProblem([usage('--level KVAR, a number', JSON.stringify(text))]);
  return Number(text);
}

/** Orders are a + i·step, each computed on its own so that no error gathers. */
function readOrders(text: string): Float64Array {
  const parts = text.split(':');
  const [a = Number.NaN, b = Number.NaN, step = Number.NaN] = parts.map((part) =>
    PLAIN_NUMBER.test(part) ? Number(part) : Number.NaN,
  );
  const count = Math.floor((b - a) / step + 1e-9) + 1;
  if (!(parts.length === 3 && a > 0 && b >= a && b <= 1000 && step > 0 && count <= MOST_ORDERS)) {
    const expected = `--orders A:B:STEP with 0 < A ≤ B ≤ 1000 and at most ${MOST_ORDERS} orders`;
    throw new InputProblem([usage(expected, JSON.stringify(text))]);
  }
  return Float64Array.from({ length: count }, (_, i) => Number((a + i * step).toPrecision(12)));
}
