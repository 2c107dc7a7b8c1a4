import type { Duty, EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatApart, formatNumber, formatQuantity, formatRange, GAP } from './format-number.js';
import { groupName } from './group-name.js';
import { say } from './language.js';
import { plainName } from './plain-name.js';
import { reactorWords } from './proposed-words.js';
import { bothRatings } from './single-line.js';
import { verdictWords } from './verdict-words.js';

/** What the network operator is told and asked. */
export interface OperatorPage {
  facts: [label: string, value: string][];
  /** what the bank does to the network, beside its limit */
  effects: { what: string; value: string; limit: string; source: string; verdict: string }[];
  questions: { question: string; taken: string }[];
}

/** Rows of the network that concern the operator. */
const NETWORK_ROWS = ['voltage distortion', 'harmonic voltage', 'harmonic current', 'current distortion'];

/**
 * The plan as a network operator reads it: connection, bank, effect on the network, and what is asked of the operator.
 * @param outcome plan or judgement
 * @returns facts, effects and questions
 */
export function operatorPage(outcome: Outcome | EstimateOutcome): OperatorPage {
  return { facts: facts(outcome), effects: effects(outcome), questions: questions(outcome) };
}

function facts(outcome: Outcome | EstimateOutcome): OperatorPage['facts'] {
  const { site, bank, result } = outcome;
  const { faultLevelMva, transformers } = site.supply;
  const tuned = [
    ...new Set(result.bank.stages.flatMap(({ tunedOrderH }) => (tunedOrderH === null ? [] : [tunedOrderH]))),
  ];
  return [
    [say`site`, plainName(site.name)],
    [say`nominal voltage of the board`, formatQuantity(site.nominalV, 'V', 'given')],
    [say`frequency`, formatQuantity(site.frequencyHz, 'Hz', 'given')],
    [
      transformers.length === 0 ? say`fault level at the board` : say`fault level at the primary`,
      formatRange({ low: faultLevelMva.min, high: faultLevelMva.max }, 'MVA'),
    ],
    [
      say`transformers`,
      transformers.length === 0
        ? say`none given`
        : transformers
            .map(
              ({ ratedKva, impedancePct }) =>
                `${formatQuantity(ratedKva, 'kVA', 'given')}, ${formatQuantity(impedancePct, '%', 'given')}`,
            )
            .join('; '),
    ],
    [say`point of coupling taken`, plainName(result.limits.couplingPoint)],
    [say`metered at`, site.meteredAt === 'primary' ? say`the transformer’s primary` : say`the board`],
    [say`bank, effective`, formatQuantity(result.bank.effectiveKvar, 'kvar')],
    [
      say`stages`,
      bank.groups.map((group) => `${group.count}${GAP}×${GAP}${bothRatings(outcome, group)}`).join('; ') || say`none`,
    ],
    [say`reactors`, bank.groups.length === 0 ? say`none` : reactorWords(bank.groups)],
    [say`tuned order`, tuned.length === 0 ? '–' : tuned.map((order) => formatNumber(order)).join(', ')],
  ];
}

function effects({ result }: Outcome | EstimateOutcome): OperatorPage['effects'] {
  const ofNetwork = result.duties.filter(({ name }) => NETWORK_ROWS.includes(name)).map(dutyEffect);
  const change = result.devices
    .filter(({ device }) => device === 'stage.voltageChange')
    .reduce<number | null>((most, { value }) => (typeof value === 'number' ? Math.max(most ?? 0, value) : most), null);
  const limit = result.devices.find(({ device }) => device === 'stage.voltageChange')?.most;
  const inrush = result.inrush.stages.map((stage) => Math.max(stage.singlePeakA, stage.worstPeakA ?? 0));
  return [
    ...ofNetwork,
    ...(change === null
      ? []
      : [
          {
            what: say`voltage change by the largest stage, at the least fault level`,
            value: formatQuantity(change, '%'),
            limit: typeof limit === 'number' ? formatQuantity(limit, '%', 'given') : '–',
            source: say`common practice`,
            verdict: '–',
          },
        ]),
    ...(inrush.length === 0
      ? []
      : [
          {
            what: say`inrush of a stage, peak`,
            value: formatQuantity(Math.max(...inrush), 'A'),
            limit: '–',
            source: say`closed form or exact, the larger`,
            verdict: '–',
          },
        ]),
    ...result.devices
      .filter(({ device }) => device === 'stage.ripple')
      .map(({ group, value, fitted, unit, state }) => ({
        what: group === null ? say`ripple signal` : say`ripple signal, ${groupName(group)}`,
        value: typeof fitted === 'number' ? say`tuned to ${formatQuantity(fitted, unit)}` : say`no reactor`,
        limit: typeof value === 'number' ? formatQuantity(value, unit, 'given') : '–',
        source: say`common practice`,
        verdict: state === 'fits' ? say`blocks` : say`may draw the signal in`,
      })),
  ];
}

function dutyEffect(duty: Duty): OperatorPage['effects'][number] {
  const order = duty.orderH === null ? '' : say`, order\u00a0${formatNumber(duty.orderH, 'given')}`;
  const apart = duty.limit === null ? null : formatApart(duty.value, duty.limit);
  return {
    what: `${engineName(duty.name)}${order}`,
    value: `${apart?.value ?? formatNumber(duty.value)}${GAP}${duty.unit}`,
    limit: apart === null ? '–' : `${apart.limit}${GAP}${duty.unit}`,
    source: engineName(duty.source),
    verdict: verdictWords(duty.verdict),
  };
}

function questions({ site, result }: Outcome | EstimateOutcome): OperatorPage['questions'] {
  const { faultLevelMva, rippleHz } = site.supply;
  const background = site.loads.backgroundPct;
  return [
    {
      question: say`greatest and least fault level at the point of coupling`,
      taken: formatRange({ low: faultLevelMva.min, high: faultLevelMva.max }, 'MVA'),
    },
    {
      question: say`distortion of the supply with the site’s plant off, by order`,
      taken:
        background === null
          ? say`unknown`
          : background.length === 0
            ? say`none, as declared`
            : background
                .map(
                  ({ orderH, pct }) =>
                    say`order ${formatNumber(orderH, 'given')}: ${formatQuantity(pct, '%', 'given')}`,
                )
                .join(', '),
    },
    {
      question: say`frequency of a ripple signal, and whether stages have to block it`,
      taken: rippleHz === null ? say`none entered` : formatQuantity(rippleHz, 'Hz', 'given'),
    },
    {
      question: say`limits of distortion that apply, and the point of coupling`,
      taken: engineName(result.limits.voltage),
    },
    { question: say`consent to connect the bank, and to the voltage change of a stage`, taken: '–' },
    { question: say`capacitors of others near by, in service or planned`, taken: say`none entered` },
  ];
}
