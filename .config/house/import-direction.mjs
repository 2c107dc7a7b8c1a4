// Who may import whom. The engine's rules follow from the list of its stages, in the order of the job.
import { posix } from 'node:path';
import { homeOf } from './read-house.mjs';

/** @typedef {import('./read-house.mjs').House} House */
/** @typedef {import('./read-house.mjs').Module} Module */
/** @typedef {import('./read-house.mjs').Import} Import */
/** @typedef {import('./read-house.mjs').Breach} Breach */
/** @typedef {import('./read-house.mjs').Rule} Rule */

export const STAGES = [
  'quantity',
  'record',
  'supply',
  'requirement',
  'layout',
  'operation',
  'network',
  'duty',
  'money',
  'plan',
  'reevaluation',
];

const DOOR = 'libs/engine/index.ts';
const LIBS = ['engine', 'contract', 'meter-files', 'present', 'review', 'proposal', 'store', 'jobs'].map(
  (lib) => `libs/${lib}`,
);

/** The part of libs/jobs that needs no database: worker threads over the engine alone. */
const POOL = /^libs\/jobs\/pool([./-]|$)/;

/** The one command that is asked about an installation, and reads its database. */
const VERIFY = 'apps/cli/verify.ts';

/** @type {Record<string, string[]>} */
export const MAY_IMPORT = {
  'libs/engine': [],
  'libs/contract': ['libs/engine'],
  'libs/meter-files': ['libs/engine', 'libs/contract'],
  'libs/present': ['libs/engine', 'libs/review'],
  'libs/review': ['libs/engine', 'libs/contract'],
  'libs/proposal': ['libs/engine', 'libs/present'],
  'libs/store': ['libs/engine', 'libs/contract', 'libs/review', 'migrations'],
  'libs/jobs': ['libs/engine', 'libs/store'],
  migrations: ['libs/store'],
  'apps/server': [...LIBS, 'migrations'],
  'apps/cli': LIBS.filter((lib) => lib !== 'libs/store' && lib !== 'libs/jobs'),
  'apps/web': ['libs/engine', 'libs/contract', 'libs/present'],
};

/**
 * @param {House} house
 * @param {(module: Module, entry: Import) => string | null} judge
 * @returns {Breach[]}
 */
export function judgeImports(house, judge) {
  return house.modules.flatMap((module) =>
    module.imports.flatMap((entry) => {
      const message = judge(module, entry);
      return message === null ? [] : [{ file: module.path, line: entry.line, message }];
    }),
  );
}

/** @param {string} path */
export function stageOf(path) {
  const [, , folder = '', file] = path.split('/');
  return file === undefined ? null : folder;
}

/** @type {Rule} */
const stageOrder = {
  name: 'stage-order',
  why: 'a stage of the engine imports only the stages to its left and problem.ts; index.ts knows them all',
  find(house) {
    const engine = house.modules.filter((module) => module.home === 'libs/engine');
    const strangers = engine
      .filter((module) => !isEnginePlace(module.path))
      .map((module) => ({
        file: module.path,
        line: 1,
        message: `no stage of this name; stages: ${STAGES.join(', ')}`,
      }));
    const backwards = judgeImports({ ...house, modules: engine }, (module, { target }) =>
      target === null || homeOf(target) !== 'libs/engine' || mayUse(module.path, target)
        ? null
        : `${stageOf(module.path) ?? posix.basename(module.path)} may not import ${target}`,
    );
    return [...strangers, ...backwards];
  },
};

/** @param {string} path */
function isEnginePlace(path) {
  const stage = stageOf(path);
  return stage === null ? /\/(index|problem)(\.spec)?\.ts$/.test(path) : STAGES.includes(stage);
}

/**
 * @param {string} from
 * @param {string} to
 */
function mayUse(from, to) {
  if (from.startsWith('libs/engine/index.')) return true;
  if (to === 'libs/engine/problem.ts') return true;
  const [own, other] = [stageOf(from), stageOf(to)];
  if (own === null || other === null) return false;
  return STAGES.indexOf(other) <= STAGES.indexOf(own);
}

/** @type {Rule} */
const homes = {
  name: 'homes',
  why: 'each folder imports only what the table of homes grants it; libs never import apps, nor one app another',
  find: (house) =>
    judgeImports(house, (module, { target }) =>
      target === null || module.home === 'test' || module.home === '.config' || mayReach(module, target)
        ? null
        : `${module.home} may not import ${target}`,
    ),
};

/** @type {Rule} */
const poolAlone = {
  name: 'pool-alone',
  why: 'libs/jobs/pool imports the engine only, so that the command line can use it without a database',
  find: (house) =>
    judgeImports(house, (module, { target }) =>
      target === null || module.spec || !POOL.test(module.path) || POOL.test(target) || target === DOOR
        ? null
        : `the pool may not import ${target}`,
    ),
};

/**
 * @param {Module} module
 * @param {string} target
 */
function mayReach(module, target) {
  const other = homeOf(target);
  if (other === module.home) return true;
  if (module.spec) return specMayImport(other);
  if (module.home === 'apps/cli' && POOL.test(target)) return true;
  if (module.path === VERIFY && other === 'libs/store') return true;
  return MAY_IMPORT[module.home]?.includes(other) ?? false;
}

/** @param {string} home */
function specMayImport(home) {
  return home.startsWith('libs/') || home === 'migrations' || home === 'test';
}

/** @type {Rule} */
const engineDoor = {
  name: 'engine-door',
  why: 'outside the engine only its door, #libs/engine/index.js, is imported',
  find: (house) =>
    judgeImports(house, (module, { target }) =>
      target !== null && module.home !== 'libs/engine' && homeOf(target) === 'libs/engine' && target !== DOOR
        ? `${target} is not the engine's door`
        : null,
    ),
};

/** @type {Rule} */
const importForm = {
  name: 'import-form',
  why: 'inside a home imports are relative, to another home they begin with #; they end in .js',
  find: (house) =>
    judgeImports(house, (module, { specifier, target }) => {
      if (target === null) return null;
      if (!/\.(js|mjs|json)$/.test(specifier)) return `${specifier} does not end in .js`;
      const other = homeOf(target);
      if (other === module.home) return specifier.startsWith('#') ? `${specifier} is in the same home: relative` : null;
      if (other === 'test' || other === '.config') return null;
      return specifier.startsWith('#') ? null : `${specifier} leaves its home: #${target.replace(/\.ts$/, '.js')}`;
    }),
};

/** @type {Rule} */
const cycles = {
  name: 'no-cycles',
  why: 'no module reaches itself through its imports',
  find(house) {
    const modules = new Map(house.modules.map((module) => [module.path, module]));
    /** @type {Map<string, 'open' | 'done'>} */
    const state = new Map();
    /** @type {Breach[]} */
    const found = [];
    /** @param {Module} module @param {string[]} trail */
    const walk = (module, trail) => {
      state.set(module.path, 'open');
      for (const { target, line } of module.imports) {
        const next = target === null ? undefined : modules.get(target);
        if (next === undefined) continue;
        if (state.get(next.path) === 'open') {
          const loop = [...trail.slice(trail.indexOf(next.path)), next.path];
          found.push({ file: module.path, line, message: loop.join(' → ') });
        } else if (!state.has(next.path)) walk(next, [...trail, next.path]);
      }
      state.set(module.path, 'done');
    };
    for (const module of house.modules) if (!state.has(module.path)) walk(module, [module.path]);
    return found;
  },
};

/** @type {Rule[]} */
export const directionRules = [stageOrder, homes, poolAlone, engineDoor, importForm, cycles];
