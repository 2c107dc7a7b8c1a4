import type {
  BankTonight,
  EstimateResult,
  MeasuredEntry,
  Result,
  StagesOut,
  ToMend,
  Tonight,
} from '#libs/engine/index.js';
import { deviceName } from './device-words.js';
import { engineName } from './engine-name.js';
import { countWord } from './findings.js';
import { formatQuantity } from './format-number.js';
import { say } from './language.js';
import { VERDICT_WORDS } from './verdict-words.js';

/** What to do at once with an installed bank, as a result carries it. */
export interface TonightInWords extends Tonight {
  /** entries of the bank as it measures, as `out` of the stages out counts them */
  stages: MeasuredEntry[];
  /** where the load is an estimate */
  byEstimate?: true;
  sentences: string[];
}

/**
 * The result of a bank that was judged, with what to do at once.
 * @param result of the bank
 * @param bank stages of an installed bank and which to keep out; null for a bank that is not installed
 * @returns the result with `tonight`, null where there is nothing to do
 */
export function withTonight<Judged extends Result | EstimateResult>(
  result: Judged,
  bank: BankTonight | null,
): Judged & { tonight: TonightInWords | null } {
  if (bank === null || bank.tonight === null) return { ...result, tonight: null };
  const { tonight, stages, byEstimate } = bank;
  const told = byEstimate === true ? { byEstimate } : {};
  return { ...result, tonight: { ...tonight, stages, ...told, sentences: tonightSentences(bank) } };
}

/**
 * What to do tonight with a bank that is over a limit: which stages out, by whom, until when.
 * @param bank stages of the installed bank, and which to keep out
 * @returns sentences; none where the bank is over no limit
 */
export function tonightSentences({ tonight, stages, byEstimate }: BankTonight): string[] {
  if (tonight === null) return [];
  const { within, nearLimits, until } = tonight;
  const isEstimated = byEstimate === true;
  const sentences = [
    isEstimated
      ? say`Tonight, by an estimate of the load: keep out ${withKvar(within, stages)}. ${leftWords(within)}`
      : say`Tonight: keep out ${withKvar(within, stages)}. ${leftWords(within)}`,
    say`A qualified person switches them off, secures them against reconnection and waits out their discharge, as the
      section of cautions says; the controller must not be able to connect them.`,
    say`They stay out until the bank is judged again and these are within limits: ${listed(until.map(toMendWords))}.`,
  ];
  if (nearLimits !== null) {
    sentences.push(
      say`With ${withKvar(nearLimits, stages)} out nothing is over a limit, though near one: a second best, to be
        accepted by whoever answers for the installation.`,
    );
  }
  if (isEstimated) {
    sentences.push(
      say`No meter’s record stands behind this: load that damps a resonance counts only where it is stated, and the load
        current is that of the distorting loads alone, the severe ends of both. With a record more may stay in; without
        one nothing more does.`,
    );
  }
  return sentences;
}

/**
 * What the groups of a bank as it measures are, where a measured stage became a group of its own.
 * @param bank stages of the bank as it measures
 * @returns one sentence, none where every group is one of the site's
 */
export function measuredGroupSentences({ stages }: Pick<BankTonight, 'stages'>): string[] {
  if (stages.every(({ stage }) => stage === null)) return [];
  const parts = stages.flatMap((entry, k) =>
    k === entry.group && stages.filter(({ group }) => group === k).length === 1
      ? []
      : [say`group ${k + 1} is ${entryWords(entry, entry.count, stages)}`],
  );
  return [
    say`Measured stages are judged as they measure, each as a group of its own. Among the figures judged now, ${listed(parts)}.`,
  ];
}

/**
 * Stages that are kept out, by the numbers they have in the site's own bank.
 * @param out stages out of each entry
 * @param stages entries of the bank as it measures
 */
export function stagesOutWords(out: readonly number[], stages: readonly MeasuredEntry[]): string {
  const all = stages.reduce((sum, { count }) => sum + count, 0);
  if (out.reduce((sum, count) => sum + count, 0) === all && all > 1) {
    return say`the whole bank, all ${countWord(all)} stages`;
  }
  const parts = stages.flatMap((entry, k) => (out[k]! === 0 ? [] : [entryWords(entry, out[k]!, stages)]));
  return parts.length === 0 ? say`nothing` : listed(parts);
}

function withKvar({ out, outKvar }: StagesOut, stages: readonly MeasuredEntry[]): string {
  return say`${stagesOutWords(out, stages)}: ${formatQuantity(outKvar, 'kvar')} at the bus`;
}

function leftWords({ keptKvar, verdict }: StagesOut): string {
  if (keptKvar === 0) return say`No stage may stay in.`;
  return say`With what is left, ${formatQuantity(keptKvar, 'kvar')}, every level is ${VERDICT_WORDS[verdict]} in every corner.`;
}

function entryWords(entry: MeasuredEntry, out: number, stages: readonly MeasuredEntry[]): string {
  const { group, stage, count, ratedKvar } = entry;
  const size = formatQuantity(ratedKvar, 'kvar');
  if (stage !== null) return say`stage ${stage} of group ${group + 1} (${size} as it measures)`;
  const ofGroup = stages.filter((one) => one.group === group);
  if (ofGroup.length === 1) {
    if (count === 1) return say`the stage of group ${group + 1} (${size})`;
    if (count === 2 && out === 2) return say`both stages of group ${group + 1} (${size} each)`;
    return out === count
      ? say`all ${countWord(count)} stages of group ${group + 1} (${size} each)`
      : say`${countWord(out)} of the ${countWord(count)} stages of group ${group + 1} (${size} each)`;
  }
  const measured = ofGroup.map((one) => one.stage);
  const whole = ofGroup.reduce((sum, one) => sum + one.count, 0);
  const numbers = Array.from({ length: whole }, (_, k) => k + 1).filter((number) => !measured.includes(number));
  if (count === 1) return say`stage ${numbers[0]!} of group ${group + 1} (${size})`;
  const list = listed(numbers.map(String));
  return out === count
    ? say`stages ${list} of group ${group + 1} (${size} each)`
    : say`${countWord(out)} of stages ${list} of group ${group + 1} (${size} each)`;
}

function toMendWords({ kind, name, group }: ToMend): string {
  const words = kind === 'device' ? deviceName(name) : engineName(name);
  return group === null ? words : say`${words} of group ${group + 1}`;
}

function listed(parts: readonly string[]): string {
  if (parts.length < 2) return parts.join('');
  return say`${parts.slice(0, -1).join(', ')} and ${parts.at(-1)!}`;
}
