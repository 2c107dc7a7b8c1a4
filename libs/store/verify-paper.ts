import type { EntityManager, SelectQueryBuilder } from 'typeorm';
import { type KnownPaper, type PaperAnswer, paperStanding, tracesOf } from '#libs/review/paper-standing.js';
import { sha256 } from './audit-log.js';
import { IssuedPaper } from './issued-paper.js';
import { ProposalFile } from './proposal-file.js';
import { type RegisterFault, registerFaults } from './register.js';
import { readReview } from './reviews.js';
import { Revision } from './revision.js';
import { StoredSite } from './stored-site.js';

/** What is said of a paper, and of the register that says it. */
export interface VerifiedPaper extends PaperAnswer {
  /** what in the register does not agree with its log; the standing is `altered` then */
  faults: RegisterFault[];
}

/** Narrows a search of revisions to those somebody may see. */
export type Seen = (search: SelectQueryBuilder<Revision>) => SelectQueryBuilder<Revision>;

/** Every revision of the register: for whoever has the database itself. */
export const everything: Seen = (search) => search;

/** The revisions of one organisation; to anybody else they do not exist. */
export function ofOrganisation(organisationId: string): Seen {
  return (search) =>
    search.innerJoin(StoredSite, 'owner', 'owner.id = revision.siteId AND owner.organisationId = :organisationId', {
      organisationId,
    });
}

const MOST_FOUND = 20;

/**
 * Says what a file is worth: the register is searched for it, and held against its log.
 * @param manager a read's manager
 * @param bytes the file
 * @param seen narrows the search
 */
export async function verifyPaper(manager: EntityManager, bytes: Uint8Array, seen: Seen): Promise<VerifiedPaper> {
  const traces = tracesOf(bytes, sha256);
  const hashes = [traces.whole, ...traces.earlier].map((mark) => mark.sha256);
  const known = [
    ...(await papersBy(manager, { seen, table: IssuedPaper, matched: 'issued', hashes })),
    ...(await papersBy(manager, { seen, table: ProposalFile, matched: 'draft', hashes })),
  ];
  if (known.length === 0) known.push(...(await namedBy(manager, traces, seen)));
  const answer = paperStanding(bytes, traces, known);
  if (answer.paper === null) return { ...answer, faults: [] };
  const faults = await registerFaults(manager, answer.paper.revisionId);
  return { ...answer, ...(faults.length === 0 ? {} : { standing: 'altered' }), faults };
}

/** What a typed content number leads to. */
export interface NumberedRevision extends Omit<KnownPaper, 'matched' | 'sha256'> {
  faults: RegisterFault[];
}

/**
 * The revisions a content number stands for, for whoever has a scan: that the scan shows what they say is theirs to see.
 * @param manager a read's manager
 * @param digits from `contentNumber`
 * @param seen narrows the search
 */
export async function verifyNumber(manager: EntityManager, digits: string, seen: Seen): Promise<NumberedRevision[]> {
  const search = seen(manager.createQueryBuilder(Revision, 'revision'));
  const found = await search
    .andWhere('revision.contentHash LIKE :start', { start: `${digits}%` })
    .orderBy('revision.createdAt')
    .take(MOST_FOUND)
    .getMany();
  const answers: NumberedRevision[] = [];
  for (const revision of found) {
    const {
      matched: _,
      sha256: __,
      ...paper
    } = await knownPaper(manager, revision, { matched: 'named', sha256: null });
    answers.push({ ...paper, faults: await registerFaults(manager, revision.id) });
  }
  return answers;
}

interface PaperSearch {
  seen: Seen;
  table: typeof IssuedPaper | typeof ProposalFile;
  matched: 'issued' | 'draft';
  hashes: string[];
}

async function papersBy(manager: EntityManager, { seen, table, matched, hashes }: PaperSearch): Promise<KnownPaper[]> {
  const rows = await seen(manager.createQueryBuilder(Revision, 'revision'))
    .innerJoin(table, 'paper', 'paper.revisionId = revision.id')
    .addSelect('paper.sha256', 'paper_hash')
    .andWhere('paper.sha256 IN (:...hashes)', { hashes })
    .take(MOST_FOUND)
    .getRawAndEntities<{ paper_hash: string }>();
  return Promise.all(
    rows.entities.map((revision, at) =>
      knownPaper(manager, revision, { matched, sha256: rows.raw[at]?.paper_hash ?? null }),
    ),
  );
}

async function namedBy(
  manager: EntityManager,
  { contentHashes, names }: ReturnType<typeof tracesOf>,
  seen: Seen,
): Promise<KnownPaper[]> {
  const search = () => seen(manager.createQueryBuilder(Revision, 'revision'));
  const byHash = await revisionsOfContent(manager, contentHashes, seen);
  // equal inputs may have led to several revisions: the file names its own
  const isNamed = ({ number, revision }: Revision): boolean => names.includes(`${number}, revision ${revision}`);
  byHash.sort((one, other) => Number(isNamed(other)) - Number(isNamed(one)));
  const found = byHash.length > 0 ? byHash : (await Promise.all(names.map((name) => byName(search(), name)))).flat();
  return Promise.all(found.map((revision) => knownPaper(manager, revision, { matched: 'named', sha256: null })));
}

/**
 * Revisions of equal inputs, the earliest first.
 * @param manager a read's manager
 * @param contentHashes of the inputs
 * @param seen narrows the search
 */
export async function revisionsOfContent(
  manager: EntityManager,
  contentHashes: readonly string[],
  seen: Seen,
): Promise<Revision[]> {
  if (contentHashes.length === 0) return [];
  return seen(manager.createQueryBuilder(Revision, 'revision'))
    .andWhere('revision.contentHash IN (:...contentHashes)', { contentHashes })
    .orderBy('revision.createdAt')
    .take(MOST_FOUND)
    .getMany();
}

function byName(search: SelectQueryBuilder<Revision>, name: string): Promise<Revision[]> {
  const [, number, revision] = /^(\S+), revision (\d+)$/.exec(name) ?? [];
  return search
    .andWhere('revision.number = :number AND revision.revision = :revision', { number, revision: Number(revision) })
    .take(MOST_FOUND)
    .getMany();
}

async function knownPaper(
  manager: EntityManager,
  { id, siteId, number, revision, contentHash }: Revision,
  match: Pick<KnownPaper, 'matched' | 'sha256'>,
): Promise<KnownPaper> {
  const { review } = await readReview(manager, id);
  const { state, supersededBy } = review;
  return { siteId, revisionId: id, number, revision, state, supersededBy, contentHash, ...match };
}
