import { type Migration } from './migration';

/** The column headings of a file, by which a mapping is remembered; what the daily quota is counted by, and where readings lie. */
export const uploadHeadings: Migration = {
  name: '010-upload-headings',
  up: `
    ALTER TABLE uploads ADD COLUMN headings jsonb;
    CREATE INDEX uploads_uploader ON uploads (uploaded_by, created_at);
    -- Rows lie in the order of their file, so one BRIN index over both finds a page of them.
    CREATE INDEX readings_place ON readings USING brin (upload_number, file_line) WITH (pages_per_range = 16, autosummarize = on);
    DROP INDEX readings_upload;
    CREATE INDEX uploads_waiting ON uploads (created_at) WHERE state IN ('queued', 'running');
  `,
  down: `
    CREATE INDEX readings_upload ON readings USING brin (upload_number) WITH (pages_per_range = 16);
    DROP INDEX readings_place;
    DROP INDEX uploads_waiting;
    DROP INDEX uploads_uploader;
    ALTER TABLE uploads DROP COLUMN headings;
  `,
};
