import { FirstTables1764547200000 } from './1764547200000-first-tables.js';
import { ExtendedRecords1764634000000 } from './1764634000000-extended-records.js';
import { EstimatedRevisions1764637200000 } from './1764637200000-estimated-revisions.js';
import { Organisations1764640800000 } from './1764640800000-organisations.js';
import { People1764644400000 } from './1764644400000-people.js';
import { LinksAndAnswers1764648000000 } from './1764648000000-links-and-answers.js';
import { Reviews1764651600000 } from './1764651600000-reviews.js';
import { SharedPapers1764655200000 } from './1764655200000-shared-papers.js';
import { JobNames1764658800000 } from './1764658800000-job-names.js';
import { PaperForms1764662400000 } from './1764662400000-paper-forms.js';

/** Every change of the schema, oldest first. */
export const migrations = [
  FirstTables1764547200000,
  ExtendedRecords1764634000000,
  EstimatedRevisions1764637200000,
  Organisations1764640800000,
  People1764644400000,
  LinksAndAnswers1764648000000,
  Reviews1764651600000,
  SharedPapers1764655200000,
  JobNames1764658800000,
  PaperForms1764662400000,
];
