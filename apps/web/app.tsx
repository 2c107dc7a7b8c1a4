import { lazy, Suspense } from 'react';
import { useAddress } from './address.js';
import { Head } from './line/head.js';
import { SitePage } from './line/site-page.js';
import { SitesPage } from './sites/sites-page.js';

const SurveySheet = lazy(() =>
  import('./record/survey-sheet.js').then(({ SurveySheet: sheet }) => ({ default: sheet })),
);

const ReevaluationPage = lazy(() =>
  import('./reevaluation/reevaluation-page.js').then(({ ReevaluationPage: page }) => ({ default: page })),
);

const PapersPage = lazy(() => import('./papers/papers-page.js').then(({ PapersPage: page }) => ({ default: page })));

/** The page: the list of sites, one site, or a word that nothing is here. */
export function App() {
  const address = useAddress();
  switch (address.page) {
    case 'sites':
      return <SitesPage />;
    case 'papers':
      return (
        <Suspense>
          <PapersPage />
        </Suspense>
      );
    case 'site':
      return <SitePage key={address.siteId} address={address} />;
    case 'survey':
      return (
        <Suspense>
          <SurveySheet siteId={address.siteId} />
        </Suspense>
      );
    case 'reevaluation':
      return (
        <Suspense>
          <ReevaluationPage key={address.siteId} siteId={address.siteId} asked={address.revision} />
        </Suspense>
      );
    case 'unknown':
      return (
        <div className="sheet">
          <Head />
          <div className="sites-line" />
          <main className="bare">
            <h1>Nothing stands at this address</h1>
            <p>
              “{address.asked}” leads nowhere. <a href="#/">All sites</a> is the way on.
            </p>
          </main>
        </div>
      );
  }
}
