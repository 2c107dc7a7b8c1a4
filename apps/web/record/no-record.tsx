import { siteAddress, useAddress } from '../address.js';

/** A station without a record: what is missing, and the way on. */
export function NoRecord({ what }: { what: string }) {
  const address = useAddress();
  const siteId = address.page === 'site' ? address.siteId : '';
  return (
    <>
      <h1>No meter record yet</h1>
      <p className="row gap">
        {what} <a href={siteAddress(siteId, 'record')}>Drop a meter file at Record</a>
      </p>
    </>
  );
}
