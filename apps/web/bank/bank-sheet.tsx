import type { Result } from '#libs/engine/index.js';
import { countWord } from '#libs/present/findings.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { setPointWorking } from '#libs/present/headline-workings.js';
import { formatMonth } from '#libs/present/local-stamp.js';
import { bankOf, type DeskState } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { Bars } from '../draw/bars.js';
import { BeingDrawn } from '../draw/being-drawn.js';
import { Plot } from '../draw/plot.js';
import { valueAt } from '../field/document-path.js';
import { latestResult } from '../line/latest-result.js';
import { NoRecord } from '../record/no-record.js';
import { Headline } from '../working/headline.js';
import { CatalogueFields } from './catalogue-fields.js';
import { ControlFields } from './control-fields.js';
import { RatioTable } from './ratio-table.js';
import { ReplayFigure } from './replay-figure.js';
import { StageFields } from './stage-fields.js';
import { StagesFigure } from './stages-figure.js';

/** The bank: stages as they stand, the year it works through, a day replayed. */
export function BankSheet() {
  const { state } = useDesk();
  const { records, kept, charts } = state;
  const result = latestResult(state);
  if (records.length === 0) return <NoRecord what="A bank is laid out for a year of readings." />;
  if (bankOf(state) === null) return <NoBank result={result} />;
  if (result === null) return <h1>The bank is being computed</h1>;
  const { operation, bank, control } = result;
  const isTrial = state.trial !== null && kept !== null;
  return (
    <>
      <Headline
        figures={[
          {
            value: bank.effectiveKvar,
            unit: 'kvar',
            under: isTrial
              ? `kept: ${formatQuantity(kept.result.bank.effectiveKvar, 'kvar')}`
              : 'effective, all stages',
            id: 'bank.effectiveKvar',
          },
          {
            value: control.setPointPowerFactor,
            under: 'set point',
            digits: 'given',
            working: setPointWorking(control.setPointPowerFactor, setPointFrom(state)),
          },
          {
            value: operation.totalSwitchings,
            under:
              isTrial && kept.result.operation !== null
                ? `switchings; kept: ${formatNumber(kept.result.operation.totalSwitchings, 'whole')}`
                : 'switchings',
            digits: 'whole',
            id: 'operation.totalSwitchings',
          },
          {
            value: operation.shareInTargetPct,
            unit: '%',
            under:
              isTrial && kept.result.operation !== null
                ? `in target; kept: ${formatQuantity(kept.result.operation.shareInTargetPct, '%')}`
                : 'of the record in target',
            id: 'operation.shareInTargetPct',
          },
        ]}
      >
        {headline(result)}
      </Headline>
      <div className="split stages">
        <StagesFigure />
        <RatioTable />
      </div>
      <StageFields />
      <ControlFields />
      <CatalogueFields />
      {charts.bank === undefined ? (
        <BeingDrawn />
      ) : (
        <>
          <div className="split replay">
            <ReplayFigure replay={charts.bank.replay} workings={charts.bank.workings.day} />
            <Plot chart={charts.bank.phasors} height={240} workings={charts.bank.workings.currents} />
          </div>
          <div className="split thirds">
            <Bars
              figure={charts.bank.switchings}
              working={['operation.totalSwitchings']}
              workings={charts.bank.workings.switchings}
            />
            <Bars figure={charts.bank.hours} workings={charts.bank.workings.hours} />
            <Plot chart={charts.bank.months} height={220} working={['operation.lowestMonthPowerFactor']} />
          </div>
        </>
      )}
    </>
  );
}

function capitalised(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

function setPointFrom({ document, kept }: DeskState): 'typed' | 'searched' | 'target' {
  if (valueAt(document, 'control.setPointPowerFactor') !== undefined) return 'typed';
  return kept?.kind === 'plan' ? 'searched' : 'target';
}

function headline({ bank, operation, requirement }: Result): string {
  const count = bank.stages.length;
  const stages = `${capitalised(countWord(count))} ${count === 1 ? 'stage' : 'stages'}, ${formatQuantity(bank.effectiveKvar, 'kvar')},`;
  const target = formatNumber(requirement.targetPowerFactor, 'given');
  const known = operation.months.flatMap(({ month, powerFactorLagging }) =>
    powerFactorLagging === null ? [] : [{ month, factor: powerFactorLagging }],
  );
  const lowest = known.reduce<(typeof known)[number] | null>(
    (a, b) => (a === null || b.factor < a.factor ? b : a),
    null,
  );
  if (lowest === null) return `${stages} work through the record.`;
  const factor = formatNumber(lowest.factor);
  const missed = known.filter((month) => month.factor < requirement.targetPowerFactor * (1 - 1e-12)).length;
  if (missed === 0)
    return `${stages} hold every month above ${target}. ${formatMonth(lowest.month)} comes nearest, at ${factor}.`;
  return `${stages} leave ${missed === known.length ? 'every month' : missed === 1 ? 'one month' : `${missed} months`} under ${target}; ${formatMonth(lowest.month)} by most, at ${factor}.`;
}

function NoBank({ result }: { result: Result | null }) {
  const { desk, state } = useDesk();
  const isBusy = state.saving || state.job !== null;
  const isMet = result !== null && result.requirement.maxKvar <= 1e-9;
  const metMonths = state.kept?.kind === 'plan';
  return (
    <>
      <h1>
        {isMet || metMonths
          ? `No bank is needed: the site holds ${formatNumber(result?.requirement.targetPowerFactor ?? 0.95, 'given')} already.`
          : 'No bank yet'}
      </h1>
      <p className="row gap">
        <button type="button" className="button" disabled={isBusy} onClick={() => void desk.keep('plan')}>
          Design a bank
        </button>
        <button
          type="button"
          className="button"
          disabled={isBusy}
          onClick={() => desk.tryBank({ stages: [{ count: 1, ratedKvar: 25, ratedV: 480, reactorPct: 7 }] })}
        >
          Add a stage
        </button>
        <span className="soft">Designed from the record and the supply, or stage by stage by hand.</span>
      </p>
      <CatalogueFields />
    </>
  );
}
