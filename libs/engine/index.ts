// The engine's only door.
export * from './layout/bank.js';
export * from './layout/catalogue.js';
export * from './money/papers.js';
export * from './network/loads.js';
export * from './operation/control.js';
export * from './plan/outcome.js';
export * from './plan/result.js';
export * from './plan/site.js';
export * from './problem.js';
export * from './record/load-record.js';
export * from './record/zone-table.js';
export * from './supply/supply.js';
