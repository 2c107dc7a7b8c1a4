import { useAddress } from './address.js';
import { BarePage, latePart, PartAwaited } from './line/late-part.js';
import { SitePage } from './line/site-page.js';
import { SitesPage } from './sites/sites-page.js';

const SurveySheet = latePart(() => import('./record/survey-sheet.js').then(({ SurveySheet: sheet }) => sheet));

const ReevaluationPage = latePart(() =>
  import('./reevaluation/reevaluation-page.js').then(({ ReevaluationPage: page }) => page),
);

const PapersPage = latePart(() => import('./papers/papers-page.js').then(({ PapersPage: page }) => page));

/** The page: the list of sites, one site, or a word that nothing is here. */
export function App() {
  const address = useAddress();
  switch (address.page) {
    case 'sites':
      return <SitesPage />;
    case 'papers':
      return (
        <PartAwaited name="Shared papers" isPage>
          <PapersPage />
        </PartAwaited>
      );
    case 'site':
      return <SitePage key={address.siteId} address={address} />;
    case 'survey':
      return (
        <PartAwaited name="A sheet for the visit" isPage>
          <SurveySheet siteId={address.siteId} />
        </PartAwaited>
      );
    case 'reevaluation':
      return (
        <PartAwaited name="Judging the bank again" isPage>
          <ReevaluationPage key={address.siteId} siteId={address.siteId} asked={address.revision} />
        </PartAwaited>
      );
    case 'unknown':
      return (
        <BarePage>
          <h1>Nothing stands at this address</h1>
          <p>
            “{address.asked}” leads nowhere. <a href="#/">All sites</a> is the way on.
          </p>
        </BarePage>
      );
  }
}
