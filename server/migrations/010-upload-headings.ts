import { type Migration } from './migration';

/** The column headings of a file, by which a mapping is remembered; what the daily quota is counted by, and where readings lie. */
export const uploadHeadings: Migration = {
  name: '010-upload-headings',
  up: `
    ALTER TABLE uploads ADD COLUMN headings jsonb;
    CREATE INDEX uploads_uploader ON uploads (uploaded_by, created_at);
    -- Rows lie in the order of their file, so one BRIN index finds a page of them, and serials where they ascend. One over
    -- three columns costs a fifth of a load; three of one column cost half of it.
    CREATE INDEX readings_place ON readings USING brin (upload_number, file_line, serial) WITH (pages_per_range = 16, autosummarize = on);
    DROP INDEX readings_upload;
    DROP INDEX readings_serial;
    -- Compressed by lz4 where the server has it: less is written than without compression, and sooner.
    DO $$
    BEGIN
      ALTER TABLE upload_chunks ALTER COLUMN bytes SET COMPRESSION lz4;
      ALTER TABLE upload_chunks ALTER COLUMN bytes SET STORAGE EXTENDED;
    EXCEPTION WHEN feature_not_supported THEN
      NULL;
    END $$;
    CREATE INDEX uploads_waiting ON uploads (created_at) WHERE state IN ('queued', 'running');
  `,
  down: `
    ALTER TABLE upload_chunks ALTER COLUMN bytes SET STORAGE EXTERNAL;
    CREATE INDEX readings_serial ON readings USING brin (serial) WITH (pages_per_range = 16);
    CREATE INDEX readings_upload ON readings USING brin (upload_number) WITH (pages_per_range = 16);
    DROP INDEX readings_place;
    DROP INDEX uploads_waiting;
    DROP INDEX uploads_uploader;
    ALTER TABLE uploads DROP COLUMN headings;
  `,
};
