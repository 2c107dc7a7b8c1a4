import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { EXIT } from '#libs/contract/error-body.js';
import { InputProblem } from '#libs/engine/index.js';
import { type HeldExport, heldExport } from '#libs/meter-files/read-plan-file.js';
import { exportWords } from '#libs/present/export-words.js';
import { planTables } from '#libs/present/result-tables.js';
import { numberWords, paperWords } from '#libs/present/review-words.js';
import { contentNumber, MOST_PAPER_BYTES, type PaperStanding } from '#libs/review/paper-standing.js';
import type { ReviewState } from '#libs/review/review.js';
import { openRegister, type Register } from '#libs/store/open-register.js';
import { verifyExport } from '#libs/store/verify-export.js';
import { everything, verifyNumber, verifyPaper } from '#libs/store/verify-paper.js';
import type { CommandLine } from './command.js';
import { textHash } from './frozen-inputs.js';
import { openInput } from './input-file.js';
import { write, writeJson } from './output.js';
import { inFile } from './refused-file.js';

/** How the command ends: approved as it stands, known but nothing to build by, not ours. */
const EXIT_OF: Record<PaperStanding, number> = {
  approved: EXIT.done,
  superseded: EXIT.avoid,
  withdrawn: EXIT.avoid,
  draft: EXIT.avoid,
  altered: EXIT.avoid,
  unknown: EXIT.refused,
};

/** Says what a paper is worth, by the register of an installation: a file, or the content number typed from a scan. */
export async function run(line: CommandLine): Promise<number> {
  const { operand, values, flags } = line;
  const digits = existsSync(operand) ? null : contentNumber(operand);
  const bytes = digits === null ? await inFile(operand, () => readPaper(operand)) : null;
  const url = values.get('database') ?? process.env.DB_URL ?? ownDatabase();
  const register = await openRegister(url);
  try {
    const answer = bytes === null ? await byNumber(register, digits ?? '') : await byFile(register, bytes);
    if (flags.has('json')) await writeJson(answer.told);
    else await write(`${answer.text}\n`);
    return answer.exit;
  } finally {
    await register.close();
  }
}

/** Where the server keeps its data when nothing else is said. */
function ownDatabase(): string {
  return `sqlite:${join(resolve(process.env.DATA_DIR ?? 'var'), 'varwright.sqlite')}`;
}

interface Answer {
  told: object;
  text: string;
  exit: number;
}

async function byFile(register: Register, bytes: Uint8Array): Promise<Answer> {
  const held = await heldExport(bytes, { hash: textHash, tablesOf: planTables });
  return held === null ? byPaper(register, bytes) : byExport(register, held);
}

async function byExport({ manager }: Register, { fault, ...held }: HeldExport): Promise<Answer> {
  const { kind, contentHash } = held;
  const { differences, ...answer } = await verifyExport(manager, held, everything);
  const { paper, faults } = answer;
  const name = paper === null ? null : `${paper.number}, revision ${paper.revision}`;
  const { state = null, supersededBy = null } = paper ?? {};
  const exported = { kind, differences, fault };
  const text = exportWords({ ...answer, ...exported, name, state, supersededBy, registerHolds: faults.length === 0 });
  return {
    told: { ...answer, signedAfterwards: false, text, exported: { contentHash, ...exported } },
    text,
    exit: EXIT_OF[answer.standing],
  };
}

async function byPaper({ manager }: Register, bytes: Uint8Array): Promise<Answer> {
  const { paper, faults, ...answer } = await verifyPaper(manager, bytes, everything);
  const name = paper === null ? null : `${paper.number}, revision ${paper.revision}`;
  const { state = null, supersededBy = null } = paper ?? {};
  const text = paperWords({ ...answer, name, state, supersededBy, registerHolds: faults.length === 0 });
  return { told: { ...answer, text, paper, faults }, text, exit: EXIT_OF[answer.standing] };
}

async function byNumber({ manager }: Register, digits: string): Promise<Answer> {
  const papers = await verifyNumber(manager, digits, everything);
  const lines = papers.map(({ number, revision, state, supersededBy, faults }) => {
    const name = `${number}, revision ${revision}`;
    const broken = { standing: 'altered', signedAfterwards: false, name, state, supersededBy } as const;
    return faults.length === 0
      ? numberWords(name, state, supersededBy)
      : paperWords({ ...broken, registerHolds: false });
  });
  const text = lines.length === 0 ? 'No plan of this register has that number.' : lines.join('\n');
  const isApproved = ({ state, faults }: { state: ReviewState; faults: object[] }) =>
    state === 'approved' && faults.length === 0;
  const known = papers.some(isApproved) ? EXIT.done : EXIT.avoid;
  const told = { number: digits, text, papers };
  return { told, text, exit: papers.length === 0 ? EXIT.refused : known };
}

async function readPaper(path: string): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of (await openInput(path)).bytes) {
    size += chunk.length;
    if (size > MOST_PAPER_BYTES) {
      const expected = `a paper of at most ${MOST_PAPER_BYTES} bytes`;
      throw new InputProblem([{ code: 'too-large', expected, found: 'more' }]);
    }
    chunks.push(new Uint8Array(chunk));
  }
  return Buffer.concat(chunks);
}
