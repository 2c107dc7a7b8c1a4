import type { Site } from '#libs/engine/index.js';

/** Something to ask on the visit, and the field it settles. */
export interface VisitQuestion {
  path: string;
  question: string;
  why: string;
}

/** What is known of a site so far, whatever of it could be read. */
export type KnownOfSite = Partial<Pick<Site, 'recordedBank' | 'loads' | 'tariff' | 'place'>> & {
  supply?: Partial<Site['supply']> & { faultLevel?: unknown };
};

const QUESTIONS: (VisitQuestion & { isOpen: (site: KnownOfSite) => boolean })[] = [
  {
    path: 'recordedBank.state',
    question: 'Was a bank working while the record was taken, and which?',
    why: 'What it gave is missing in the record, and is needed on top.',
    isOpen: ({ recordedBank }) => recordedBank === undefined || recordedBank.state === 'unknown',
  },
  {
    path: 'loads.distorting',
    question: 'Which drives, rectifiers and welders run, with which current, with or without a choke?',
    why: 'They decide whether the bank needs reactors, and which.',
    isOpen: ({ loads }) => loads?.distorting === undefined,
  },
  {
    path: 'supply.faultLevelMva.min',
    question: 'What are the greatest and the least fault level, by the network operator?',
    why: 'They place the resonance, which may meet an order the drives inject.',
    isOpen: ({ supply }) => supply?.faultLevel === undefined && supply?.faultLevelMva?.min === undefined,
  },
  {
    path: 'tariff.clauses',
    question: 'How does the bill charge reactive energy and demand?',
    why: 'It decides whether the bank pays.',
    isOpen: ({ tariff }) => tariff === undefined,
  },
  {
    path: 'loads.backgroundPct',
    question: 'Which harmonic voltages stand at the bus with the plant off?',
    why: 'The bank draws them in.',
    isOpen: ({ loads }) => loads?.backgroundPct === undefined,
  },
  {
    path: 'place.ambientMaxC',
    question: 'Where could the bank stand, and how hot does it become there?',
    why: 'Heat is what capacitors age by.',
    isOpen: ({ place }) => place === undefined,
  },
  {
    path: 'supply.transformers[0].loadLossKw',
    question: 'What is the transformer’s load loss, by its plate or test sheet?',
    why: 'It damps the resonance.',
    isOpen: ({ supply }) => supply?.transformers?.[0]?.loadLossKw === undefined,
  },
];

/** How many are asked at once. */
const MOST = 3;

/**
 * What to ask on the visit: the open questions that decide most, those first.
 * @param site what is known so far
 * @returns three at the most; none where all is known
 */
export function visitQuestions(site: KnownOfSite): VisitQuestion[] {
  return QUESTIONS.filter(({ isOpen }) => isOpen(site))
    .slice(0, MOST)
    .map(({ path, question, why }) => ({ path, question, why }));
}
