import type { Result } from '#libs/engine/index.js';
import { formatNumber } from '#libs/present/format-number.js';
import { RatioTable } from '../bank/ratio-table.js';
import { bankOf } from '../desk/desk-state.js';
import type { StationCharts } from '../desk/look.js';
import { useDesk } from '../desk/use-desk.js';
import { Bars } from '../draw/bars.js';
import { BeingDrawn } from '../draw/being-drawn.js';
import { Plot } from '../draw/plot.js';
import { latestResult } from '../line/latest-result.js';
import { NoRecord } from '../record/no-record.js';
import { Headline } from '../working/headline.js';
import { AgeingTable } from './ageing-table.js';
import { DeviceTable } from './device-table.js';
import { Firmness } from './firmness.js';
import { FittedFields } from './fitted-fields.js';
import { MarginTable } from './margin-table.js';
import { MeasuredTable } from './measured-table.js';

/** Resonance and limits: impedance over order, every level and order against its limit, duties, other ratios. */
export function NetworkSheet() {
  const { state } = useDesk();
  const result = latestResult(state);
  const charts = state.charts.network;
  if (state.records.length === 0) return <NoRecord what="The network is judged together with the load." />;
  if (result === null) return <h1>The network is being judged</h1>;
  const worst = Math.max(...result.network.levels.map(({ voltageDistortionPct }) => voltageDistortionPct));
  const without = Math.max(
    ...result.network.levels
      .filter(({ levelKvar }) => levelKvar < 1e-6)
      .map(({ voltageDistortionPct }) => voltageDistortionPct),
  );
  const peak = result.network.levels.findLast((level) => level.case === 'nominal')?.parallelOrderH ?? null;
  return (
    <>
      <Headline
        figures={[
          {
            value: result.network.shortCircuitMva,
            unit: 'MVA',
            under: 'fault level at the bus',
            id: 'network.shortCircuitMva',
          },
          { value: peak, under: 'parallel resonance, all stages in', id: 'network.parallelOrderClosedFormH' },
          { value: worst, unit: '%', under: 'distortion, worst case', id: 'network.worstDistortionPct' },
          { value: without, unit: '%', under: 'with no bank', id: 'network.distortionWithoutBankPct' },
        ]}
      >
        {headline(result, charts)}
      </Headline>
      {charts === undefined ? <BeingDrawn /> : <Pictures charts={charts} />}
      {bankOf(state) === null ? null : (
        <>
          <RatioTable />
          <Firmness />
          <DeviceTable result={result} />
          <FittedFields />
          <AgeingTable ageing={result.ageing} />
        </>
      )}
      <MeasuredTable measured={result.measured} />
    </>
  );
}

function Pictures({ charts }: { charts: NonNullable<StationCharts['network']> }) {
  const { impedance, margins, marginWorkings, rival, duties } = charts;
  const styles = { site: 'picked' };
  const working = ['network.parallelOrderClosedFormH', 'bank.group*'];
  return (
    <>
      <div className="split halves">
        <Plot chart={impedance} height={300} styles={styles} working={working} />
        {rival === null ? null : (
          <Plot chart={rival.impedance} height={300} styles={styles} workings={rival.workings.impedance} />
        )}
      </div>
      <div className={rival === null ? 'split halves' : 'split thirds'}>
        <MarginTable chart={margins} workings={marginWorkings} isPickable />
        {rival === null ? null : <MarginTable chart={rival.margins} workings={rival.workings.margins} />}
        <Bars figure={duties} working={['duties*']} isWide />
      </div>
    </>
  );
}

function headline({ verdict, bank, duties }: Result, charts: StationCharts['network']): string {
  const levels = `${formatNumber(bank.levelsKvar.length, 'given')} levels`;
  const over = duties.filter((duty) => duty.verdict === 'avoid').length;
  const rival = charts?.rival ?? null;
  const other = rival === null ? '' : rivalWords(rival);
  if (bank.stages.length === 0)
    return `Without a bank the network stands as it is${over === 0 ? '.' : `; ${over} limits are exceeded already.`}`;
  if (verdict === 'clear') return `At all ${levels} and in every corner the bank stays within its limits.${other}`;
  if (verdict === 'watch') return `Over no limit at any of ${levels}, but near at least one.${other}`;
  return `This bank is over ${over === 1 ? 'one limit' : `${formatNumber(over, 'given')} limits`}.${other}`;
}

function rivalWords({ name, verdict, margins }: NonNullable<NonNullable<StationCharts['network']>['rival']>): string {
  if (verdict === 'clear') return ` ${name}: within limits.`;
  // The map tells of harmonic voltage alone; what else is near or over a limit is not passed over.
  const isOverInMap = margins.marks.some((mark) => mark.kind === 'cell' && mark.fill === 'solid');
  if (isOverInMap) return ` ${margins.finding}.`;
  return verdict === 'avoid' ? ` ${name}: over a limit of the bank itself.` : ` ${name}: over no limit, but near one.`;
}
