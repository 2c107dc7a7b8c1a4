import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { BeingDrawn } from '../draw/being-drawn.js';
import { Plot } from '../draw/plot.js';
import { YearFigure } from '../draw/year-figure.js';
import { ChoiceField } from '../field/choice-field.js';
import { latestResult } from '../line/latest-result.js';
import { NoRecord } from '../record/no-record.js';
import { Headline } from '../working/headline.js';
import { TargetFigure } from './target-figure.js';

/** What must be cancelled at the bus for the target to hold, over the year and over the target. */
export function NeedSheet() {
  const { state } = useDesk();
  const result = latestResult(state);
  const charts = state.charts.need;
  if (state.records.length === 0) return <NoRecord what="What the site needs is computed from its meter record." />;
  if (result === null) return <h1>The need is being computed</h1>;
  const { maxKvar, p99Kvar, p95Kvar, meanKvar, targetPowerFactor } = result.requirement;
  const target = formatNumber(targetPowerFactor, 'given');
  const isMet = maxKvar <= 1e-9;
  return (
    <>
      <Headline
        figures={[
          { value: maxKvar, unit: 'kvar', under: 'highest', id: 'requirement.maxKvar' },
          { value: p95Kvar, unit: 'kvar', under: '95\u00a0% of the record', id: 'requirement.p95Kvar' },
          { value: meanKvar, unit: 'kvar', under: 'mean', id: 'requirement.meanKvar' },
          {
            value: result.record.powerFactorLagging,
            under: 'factor of the record',
            id: 'record.powerFactorLagging',
          },
        ]}
      >
        {isMet
          ? `No bank is needed: the site holds ${target} already.`
          : `The site needs ${formatQuantity(p99Kvar, 'kvar')} to hold ${target} through 99\u00a0% of the record, and ${formatQuantity(maxKvar - p99Kvar, 'kvar')} more at its worst interval.`}
      </Headline>
      <div className="split target">
        {charts === undefined ? (
          <section className="section">
            <h2>Needed kvar over the target</h2>
          </section>
        ) : (
          <TargetFigure chart={charts.target} />
        )}
        {charts === undefined ? null : (
          <Plot
            chart={charts.duration}
            height={268}
            working={['requirement.maxKvar', 'requirement.p99Kvar', 'bank.effectiveKvar']}
          />
        )}
      </div>
      {charts === undefined ? <BeingDrawn /> : <YearFigure map={charts.year} working={['requirement.maxKvar']} />}
      <section className="section" aria-labelledby="target-terms">
        <h2 id="target-terms">What the target asks for</h2>
        <div className="fields">
          <ChoiceField
            path="target.onExport"
            label="while the site exports"
            otherwise="asks for no kvar"
            choices={[
              ['importOnly', 'asks for no kvar'],
              ['absolute', 'holds as on import'],
            ]}
          />
        </div>
      </section>
    </>
  );
}
