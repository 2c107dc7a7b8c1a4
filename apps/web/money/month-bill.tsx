import { Fragment, useState } from 'react';
import type { BillLine, Money, MoneyPapers } from '#libs/engine/index.js';
import { formatFixed, formatQuantity } from '#libs/present/format-number.js';
import { formatMonth } from '#libs/present/local-stamp.js';
import { billDecimals, formatMoney } from '#libs/present/money-words.js';
import { ScrollTable } from '../draw/scroll-table.js';

/** A working by the hour holds thousands of terms; beyond this the rest is left out. */
const LONGEST = 600;

/** The bill of one month, before and after, each line with its working. */
export function MonthBill({ bills, papers }: { bills: Money['bills']; papers: MoneyPapers }) {
  const { before, after } = bills;
  const [picked, setPicked] = useState(() => mostSaved(bills));
  const at = Math.min(picked, before.months.length - 1);
  const month = before.months[at];
  const left = after.months[at];
  if (month === undefined || left === undefined) return null;
  const amount = (value: number) => formatFixed(value, billDecimals(papers));
  const saved = formatMoney(month.total - left.total, papers.currency, billDecimals(papers));
  return (
    <section className="section" aria-labelledby="month-bill">
      <div className="plot-head">
        <h2 id="month-bill">{`The bill of ${formatMonth(month.month)}: ${saved} saved`}</h2>
        <label className="pick">
          <span className="soft">month</span>
          <select value={at} onChange={({ target }) => setPicked(Number(target.value))}>
            {before.months.map(({ month: name }, k) => (
              <option key={name} value={k}>
                {formatMonth(name)}
              </option>
            ))}
          </select>
        </label>
      </div>
      <p className="caption">{`Every line with its working, ${papers.currency}.${month.partial ? ' The record holds a part of this month.' : ''}`}</p>
      <ScrollTable name="Lines of the bill">
        <thead>
          <tr>
            <th scope="col">clause and working</th>
            <th scope="col" className="right">
              before
            </th>
            <th scope="col" className="right">
              after
            </th>
            <th scope="col" className="right">
              saved
            </th>
          </tr>
        </thead>
        <tbody>
          {month.lines.map((line, k) => (
            <Fragment key={line.clause}>
              <tr className="headed">
                <th scope="row">{line.clause}</th>
                <td className="right">{amount(line.amount)}</td>
                <td className="right">{amount(left.lines[k]!.amount)}</td>
                <td className="right">{amount(line.amount - left.lines[k]!.amount)}</td>
              </tr>
              <tr>
                <td colSpan={4}>
                  <Working name="before" line={line} />
                  <Working name="after" line={left.lines[k]!} />
                </td>
              </tr>
            </Fragment>
          ))}
          {month.tax === 0 && left.tax === 0 ? null : (
            <Sum name="tax" before={month.tax} after={left.tax} amount={amount} />
          )}
          <Sum name="together" before={month.total} after={left.total} amount={amount} />
        </tbody>
      </ScrollTable>
      {month.billed === null ? null : (
        <p className="caption">
          {`The real bill was ${amount(month.billed)}; the reckoned one differs by ${amount(month.difference ?? 0)}.`}
        </p>
      )}
    </section>
  );
}

function mostSaved({ before, after }: Money['bills']): number {
  const saved = before.months.map(({ total }, at) => total - (after.months[at]?.total ?? total));
  return Math.max(0, saved.indexOf(Math.max(...saved)));
}

function Working({ name, line }: { name: string; line: BillLine }) {
  const { working, quantity, unit } = line;
  const text = working.length > LONGEST ? `${working.slice(0, LONGEST)} …` : working;
  return <span className="caption told">{`${name}, ${formatQuantity(quantity, unit, 'working')}: ${text}`}</span>;
}

function Sum({
  name,
  before,
  after,
  amount,
}: {
  name: string;
  before: number;
  after: number;
  amount: (value: number) => string;
}) {
  return (
    <tr>
      <th scope="row">{name}</th>
      {[before, after, before - after].map((value, at) => (
        <td key={at} className="right">
          <b>{amount(value)}</b>
        </td>
      ))}
    </tr>
  );
}
