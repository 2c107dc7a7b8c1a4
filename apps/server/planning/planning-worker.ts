// The file worker threads are started with: what it exports they can run.
export { computeReevaluation, computeReevaluationPaper } from '../reevaluation/compute-reevaluation.js';
export { computeFigures } from './compute-figures.js';
export { computePlan } from './compute-plan.js';
export { readFile } from './read-file.js';
