import type { EstimateResult } from '#libs/engine/index.js';
import { formatNumber, formatQuantity, inShownMark } from '#libs/present/format-number.js';
import { formatMonth } from '#libs/present/local-stamp.js';
import { remarkConsequence } from '#libs/present/remark-words.js';
import { noPermission } from '#libs/present/verdict-words.js';
import { siteAddress } from '../address.js';
import { useDesk } from '../desk/use-desk.js';
import { ScrollTable } from '../draw/scroll-table.js';
import { VerdictWords } from '../draw/verdict-mark.js';
import { Headline } from '../working/headline.js';

/** What was estimated without a record: headline, bounds by month, reasons, and what is left out. */
export function EstimateResultSheet({ result, proposed }: { result: EstimateResult; proposed: string }) {
  const { desk } = useDesk();
  const { requirement, estimate } = result;
  return (
    <>
      <Headline
        figures={[
          ...(requirement.lowerKvar === null
            ? []
            : [
                {
                  value: requirement.lowerKvar,
                  unit: 'kvar',
                  under: 'lower bound, estimated',
                  id: boundFigure(result, 'lowerKvar'),
                },
              ]),
          ...(requirement.upperKvar === null
            ? []
            : [
                {
                  value: requirement.upperKvar,
                  unit: 'kvar',
                  under: 'upper bound, estimated',
                  id: boundFigure(result, 'upperKvar'),
                },
              ]),
          ...(requirement.listKvar === null
            ? []
            : [
                {
                  value: requirement.listKvar,
                  unit: 'kvar',
                  under: 'by the list, estimated',
                  id: 'estimate.equipment.neededKvar',
                },
              ]),
          { value: result.bank.effectiveKvar, unit: 'kvar', under: 'the bank, effective', id: 'bank.effectiveKvar' },
        ]}
      >
        An estimate from {estimate.basis}, without a meter’s record. Proposed, {proposed}
      </Headline>
      <p className="row gap">
        <VerdictWords verdict={result.verdict} />
        <span className="soft">{noPermission()}</span>
        <a href={siteAddress(desk.siteId, 'proposal')}>The paper</a>
      </p>
      <MonthTable result={result} />
      <section className="section" aria-labelledby="estimate-reasons">
        <h2 id="estimate-reasons">Why</h2>
        <ul>
          {result.reasons.map((reason, at) => (
            <li key={at}>
              {inShownMark(reason.text)} <span className="soft">{remarkConsequence(reason)}</span>
            </li>
          ))}
        </ul>
      </section>
      <section className="section" aria-labelledby="left-out">
        <h2 id="left-out">Left out, since an estimate can’t support it</h2>
        <ul>
          {estimate.refused.map(({ code, text }) => (
            <li key={code}>{text}</li>
          ))}
        </ul>
      </section>
    </>
  );
}

/** The figure of the bill a bound comes from. */
function boundFigure({ requirement, estimate }: EstimateResult, bound: 'lowerKvar' | 'upperKvar'): string {
  const at = estimate.months.findIndex((month) => month[bound] === requirement[bound]);
  return `estimate.months[${at}].${bound}`;
}

function MonthTable({ result }: { result: EstimateResult }) {
  const { months } = result.estimate;
  if (months.length === 0) return null;
  return (
    <ScrollTable name="Bounds by bill, estimated">
      <thead>
        <tr>
          <th scope="col">bill</th>
          <th scope="col">power factor</th>
          <th scope="col">greatest demand</th>
          <th scope="col">lower bound</th>
          <th scope="col">upper bound</th>
        </tr>
      </thead>
      <tbody>
        {months.map(({ month, powerFactorLagging, maxKw, lowerKvar, upperKvar }) => (
          <tr key={month}>
            <th scope="row">{formatMonth(month)}</th>
            <td>{formatNumber(powerFactorLagging)}</td>
            <td>{formatQuantity(maxKw, 'kW')}</td>
            <td>{formatQuantity(lowerKvar, 'kvar')}</td>
            <td>{formatQuantity(upperKvar, 'kvar')}</td>
          </tr>
        ))}
      </tbody>
    </ScrollTable>
  );
}
