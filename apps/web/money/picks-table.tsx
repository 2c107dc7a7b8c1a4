import { Fragment } from 'react';
import type { Alternative, Money, MoneyPapers } from '#libs/engine/index.js';
import { formatFixed, formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { namedPicks, proofWords } from '#libs/present/money-words.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { VerdictWords } from '../draw/verdict-mark.js';

/** Doing nothing, keeping today's bank and the new one beside each other, with the reasons between them. */
export function PicksTable({ money, papers }: { money: Money; papers: MoneyPapers }) {
  const picks = namedPicks(money, papers);
  if (picks.length === 0) {
    return (
      <section className="section">
        <p className="caption">
          Nothing was compared: the bank as it stands is priced as new. A plan from tariff, prices and catalogue weighs
          it against the others.
        </p>
      </section>
    );
  }
  const taken = picks.find(({ isRecommended }) => isRecommended);
  return (
    <section className="section" aria-labelledby="picks">
      <h2 id="picks">{`Recommended: ${taken?.name.toLowerCase()}`}</h2>
      <p className="caption">
        {`Net present value against doing nothing, ${papers.currency}. `}
        {money.proof === null ? '' : proofWords(money.proof, papers.currency)}
      </p>
      <ScrollTable name="The ways that were weighed">
        <thead>
          <tr>
            <th scope="col">way, and why</th>
            {['capital', 'value', 'kvarh left', 'switchings', 'distortion'].map((head) => (
              <th key={head} scope="col" className="right">
                {head}
              </th>
            ))}
            <th scope="col">target</th>
            <th scope="col">verdict</th>
          </tr>
        </thead>
        <tbody>
          {picks.map(({ name, way, reason, isRecommended }) => (
            <Fragment key={name}>
              <tr className={isRecommended ? 'headed own' : 'headed'}>
                <th scope="row">{name}</th>
                <WayCells way={way} />
              </tr>
              <Told words={reason} />
            </Fragment>
          ))}
          {money.alternatives
            .filter(({ sample }) => sample)
            .map((way) => (
              <Fragment key={way.name}>
                <tr className="headed">
                  <th scope="row">{way.name}</th>
                  <WayCells way={way} />
                </tr>
                <Told words="A sample of those simulated whole." />
              </Fragment>
            ))}
        </tbody>
      </ScrollTable>
    </section>
  );
}

function Told({ words }: { words: string }) {
  return (
    <tr>
      <td colSpan={8}>
        <span className="caption told">{words}</span>
      </td>
    </tr>
  );
}

function WayCells({ way }: { way: Alternative | null }) {
  if (way === null) {
    return (
      <td colSpan={7} className="soft">
        none
      </td>
    );
  }
  const tone = way.verdict === 'avoid' ? 'right soft' : 'right';
  return (
    <>
      <td className={tone}>{formatFixed(way.capital, 0)}</td>
      <td className={tone}>
        {formatFixed(way.npv, 0)}
        {way.verdict === 'avoid' ? <span className="caption beneath">not offered</span> : null}
      </td>
      <td className="right">{formatNumber(way.laggingKvarh)}</td>
      <td className="right">{formatNumber(way.totalSwitchings, 'whole')}</td>
      <td className="right nowrap">{formatQuantity(way.voltageDistortionPct, '%')}</td>
      <td>{way.targetMet ? 'held' : 'missed'}</td>
      <td>
        <VerdictWords verdict={way.verdict} />
      </td>
    </>
  );
}
