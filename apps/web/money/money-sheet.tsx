import { type Money, type MoneyPapers, moneyPapers, type Site } from '#libs/engine/index.js';
import { billsByMonth } from '#libs/present/bills-by-month.js';
import { cashFlowFigure, isPriced, type PricedMoney } from '#libs/present/cash-flow-figure.js';
import { formatFixed } from '#libs/present/format-number.js';
import { capitalWorking } from '#libs/present/headline-workings.js';
import {
  financeWords,
  formatMoney,
  formatPayback,
  noGuarantee,
  priceBookWords,
  tariffWords,
} from '#libs/present/money-words.js';
import { headlineSaving, SAVING_CASE_WORDS } from '#libs/present/saving-words.js';
import { withHeldPapers } from '../desk/held-papers.js';
import { useDesk } from '../desk/use-desk.js';
import { Plot } from '../draw/plot.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { latestResult } from '../line/latest-result.js';
import { Headline } from '../working/headline.js';
import { BilledFields } from './billed-fields.js';
import { MonthBill } from './month-bill.js';
import { PicksTable } from './picks-table.js';
import { PriceFields } from './price-fields.js';
import { TariffFields } from './tariff-fields.js';

/** What the bank costs and saves: bills, cash flow, the ways that were weighed, and the papers they rest on. */
export function MoneySheet() {
  const { state } = useDesk();
  const result = latestResult(state);
  const money = result?.money ?? null;
  // The papers as typed; a key that is no value yet is refused at its field, and the figures stay the last ones.
  const papers = moneyPapers(
    (state.document === null ? {} : withHeldPapers(state.document, state.held)) as Pick<
      Site,
      'tariff' | 'prices' | 'finance' | 'catalogue'
    >,
  );
  const currency = papers.currency === '' ? 'amount' : papers.currency;
  return (
    <>
      {money === null ? (
        <NotPriced papers={papers} />
      ) : (
        <Figures money={money} papers={papers} isOver={result?.verdict === 'avoid'} />
      )}
      <TariffFields currency={currency} />
      <BilledFields currency={currency} />
      <PriceFields currency={currency} />
    </>
  );
}

function NotPriced({ papers }: { papers: MoneyPapers }) {
  return (
    <>
      <h1>This plan is not priced.</h1>
      <p className="row gap">
        {papers.tariff === null
          ? 'Fill in the tariff’s clauses below, and the price book for what the bank costs. The bank, its limits and the proposal do not depend on them.'
          : 'Bills and costs follow once a bank stands.'}
      </p>
    </>
  );
}

function savingSentence({ recommended, savingRange }: Money, amount: string, isOver: boolean): string {
  // The other cases are worked out once the hand rests.
  const saving = savingRange === null ? `${amount} a year with an ideal controller` : `${amount} a year`;
  if (isOver) return `Over a limit, this bank is not offered. It would save ${saving}, ${noGuarantee()}.`;
  return recommended === 'do nothing'
    ? `Nothing is to be built for money’s sake; ${noGuarantee()}.`
    : `The bank saves ${saving}, ${noGuarantee()}.`;
}

function Figures({ money, papers, isOver }: { money: Money; papers: MoneyPapers; isOver: boolean }) {
  const { currency } = papers;
  const saving = formatMoney(headlineSaving(money), currency);
  return (
    <>
      <Headline figures={isPriced(money) ? keyFigures(money, currency) : []}>
        {savingSentence(money, saving, isOver)}
      </Headline>
      <SavingCases money={money} currency={currency} />
      <p className="caption">
        {tariffWords(papers)} {priceBookWords(papers)} {isPriced(money) ? financeWords(papers) : ''}
      </p>
      <PicksTable money={money} papers={papers} />
      <div className="split halves">
        <Plot chart={billsByMonth(money.bills, papers)} height={250} working={['money.savingPerYear']} />
        {isPriced(money) ? (
          <Plot
            chart={cashFlowFigure(money, papers)}
            height={250}
            styles={{ after: 'picked' }}
            working={['money.npv', 'money.discountedPaybackYears', 'money.annuityPerYear']}
          />
        ) : (
          <section className="section">
            <p className="caption">{priceBookWords(papers)}</p>
          </section>
        )}
      </div>
      <MonthBill bills={money.bills} papers={papers} />
      {isPriced(money) ? <CapitalTable money={money} currency={currency} /> : null}
    </>
  );
}

/** Whose saving the headline is, beside those of the other cases; what follows it is told of one of them. */
function SavingCases({ money: { savingRange }, currency }: { money: Money; currency: string }) {
  if (savingRange === null) return null;
  const cases = savingRange.cases.map(
    ({ name, savingPerYear }) => `${formatMoney(savingPerYear, currency)} ${SAVING_CASE_WORDS[name]}`,
  );
  return <p>A year: {cases.join('; ')}. Bills, value and payback below are those with an ideal controller.</p>;
}

function keyFigures(money: PricedMoney, currency: string) {
  const { capital, npv, paybackYears } = money;
  return [
    {
      value: capital.total,
      unit: currency,
      under: 'to build',
      digits: 'whole' as const,
      working: capitalWorking(capital, currency),
    },
    { value: npv, unit: currency, under: 'net present value', digits: 'whole' as const, id: 'money.npv' },
    {
      value: paybackYears,
      unit: 'years',
      under: paybackYears === null ? 'no payback' : `payback, ${formatPayback(paybackYears)}`,
      ...(paybackYears === null ? {} : { id: 'money.paybackYears' }),
    },
    {
      value: money.irrPct,
      unit: '%',
      under: 'internal rate a year',
      ...(money.irrPct === null ? {} : { id: 'money.irrPct' }),
    },
  ];
}

function CapitalTable({ money, currency }: { money: PricedMoney; currency: string }) {
  const { capital, running } = money;
  return (
    <section className="section" aria-labelledby="capital">
      <h2 id="capital">{`What it costs: ${formatMoney(capital.total, currency)} to build`}</h2>
      <p className="caption">
        {`Maintenance ${formatMoney(running.maintenancePerYear, currency)} and losses ${formatMoney(running.lossPerYear, currency)} a year.`}
      </p>
      <ScrollTable name="Items of the capital">
        <thead>
          <tr>
            <th scope="col">item</th>
            <th scope="col">working</th>
            <th scope="col" className="right">
              {currency}
            </th>
          </tr>
        </thead>
        <tbody>
          {capital.lines.map(({ item, working, amount }) => (
            <tr key={item}>
              <th scope="row">{item}</th>
              <td className="told">{working}</td>
              <td className="right">{formatFixed(amount, 0)}</td>
            </tr>
          ))}
          <tr>
            <th scope="row">together</th>
            <td />
            <td className="right">
              <b>{formatFixed(capital.total, 0)}</b>
            </td>
          </tr>
        </tbody>
      </ScrollTable>
    </section>
  );
}
