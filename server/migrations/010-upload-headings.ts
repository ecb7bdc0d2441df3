import { type Migration } from './migration';

/** The column headings of a file, by which a mapping is remembered; and what the daily quota is counted by. */
export const uploadHeadings: Migration = {
  name: '010-upload-headings',
  up: `
    ALTER TABLE uploads ADD COLUMN headings jsonb;
    CREATE INDEX uploads_uploader ON uploads (uploaded_by, created_at);
    CREATE INDEX uploads_waiting ON uploads (created_at) WHERE state IN ('queued', 'running');
  `,
  down: `
    DROP INDEX uploads_waiting;
    DROP INDEX uploads_uploader;
    ALTER TABLE uploads DROP COLUMN headings;
  `,
};
