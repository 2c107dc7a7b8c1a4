import { type ReactNode, useEffect, useState } from 'react';
import { type Address, STATIONS, type Station } from '../address.js';
import { isChanged, staleFrom } from '../desk/desk-state.js';
import { SiteDesk } from '../desk/site-desk.js';
import { DeskContext, useDesk } from '../desk/use-desk.js';
import { picksOf } from '../working/asked-figure.js';
import { Head } from './head.js';
import { latePart, PartAwaited } from './late-part.js';
import { latestResult } from './latest-result.js';
import { Notices } from './notices.js';
import { OpenPoints } from './open-points.js';
import { StationLine } from './station-line.js';

const LOAD: Record<Station, () => Promise<() => ReactNode>> = {
  record: () => import('../record/record-sheet.js').then(({ RecordSheet }) => RecordSheet),
  supply: () => import('../supply/supply-sheet.js').then(({ SupplySheet }) => SupplySheet),
  need: () => import('../need/need-sheet.js').then(({ NeedSheet }) => NeedSheet),
  bank: () => import('../bank/bank-sheet.js').then(({ BankSheet }) => BankSheet),
  network: () => import('../network/network-sheet.js').then(({ NetworkSheet }) => NetworkSheet),
  money: () => import('../money/money-sheet.js').then(({ MoneySheet }) => MoneySheet),
  proposal: () => import('../proposal/proposal-sheet.js').then(({ ProposalSheet }) => ProposalSheet),
};
const SHEETS = {
  record: latePart(LOAD.record),
  supply: latePart(LOAD.supply),
  need: latePart(LOAD.need),
  bank: latePart(LOAD.bank),
  network: latePart(LOAD.network),
  money: latePart(LOAD.money),
  proposal: latePart(LOAD.proposal),
};
/** So long after a site is opened the other stations are fetched, so that they open without a connection [ms]. */
const FETCH_OTHERS_MS = 5000;

type SiteAddress = Extract<Address, { page: 'site' }>;

/** One site: the line, the open station, and what the plan still rests on. */
export function SitePage({ address }: { address: SiteAddress }) {
  const [desk, setDesk] = useState<SiteDesk | null>(null);
  useEffect(() => {
    const opened = new SiteDesk(address.siteId);
    void opened.open();
    setDesk(opened);
    return () => opened.close();
  }, [address.siteId]);
  if (desk === null) return null;
  return (
    <DeskContext value={desk}>
      <OpenSite address={address} />
    </DeskContext>
  );
}

function OpenSite({ address }: { address: SiteAddress }) {
  const { desk, state } = useDesk();
  const { station, field, figure } = address;
  const levelsKvar = latestResult(state)?.bank.levelsKvar;
  // biome-ignore lint/correctness/useExhaustiveDependencies: picked once, when the levels are first known
  useEffect(() => {
    const picks = levelsKvar === undefined ? null : picksOf(figure, levelsKvar);
    if (picks !== null) desk.pick(picks);
  }, [desk, figure, levelsKvar === undefined]);
  useEffect(() => desk.openStation(station), [desk, station]);
  useEffect(() => {
    const timer = setTimeout(() => {
      for (const load of Object.values(LOAD)) load().catch(() => undefined);
    }, FETCH_OTHERS_MS);
    return () => clearTimeout(timer);
  }, []);
  useEffect(() => {
    if (field !== null) focusField(field);
  }, [field]);
  useEffect(() => {
    document.title = state.site === null ? 'Varwright' : `${state.site.name} – Varwright`;
  }, [state.site]);
  const Sheet = SHEETS[station];
  return (
    <div className="sheet">
      <Head site={<SiteTitle />} state={<KeptState />}>
        <KeepWays />
      </Head>
      <div className="frame" style={{ '--open': STATIONS.indexOf(station) } as React.CSSProperties}>
        <StationLine siteId={address.siteId} open={station} />
        <main className="station-sheet" aria-label={station}>
          <Notices />
          {state.stage === 'open' ? (
            <PartAwaited key={station} name={station.charAt(0).toUpperCase() + station.slice(1)}>
              <Sheet />
            </PartAwaited>
          ) : (
            <NotOpen />
          )}
        </main>
        <OpenPoints siteId={address.siteId} />
      </div>
    </div>
  );
}

function NotOpen() {
  const { desk, state } = useDesk();
  switch (state.stage) {
    case 'unknown':
      return (
        <>
          <h1>No site stands at this address</h1>
          <p className="row gap">
            It may have been deleted. <a href="#/">All sites</a>
          </p>
        </>
      );
    case 'unreachable':
      return (
        <>
          <h1>The server does not answer</h1>
          <p className="row gap">
            Start it again, then{' '}
            <button type="button" className="way" onClick={() => void desk.open()}>
              Open again
            </button>
          </p>
        </>
      );
    default:
      return <h1>Opening the site</h1>;
  }
}

function SiteTitle() {
  const { state } = useDesk();
  const name = state.document?.name ?? '';
  const isExample = /\(example\)/.test(name);
  return (
    <>
      {name.replace(/\s*\(example\)/, '')}
      {isExample ? <span className="soft"> {'\u00a0'}an example of ours</span> : null}
    </>
  );
}

function KeptState() {
  const { state } = useDesk();
  const { kept, review, job, offlineSince, saving } = state;
  if (offlineSince !== null) return `No connection since ${offlineSince}`;
  if (job !== null) return `computing, ${Math.round(100 * job.progress)}\u00a0% done`;
  if (saving) return 'saving';
  if (isChanged(state)) return 'changed, not kept yet';
  if (kept === null) return 'no revision yet';
  if (staleFrom(state) !== null) return `inputs changed since revision ${kept.revision}`;
  return `revision ${kept.revision}, ${review?.stateText ?? 'kept'}`;
}

function KeepWays() {
  const { desk, state } = useDesk();
  const isBusy = state.saving || state.job !== null;
  // A later record, or a later version of a shared paper, changes the inputs without a hand on this page.
  const isNewToKeep = isChanged(state) || staleFrom(state) !== null;
  if (state.stage !== 'open') return null;
  return (
    <>
      {isChanged(state) && !isBusy ? (
        <button type="button" className="way" onClick={() => desk.putBack()}>
          Put back
        </button>
      ) : null}
      {state.job === null ? null : (
        <button type="button" className="way" onClick={() => void desk.cancelJob()}>
          Stop
        </button>
      )}
      {isNewToKeep && Object.keys(state.typed).length === 0 ? (
        <button
          type="button"
          className="button filled"
          disabled={isBusy}
          onClick={() => void desk.keep(keepKind(state))}
        >
          Compute and keep
        </button>
      ) : null}
    </>
  );
}

/** What was kept as a plan is planned again, unless the hand changed its bank. */
function keepKind({ kept, trial, document }: ReturnType<typeof useDesk>['state']): 'plan' | 'assess' {
  if (trial !== null) return 'assess';
  if (kept !== null) return kept.kind;
  return document?.bank === undefined ? 'plan' : 'assess';
}

function focusField(path: string): void {
  // The sheet with the field may still be on its way.
  let tries = 0;
  const look = () => {
    const field = document.getElementById(`field:${path}`);
    if (field !== null) {
      field.scrollIntoView({ block: 'center' });
      field.focus({ preventScroll: true });
    } else if (tries++ < 40) setTimeout(look, 50);
  };
  look();
}
