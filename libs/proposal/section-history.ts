import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { say, words } from '#libs/present/language.js';
import { formatDate } from '#libs/present/local-stamp.js';
import { plainName } from '#libs/present/plain-name.js';
import { REVISION_HEADS, revisionCells, revisionNumbers } from '#libs/present/revision-numbers.js';
import type { Paper } from './paper.js';
import type { PastRevision, ProposalFrame } from './proposal-frame.js';
import { type Cell, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 8.8 };

/** Widths of the columns under `REVISION_HEADS`. */
const REVISION_SHARES = [14, 14, 14, 14, 17, 14, 14, 17] as const;

const KINDS = words({ plan: 'a new bank', assess: 'the site’s bank' } as const);

/** Every revision with who made it and why, and what each came to. */
export function drawHistory(paper: Paper, outcome: Outcome | EstimateOutcome, frame: ProposalFrame): void {
  const own: PastRevision = {
    revision: frame.revision,
    kind: outcome.kind,
    date: frame.date ?? null,
    author: frame.preparedBy,
    reason: frame.reason ?? null,
    contentHash: frame.contentHash,
    engineVersion: frame.engineVersion,
    numbers: revisionNumbers(outcome.result),
  };
  const past = frame.history ?? [];
  const all = [...past, own];
  const count = past.length === 0 ? say`the first` : say`${all.length} revisions in numbers`;
  paper.heading('20', say`Revision history: ${count}`, { keep: 130 });
  const numbers = [
    { head: say`revision`, share: 12 },
    ...REVISION_HEADS.map((head, at) => ({ head, share: REVISION_SHARES[at]! })),
  ];
  drawTable(
    paper,
    numbers.map(({ head, share }, at) => ({
      head,
      share,
      align: at === 0 || at === REVISION_HEADS.length ? ('left' as const) : ('right' as const),
    })),
    all.map((one): Cell[] => [String(one.revision), ...revisionCells(one.numbers)]),
    { style: SMALL, padding: 2.4 },
  );
  const who = [
    { head: say`revision`, share: 12 },
    { head: say`date`, share: 18 },
    { head: say`of`, share: 18 },
    { head: say`prepared by`, share: 26 },
    { head: say`reason`, share: 46 },
    { head: say`engine`, share: 10 },
    { head: say`content`, share: 32 },
  ];
  drawTable(
    paper,
    who,
    all.map((one): Cell[] => [
      String(one.revision),
      one.date === null ? '–' : formatDate(one.date),
      KINDS[one.kind],
      plainName(one.author ?? '–'),
      plainName(one.reason ?? '–'),
      one.engineVersion,
      one.contentHash.slice(0, 16).replace(/(.{4})(?=.)/g, '$1 '),
    ]),
    { style: SMALL, padding: 2.4 },
  );
}
