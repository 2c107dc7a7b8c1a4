import type { BankOutcome } from '#libs/engine/index.js';
import { assumptionSource } from '#libs/present/assumption-source.js';
import { basisOfDesign, RULE_SET_WORDS } from '#libs/present/basis-of-design.js';
import { effectWords } from '#libs/present/effect-words.js';
import { engineName } from '#libs/present/engine-name.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { plainName } from '#libs/present/plain-name.js';
import { remarkConsequence } from '#libs/present/remark-words.js';
import { SOFT } from './ink.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, drawTable } from './table.js';
import { NEW_LINE } from './typesetter.js';

/** Documents with their editions, and what each was used for. */
export function drawBasis(paper: Paper, outcome: BankOutcome): void {
  const { site } = outcome;
  paper.heading('3', say`Basis of design: ${RULE_SET_WORDS[site.rules]}`, { keep: 130 });
  paper.paragraph([
    say`${formatQuantity(site.nominalV, 'V', 'given')}, at most ${formatQuantity(site.highestV, 'V', 'given')},
      ${formatNumber(site.frequencyHz, 'given')} Hz. Target power factor ${formatNumber(site.targetPowerFactor, 'given')}
      at the ${site.meteredAt === 'primary' ? say`transformer’s primary` : say`board`}, held in every billing month.`,
  ]);
  paper.paragraph([pointWords(outcome)]);
  const columns = [
    { head: say`rule`, share: 28 },
    { head: say`edition`, share: 22 },
    { head: say`used for`, share: 50 },
  ];
  drawTable(
    paper,
    columns,
    basisOfDesign(outcome).map(({ rule, edition, usedFor }) => [rule, edition, usedFor]),
  );
  drawLoads(paper, outcome);
}

/** The loads that distort, in the order the single-line diagram numbers them. */
function drawLoads(paper: Paper, { site }: BankOutcome): void {
  const { distorting } = site.loads;
  if (distorting === null || distorting.length === 0) return;
  const columns = [
    { head: say`load`, share: 8 },
    { head: say`that distorts`, share: 46 },
    { head: say`fundamental`, share: 16, align: 'right' as const },
    { head: say`harmonic currents, % of it`, share: 40 },
  ];
  const rows = distorting.map(({ name, fundamentalA, spectrum, orders }, at) => {
    const given = orders
      ?.map(({ orderH, pct }) => say`order ${formatNumber(orderH, 'given')}: ${formatNumber(pct, 'given')}`)
      .join(', ');
    return [
      String(at + 1),
      plainName(name),
      formatQuantity(fundamentalA, 'A', 'given'),
      given ?? engineName((spectrum ?? '').replaceAll('-', ' ')),
    ];
  });
  drawTable(paper, columns, rows);
}

/** Where the limits of distortion were held against the voltage. */
function pointWords({ result }: BankOutcome): string {
  const { voltage, points, couplingPoint } = result.limits;
  const buses = points.filter((point) => point !== 'primary');
  const at = `${buses.length === 1 ? say`bus` : say`the buses`} ${buses.map(plainName).join(', ')}`;
  const judged = say`${engineName(voltage)} is held against the voltage at ${at}`;
  if (couplingPoint !== 'primary') return say`${judged}; the point of coupling is ${plainName(couplingPoint)}.`;
  return say`${judged} and at the transformer’s primary, which is the point of coupling.`;
}

/** Every value that was taken because none was given, and what settles it. */
export function drawAssumptions(paper: Paper, outcome: BankOutcome): void {
  const assumptions = outcome.result.assumptions.filter(({ code }) => !code.startsWith('understood.'));
  const count = assumptions.length;
  paper.heading(
    '4',
    say`Assumptions: ${count === 0 ? say`none` : say`${count} ${count === 1 ? say`value was` : say`values were`} not given`}`,
    { keep: 100 },
  );
  if (count === 0) {
    paper.paragraph([say`Every value was given.`]);
    drawUnderstood(paper, outcome);
    return;
  }
  const columns = [
    { head: say`taken, and its field`, share: 42 },
    { head: say`source`, share: 22 },
    { head: say`effect if wrong`, share: 30 },
    { head: say`what settles it`, share: 34 },
  ];
  const rows = assumptions.map((one): Cell[] => [
    [one.text, NEW_LINE, { text: plainName(one.path ?? ''), ink: SOFT, size: 8.2 }],
    assumptionSource(one),
    one.effect === null ? '–' : effectWords(one.effect),
    remarkConsequence(one),
  ]);
  drawTable(paper, columns, rows, { style: { ...NOTE, ink: '#000000', size: 9 }, padding: 2.8, after: 5 });
  paper.paragraph(
    [
      say`Effect: the row that moves most, from one end to the other of what practice meets. A dash stands where a value was not moved:
        it enters no limit, or stands at the severe end already.`,
    ],
    { style: NOTE },
  );
  drawUnderstood(paper, outcome);
}

/** Values that were given in another form, as they were understood. */
function drawUnderstood(paper: Paper, outcome: BankOutcome): void {
  const understood = outcome.result.assumptions.filter(({ code }) => code.startsWith('understood.'));
  if (understood.length === 0) return;
  paper.heading('4.1', say`As understood: values that were given in another form`, { level: 3 });
  const columns = [
    { head: say`understood`, share: 60 },
    { head: say`field`, share: 40 },
  ];
  const rows = understood.map((one) => [one.text, plainName(one.path ?? '')]);
  drawTable(paper, columns, rows, { style: { ...NOTE, ink: '#000000', size: 9.2 } });
}
