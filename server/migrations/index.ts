import { people } from './001-people';
import { criteria } from './002-criteria';
import { lotsAndReadings } from './003-lots-and-readings';
import { decisions } from './004-decisions';
import { holdsAndMail } from './005-holds-and-mail';
import { history } from './006-history';
import { uploadHeadings } from './010-upload-headings';
import { holdRecords } from './020-hold-records';
import { owedResistance } from './030-owed-resistance';
import { nightlyRuns } from './031-nightly-runs';
import { concessionFiles } from './040-concession-files';
import { type Migration } from './migration';

/** In order. A step that has run anywhere is never edited; a change is a new step. */
export const migrations: Migration[] = [
  people,
  criteria,
  lotsAndReadings,
  decisions,
  holdsAndMail,
  history,
  uploadHeadings,
  holdRecords,
  owedResistance,
  nightlyRuns,
  concessionFiles,
];
