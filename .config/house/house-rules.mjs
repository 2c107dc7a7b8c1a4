import { habitRules } from './house-habits.mjs';
import { directionRules } from './import-direction.mjs';
import { packageRules } from './package-homes.mjs';

/** Every rule of the house; each has a control in test/architecture that breaks it. */
export const houseRules = [...directionRules, ...packageRules, ...habitRules];
