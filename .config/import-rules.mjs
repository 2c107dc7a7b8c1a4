// The rules of the house as a program: prints each breach as file:line and fails where there is one.
//   node .config/import-rules.mjs [ROOT]
import { fileURLToPath } from 'node:url';
import { houseRules } from './house/house-rules.mjs';
import { readHouse } from './house/read-house.mjs';

const root = process.argv[2] ?? fileURLToPath(new URL('..', import.meta.url));
const house = readHouse(root);
let breaches = 0;
for (const rule of houseRules) {
  const found = rule.find(house);
  breaches += found.length;
  for (const { file, line, message } of found) process.stdout.write(`${file}:${line} ${rule.name}: ${message}\n`);
  if (found.length > 0) process.stdout.write(`  ${rule.why}\n`);
}
process.stdout.write(`${house.modules.length} modules, ${houseRules.length} rules, ${breaches} breaches\n`);
process.exitCode = breaches === 0 ? 0 : 1;
