import { type Migration } from './migration';

/** Analyses, signatures and dispositions. Signatures and frozen analyses are append-only for the application's role. */
export const decisions: Migration = {
  name: '004-decisions',
  up: `
    CREATE TABLE analyses (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      lot_id uuid NOT NULL REFERENCES lots,
      version integer NOT NULL,
      data_version integer NOT NULL,
      method_version text NOT NULL,
      input_hash text NOT NULL,
      criteria_hash text NOT NULL,
      criteria jsonb NOT NULL,
      -- Text, not jsonb: the hash is of exactly these characters.
      result_text text NOT NULL,
      result_hash text NOT NULL,
      frozen_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      UNIQUE (lot_id, version)
    );

    -- An analysis never changes; all that may happen to it is being frozen, once.
    CREATE FUNCTION keep_analysis() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF OLD.frozen_at IS NOT NULL OR (to_jsonb(NEW) - 'frozen_at') <> (to_jsonb(OLD) - 'frozen_at') THEN
        RAISE EXCEPTION 'an analysis never changes: % refused', TG_OP;
      END IF;
      RETURN NEW;
    END $$;
    CREATE TRIGGER analyses_keep BEFORE UPDATE ON analyses FOR EACH ROW EXECUTE FUNCTION keep_analysis();

    CREATE TABLE analysis_offsets (
      analysis_id uuid PRIMARY KEY REFERENCES analyses,
      -- Sorted offsets in ppm, Float64 little endian.
      bytes bytea NOT NULL
    );
    ALTER TABLE analysis_offsets ALTER COLUMN bytes SET STORAGE EXTERNAL;

    CREATE TABLE signatures (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      person_id uuid NOT NULL REFERENCES people,
      printed_name text NOT NULL,
      role text NOT NULL,
      meaning text NOT NULL,
      reason text NOT NULL,
      record_type text NOT NULL,
      record_id uuid NOT NULL,
      record_version integer NOT NULL,
      -- What the signer saw, word for word; the hash covers it together with signer, record, version, meaning and time.
      content_text text NOT NULL,
      content_hash text NOT NULL,
      signed_at timestamptz(3) NOT NULL,
      zone text NOT NULL,
      UNIQUE (record_type, record_id, record_version, person_id, meaning)
    );
    CREATE INDEX signatures_record ON signatures (record_type, record_id);

    CREATE TABLE dispositions (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      lot_id uuid NOT NULL REFERENCES lots,
      number integer NOT NULL,
      data_version integer NOT NULL,
      analysis_id uuid NOT NULL REFERENCES analyses,
      decision text NOT NULL CHECK (decision IN ('accept', 'hold', 'accept_under_concession', 'reject', 'inspect_all')),
      reason text NOT NULL,
      state text NOT NULL CHECK (state IN ('awaiting_second', 'in_force', 'superseded', 'refused', 'overtaken')),
      treatment text CHECK (treatment IN ('return_to_supplier', 'scrap')),
      concession jsonb,
      correction text NOT NULL DEFAULT '',
      content_hash text NOT NULL,
      signed_by uuid NOT NULL REFERENCES people,
      signed_at timestamptz(3) NOT NULL,
      UNIQUE (lot_id, number)
    );
    -- One decision waits or counts at a time.
    CREATE UNIQUE INDEX dispositions_one_live ON dispositions (lot_id) WHERE state IN ('awaiting_second', 'in_force');

    ALTER TABLE part_revisions ADD FOREIGN KEY (approval_signature_id) REFERENCES signatures;
    ALTER TABLE receiver_revisions ADD FOREIGN KEY (approval_signature_id) REFERENCES signatures;
    ALTER TABLE lots ADD FOREIGN KEY (current_analysis_id) REFERENCES analyses;
  `,
  down: `
    ALTER TABLE lots DROP CONSTRAINT lots_current_analysis_id_fkey;
    ALTER TABLE receiver_revisions DROP CONSTRAINT receiver_revisions_approval_signature_id_fkey;
    ALTER TABLE part_revisions DROP CONSTRAINT part_revisions_approval_signature_id_fkey;
    DROP TABLE dispositions, signatures, analysis_offsets, analyses;
    DROP FUNCTION keep_analysis();
  `,
};
