import { networkIsUnknown } from '../duty/judge-bank.js';
import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { SettledCatalogue } from '../layout/candidates.js';
import { BankCandidates, type Candidate } from './bank-candidates.js';
import { type Judged, judge, overallVerdict } from './judge-basis.js';
import { settleControl } from './settle-bank.js';
import type { Site } from './site.js';

/** A bank chosen by its kvar alone, and what it falls short of. */
export interface BankByNeed {
  bank: Bank;
  /** `needOutOfReach`: nothing of the catalogue is as large; `onlyAvoid`: everything is over a limit */
  shortOf: 'needOutOfReach' | 'onlyAvoid' | null;
}

/**
 * The preferred bank of a catalogue that gives a number of kvar, on its network alone: the first that is clear, else the
 * first that is `watch`; where none is as large, the largest of them; where all are over a limit, the first.
 * @param judged settled site and its network
 * @param site validated site
 * @param catalogue what may be built
 * @param kvar wanted, effective [kvar]
 * @returns the choice, or null where the catalogue makes no candidate
 * @source method-layout, method-estimate
 */
export function bankByNeed(judged: Judged, site: Site, catalogue: SettledCatalogue, kvar: number): BankByNeed | null {
  const { maxTotalKvar } = catalogue;
  const candidates = new BankCandidates(judged, site, catalogue);
  const allowed = ({ effectiveKvar }: Candidate): boolean => maxTotalKvar !== null && effectiveKvar > maxTotalKvar;
  const sieve: Sieve = {
    candidates,
    mayBeClear: overallVerdict(judged, { verdict: 'clear' }) === 'clear' && !networkIsUnknown(judged.site.loads),
    verdictOf: ({ bank }) => {
      const { control } = settleControl(site.control, bank, judged.site);
      return overallVerdict(judged, judge(judged, bank, control));
    },
  };
  const within = firstWithin(sieve, candidates.list(kvar * (1 - 1e-9), allowed));
  if (within !== null) return { bank: within.bank, shortOf: null };
  const all = candidates.list(0, allowed).filter((candidate) => candidates.flows(candidate) !== null);
  if (all.length === 0) return null;
  const reaching = all.filter(({ effectiveKvar }) => effectiveKvar >= kvar * (1 - 1e-9));
  if (reaching.length > 0) return { bank: reaching[0]!.bank, shortOf: 'onlyAvoid' };
  const largestFirst = [...all].sort((a, b) => b.effectiveKvar - a.effectiveKvar);
  const largest = firstWithin({ ...sieve, mayBeClear: false }, largestFirst);
  return { bank: (largest ?? largestFirst[0]!).bank, shortOf: largest === null ? 'onlyAvoid' : 'needOutOfReach' };
}

interface Sieve {
  candidates: BankCandidates;
  /** false where something is unknown that no bank mends: the first that is `watch` will do */
  mayBeClear: boolean;
  verdictOf(candidate: Candidate): Verdict;
}

function firstWithin({ candidates, mayBeClear, verdictOf }: Sieve, list: readonly Candidate[]): Candidate | null {
  let watched: Candidate | null = null;
  for (const candidate of list) {
    if (candidates.isRuledOut(candidate)) continue;
    const flows = candidates.flows(candidate);
    if (flows === null || flows === 'avoid' || (watched !== null && flows === 'watch')) continue;
    const verdict = verdictOf(candidate);
    if (verdict === 'clear' || (verdict === 'watch' && !mayBeClear)) return candidate;
    if (verdict === 'watch') watched ??= candidate;
  }
  return watched;
}
