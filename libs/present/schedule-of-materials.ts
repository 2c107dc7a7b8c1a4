import type { BankOutcome, DeviceName, DeviceRow } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { groupName } from './group-name.js';
import { say } from './language.js';

/** An item to be bought, by its rating. */
export interface MaterialLine {
  item: string;
  number: string;
  rating: string;
}

/**
 * What the bank is built from, by ratings alone.
 * @param outcome plan or judgement
 * @returns one line an item, group after group and then the bank's; none for an empty bank
 */
export function scheduleOfMaterials(outcome: BankOutcome): MaterialLine[] {
  const { bank } = outcome;
  if (bank.groups.length === 0) return [];
  return [...bank.groups.flatMap((_, group) => groupLines(outcome, group)), ...bankLines(outcome)];
}

function groupLines({ bank, site, result }: BankOutcome, group: number): MaterialLine[] {
  const of = bank.groups[group]!;
  const row = (device: DeviceName) => result.devices.find((one) => one.device === device && one.group === group);
  const where = bank.groups.length > 1 ? `, ${groupName(group)}` : '';
  const each = (item: string, rating: string | null, times = 1): MaterialLine[] =>
    rating === null ? [] : [{ item: `${item}${where}`, number: formatNumber(times * of.count, 'whole'), rating }];
  const frequency = formatQuantity(site.frequencyHz, 'Hz', 'given');
  const category = bank.ambientCategory === null ? say`category by the place` : say`category ${bank.ambientCategory}`;
  const charge = result.charge.stages[group]!;
  const loss = charge.dischargeLossW === null ? '' : say`, ${formatQuantity(charge.dischargeLossW, 'W')} or more`;
  return [
    ...each(
      say`capacitor, three-phase`,
      say`${formatQuantity(of.ratedKvar, 'kvar', 'given')} at ${formatQuantity(of.ratedV, 'V', 'given')}, ${frequency}, ${formatQuantity(charge.capacitanceUf, 'µF')} a delta phase, ${category}`,
    ),
    ...(of.reactorPct > 0 ? each(say`reactor, three-phase`, reactorRating(of.reactorPct, row)) : []),
    ...(of.fixed ? [] : each(say`switch for capacitors`, switchRating(row))),
    ...each(say`fuses, set of three`, betweenWords(row('fuse.rating'))),
    ...each(say`discharge resistor, a delta phase`, say`${formatQuantity(charge.requiredOhm, 'Ω')} or less${loss}`, 3),
  ];
}

type Rows = (device: DeviceName) => DeviceRow | undefined;

function reactorRating(reactorPct: number, row: Rows): string {
  const thermal = leastWords(row('reactor.current'));
  const linear = leastWords(row('reactor.linearity'));
  return [
    formatQuantity(reactorPct, '%', 'given'),
    ...(thermal === null ? [] : [say`${thermal} continuous`]),
    ...(linear === null ? [] : [say`linear to ${linear}`]),
  ].join(', ');
}

function switchRating(row: Rows): string | null {
  const kvar = leastWords(row('switch.kvar'));
  const peak = leastWords(row('switch.peak'));
  if (kvar === null) return null;
  return peak === null ? say`${kvar} or more` : say`${kvar} or more, makes ${peak} peak`;
}

function leastWords(row: DeviceRow | undefined): string | null {
  return typeof row?.least === 'number' ? formatQuantity(row.least, row.unit) : null;
}

function betweenWords(row: DeviceRow | undefined): string | null {
  if (typeof row?.least !== 'number' || typeof row.most !== 'number') return null;
  return say`${formatNumber(row.least)} to ${formatQuantity(row.most, row.unit)}`;
}

function bankLines({ bank, result }: BankOutcome): MaterialLine[] {
  const row: Rows = (device) => result.devices.find((one) => one.device === device);
  const one = (item: string, rating: string | null): MaterialLine[] =>
    rating === null ? [] : [{ item, number: '1', rating }];
  const ways = bank.groups.reduce((sum, { count, fixed }) => sum + (fixed ? 0 : count), 0);
  const breaking = leastWords(row('mainDevice.breaking'));
  const rated = formatQuantity(result.conductorMinA, 'A');
  const air = leastWords(row('cabinet.airFlow'));
  const peak = leastWords(row('busbar.withstand'));
  const response = row('currentTransformer.response');
  return [
    ...(ways === 0
      ? []
      : one(
          say`controller`,
          ways === 1
            ? say`1\u00a0way or more, settings of section 16`
            : say`${formatNumber(ways, 'whole')}\u00a0ways or more, settings of section 16`,
        )),
    ...(ways === 0
      ? []
      : one(
          say`current transformer at the incomer`,
          typeof response?.value === 'number'
            ? say`${formatQuantity(response.value, 'A')} at its secondary for the response threshold`
            : say`ratio by the incomer’s current, class for a power-factor controller`,
        )),
    ...one(say`upstream device`, say`${rated} or more${breaking === null ? '' : say`, breaks ${breaking}`}`),
    ...one(say`conductors and disconnector`, say`${rated} or more`),
    ...one(say`busbars`, peak === null ? null : say`${rated} or more, withstand ${peak} peak`),
    ...one(say`cabinet`, air === null ? null : say`${air} of air or more`),
    {
      item: say`label of stored charge`,
      number: formatNumber(result.bank.stages.length, 'whole'),
      rating: say`on each stage, with its waiting time of section 7.3`,
    },
  ];
}
