import { useDesk } from '../desk/use-desk.js';
import { latestResult } from '../line/latest-result.js';

/** What the bank costs and saves, once it is computed. */
export function MoneySheet() {
  const { state } = useDesk();
  const money: unknown = latestResult(state)?.money ?? null;
  const papers = ['tariff', 'prices', 'finance'].filter((name) => state.document?.[name] !== undefined);
  if (money !== null) return <h1>This plan is priced</h1>;
  return (
    <>
      <h1>This plan is not priced.</h1>
      <p className="row gap">
        Costs and savings are not computed in this edition.{' '}
        {papers.length === 0
          ? 'No tariff, price book or finance terms stand in the site file.'
          : `Kept with the site and not used yet: ${papers.join(', ')}.`}{' '}
        The bank, its limits and the proposal do not depend on them.
      </p>
    </>
  );
}
