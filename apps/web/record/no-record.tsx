import { inShownMark } from '#libs/present/format-number.js';
import { siteAddress, useAddress } from '../address.js';
import { useDesk } from '../desk/use-desk.js';
import { keptEstimate } from '../line/kept-estimate.js';
import { EstimateResultSheet } from './estimate-result.js';

/** A station without a record: the kept estimate, or what is missing and the way on. */
export function NoRecord({ what }: { what: string }) {
  const { state } = useDesk();
  const address = useAddress();
  const siteId = address.page === 'site' ? address.siteId : '';
  const estimate = keptEstimate(state);
  if (estimate !== null && state.kept !== null)
    return (
      <EstimateResultSheet result={estimate} proposed={inShownMark(state.kept.proposed.replace(/^estimate: /, ''))} />
    );
  return (
    <>
      <h1>No meter record yet</h1>
      <p className="row gap">
        {what}{' '}
        <a href={siteAddress(siteId, 'record')}>Drop a meter file at Record, or enter bills or equipment there</a>
      </p>
    </>
  );
}
