import { type Migration } from './migration';

/** What a customer sent to approve a concession. Kept with the decision, byte for byte, and never taken away. */
export const concessionFiles: Migration = {
  name: '040-concession-files',
  up: `
    CREATE TABLE concession_files (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      disposition_id uuid NOT NULL REFERENCES dispositions,
      file_name text NOT NULL,
      media_type text NOT NULL,
      byte_count integer NOT NULL,
      sha256 text NOT NULL,
      bytes bytea NOT NULL,
      sent_by uuid NOT NULL REFERENCES people,
      sent_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE INDEX concession_files_disposition ON concession_files (disposition_id);
  `,
  down: `DROP TABLE concession_files`,
};
