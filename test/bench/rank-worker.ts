// A thread that ranks its share of the candidates when it is asked to, and says the best value of it.
import { parentPort } from 'node:worker_threads';
import { type RankShare, rankCandidates } from '#libs/engine/index.js';
import { searchByMoneyAlone, searchedWorks } from './searched-works.js';

const { space, judge } = searchByMoneyAlone(searchedWorks('kvarh beyond a ratio'));

parentPort?.on('message', (share: RankShare) => {
  const ranked = rankCandidates(space, judge, share);
  parentPort?.postMessage({ best: ranked[0]?.npv, candidates: ranked.length });
});
