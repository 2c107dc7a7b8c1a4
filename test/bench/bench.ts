// How fast the program is on this machine: its hot loops, its search, its reading and its storing of records against the
// same work in C, a ranking by two workers, and one whole plan.
import { busesWorks } from './bench-buses.js';
import { benchPlan } from './bench-plan.js';
import { benchRank } from './bench-rank.js';
import { benchRead } from './bench-read.js';
import { scanWork } from './bench-scan.js';
import { benchSearch } from './bench-search.js';
import { simulationWorks } from './bench-simulate.js';
import { benchStore } from './bench-store.js';
import { compareTwins } from './compare-twins.js';
import { crowding } from './stopwatch.js';

const MOST_CROWDING = 1.15;

const before = await crowding();
const met = [...simulationWorks(), scanWork(), ...busesWorks()].map((work) => compareTwins(work)?.met ?? true);
met.push(benchSearch(), await benchRank(), await benchRead(), await benchStore(), benchPlan());
const crowded = Math.max(before, await crowding());
const counts = crowded <= MOST_CROWDING;
console.log(
  `two threads' spin against one's: ${crowded.toFixed(2)}, at most ${MOST_CROWDING}: ` +
    (counts ? 'the figures count' : 'the machine was busy, the figures do not count'),
);
if (counts && met.includes(false)) process.exitCode = 1;
