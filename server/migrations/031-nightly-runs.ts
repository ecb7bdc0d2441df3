import { type Migration } from './migration';

/** One row a day: whichever worker writes it does the nightly work; one that died in the middle is followed up. */
export const nightlyRuns: Migration = {
  name: '031-nightly-runs',
  up: `
    CREATE TABLE nightly_runs (
      day date PRIMARY KEY,
      started_at timestamptz(3) NOT NULL DEFAULT now(),
      finished_at timestamptz(3),
      outcome jsonb
    );
  `,
  down: `DROP TABLE nightly_runs`,
};
