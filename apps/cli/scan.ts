import { EXIT } from '#libs/contract/error-body.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { InputProblem, scanSite, siteNetlist } from '#libs/engine/index.js';
import { scanReport } from '#libs/present/scan-report.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { writeNetlists } from './netlist-files.js';
import { say, write, writeJson } from './output.js';
import { inFile } from './refused-file.js';
import { readSiteDocument } from './site-document.js';

const DEFAULT_ORDERS = '1:50:0.02';
const MOST_ORDERS = 100_000;
const PLAIN_NUMBER = /^(?:\d+\.?\d*|\.\d+)$/;
const WHOLE_NUMBER = /^\d{1,9}$/;

/** `scan SITE`: the network's impedance over order, nominal and at every corner. */
export async function run(line: CommandLine): Promise<number> {
  const orders = line.values.get('orders');
  const asked = orders === undefined ? undefined : readOrders(orders);
  const place = { ...readLevel(line.values.get('level')), ...readCorner(line.values.get('corner')) };
  const netlist = line.values.get('netlist');
  const { levels, netlists } = await inFile(line.operand, async () => {
    const site = await readSiteWithMathjs(await readSiteDocument(line.operand));
    return {
      levels: scanSite(site, { ...place, ordersH: asked ?? readOrders(DEFAULT_ORDERS) }).levels,
      netlists:
        netlist === undefined ? null : siteNetlist(site, asked === undefined ? place : { ...place, ordersH: asked }),
    };
  });
  if (netlist !== undefined && netlists !== null) {
    for (const file of await writeNetlists(netlist, netlists)) say(`netlist written to ${file}`);
  }
  if (line.flags.has('json')) await writeJson({ levels });
  else await write(scanReport(levels));
  return EXIT.done;
}

function readLevel(text: string | undefined): { levelKvar?: number } {
  if (text === undefined) return {};
  if (!PLAIN_NUMBER.test(text)) throw new InputProblem([usage('--level KVAR, a number', JSON.stringify(text))]);
  return { levelKvar: Number(text) };
}

function readCorner(text: string | undefined): { corner?: number } {
  if (text === undefined) return {};
  if (WHOLE_NUMBER.test(text)) return { corner: Number(text) };
  throw new InputProblem([usage('--corner K, a whole number, 0 for the nominal corner', JSON.stringify(text))]);
}

/** Orders are a + i·step, each computed on its own so that no error gathers. */
function readOrders(text: string): Float64Array {
  const parts = text.split(':');
  const [a = Number.NaN, b = Number.NaN, step = Number.NaN] = parts.map((part) =>
    PLAIN_NUMBER.test(part) ? Number(part) : Number.NaN,
  );
  const count = Math.floor((b - a) / step + 1e-9) + 1;
  if (!(parts.length === 3 && a >= 1 && b >= a && b <= 1000 && step > 0 && count <= MOST_ORDERS)) {
    const expected = `--orders A:B:STEP with 1 ≤ A ≤ B ≤ 1000 and at most ${MOST_ORDERS} orders`;
    throw new InputProblem([usage(expected, JSON.stringify(text))]);
  }
  return Float64Array.from({ length: count }, (_, i) => Number((a + i * step).toPrecision(12)));
}
