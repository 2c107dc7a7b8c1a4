// Prints who imports whom, as a Mermaid diagram: the stages of the engine, then the homes around it.
import { fileURLToPath } from 'node:url';
import { STAGES, stageOf } from './house/import-direction.mjs';
import { homeOf, readHouse } from './house/read-house.mjs';

const house = readHouse(fileURLToPath(new URL('..', import.meta.url)));
const stages = edges((path) => (homeOf(path) === 'libs/engine' ? stageOf(path) : null));
const homes = edges((path) => (/^(libs|apps|migrations)/.test(path) ? homeOf(path) : null));
process.stdout.write(`${draw('the engine', STAGES, stages)}\n${draw('the house', [], homes)}`);

/**
 * How many imports run from one group of modules to another.
 * @param {(path: string) => string | null} group
 */
function edges(group) {
  /** @type {Map<string, number>} */
  const counts = new Map();
  for (const module of house.modules.filter(({ spec }) => !spec)) {
    const from = group(module.path);
    for (const { target } of module.imports) {
      const to = target === null ? null : group(target);
      if (from === null || to === null || from === to) continue;
      counts.set(`${from} ${to}`, (counts.get(`${from} ${to}`) ?? 0) + 1);
    }
  }
  return counts;
}

/**
 * @param {string} title
 * @param {string[]} nodes
 * @param {Map<string, number>} counts
 */
function draw(title, nodes, counts) {
  const id = (/** @type {string} */ name) => name.replaceAll(/[^a-z]/g, '_');
  const lines = [...counts].sort().map(([pair, count]) => {
    const [from = '', to = ''] = pair.split(' ');
    return `  ${id(to)}["${to}"] -->|${count}| ${id(from)}["${from}"]`;
  });
  return ['---', `title: ${title}`, '---', 'flowchart LR', ...nodes.map((name) => `  ${id(name)}`), ...lines, ''].join(
    '\n',
  );
}
