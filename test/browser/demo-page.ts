import type { TestServer } from '../support/test-server.js';

/** What each station shows once its figures stand. */
export const STATIONS_SHOWN: Record<string, RegExp> = {
  record: /The record, down to its intervals/,
  supply: /drawn from the data/,
  need: /Rows are hours of the day/,
  bank: /replayed/,
  network: /reactors: every level|levels over a limit/,
  money: /an estimate, not a guarantee|not priced\./,
  proposal: /Every revision is kept/,
};

/** Waits until the example of a new installation has its plan, and gives its site's id. */
export async function openDemo(server: TestServer): Promise<string> {
  for (let attempt = 0; attempt < 600; attempt++) {
    const { sites } = (await server.ask('GET', '/api/sites')).body;
    if (sites[0]?.latest != null) return sites[0].id;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('the example got no plan');
}
