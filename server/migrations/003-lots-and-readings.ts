import { type Migration } from './migration';

/**
 * Lots, the files uploaded for them, and the readings.
 *
 * `readings` carries no foreign key: one per row costs more than twice the load time (measured). Its integrity comes
 * from the upload's transaction: rows of an upload exist if and only if the upload is done or was withdrawn later,
 * and `server/ingest/reconcile` proves it. BRIN indexes suffice because rows of one upload lie together.
 */
export const lotsAndReadings: Migration = {
  name: '003-lots-and-readings',
  up: `
    CREATE EXTENSION IF NOT EXISTS pg_trgm;

    CREATE TABLE lots (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      lot_number text NOT NULL,
      supplier_id uuid NOT NULL REFERENCES suppliers,
      part_id uuid NOT NULL REFERENCES parts,
      part_revision_id uuid NOT NULL REFERENCES part_revisions,
      date_code text NOT NULL DEFAULT '',
      purchase_order text NOT NULL DEFAULT '',
      lot_size integer NOT NULL CHECK (lot_size > 0),
      received_on date NOT NULL,
      state text NOT NULL DEFAULT 'received' CHECK (state IN ('received', 'under_inspection', 'awaiting_disposition', 'on_hold', 'accepted', 'accepted_under_concession', 'rejected')),
      state_since timestamptz(3) NOT NULL DEFAULT now(),
      severity text NOT NULL DEFAULT 'normal' CHECK (severity IN ('normal', 'tightened', 'reduced', 'discontinued')),
      severity_reasons jsonb NOT NULL DEFAULT '[]',
      -- Set by the disposition that orders 100 % inspection: every unit is owed from then on.
      inspect_all boolean NOT NULL DEFAULT false,
      parent_lot_id uuid REFERENCES lots,
      units_planned integer NOT NULL,
      units_measured integer NOT NULL DEFAULT 0,
      units_lacking_temperatures integer NOT NULL DEFAULT 0,
      beyond_count integer,
      finding text CHECK (finding IN ('accept', 'hold')),
      -- Did the sample of the first inspection meet the plan? The switching rules look at this, not at the disposition.
      plan_met boolean,
      band_strip jsonb,
      current_analysis_id uuid,
      -- Raised whenever the set of readings or the criteria change: an older analysis can no longer be signed.
      data_version integer NOT NULL DEFAULT 1,
      registered_by uuid NOT NULL REFERENCES people,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE UNIQUE INDEX lots_lot_number ON lots (lower(lot_number));
    CREATE INDEX lots_lot_number_find ON lots USING gin (lot_number gin_trgm_ops);
    CREATE INDEX lots_purchase_order_find ON lots USING gin (purchase_order gin_trgm_ops);
    CREATE INDEX lots_date_code ON lots (date_code);
    CREATE INDEX lots_received_on ON lots (received_on DESC, id);
    CREATE INDEX lots_state_since ON lots (state, state_since, id);
    CREATE INDEX lots_since ON lots (state_since DESC, id);
    CREATE INDEX lots_number_order ON lots (lot_number, id);
    CREATE INDEX lots_size ON lots (lot_size DESC, id);
    CREATE INDEX lots_supplier_part ON lots (supplier_id, part_id, received_on DESC);
    CREATE INDEX lots_part ON lots (part_id, received_on DESC);
    CREATE INDEX lots_parent ON lots (parent_lot_id) WHERE parent_lot_id IS NOT NULL;

    -- The receiver revisions a lot is judged by: those in force at receipt.
    CREATE TABLE lot_receivers (
      lot_id uuid NOT NULL REFERENCES lots,
      receiver_revision_id uuid NOT NULL REFERENCES receiver_revisions,
      PRIMARY KEY (lot_id, receiver_revision_id)
    );

    CREATE TABLE uploads (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      number integer GENERATED ALWAYS AS IDENTITY UNIQUE,
      lot_id uuid NOT NULL REFERENCES lots,
      bench_id uuid REFERENCES benches,
      -- How well the bench measured on that day; a later calibration changes nothing here.
      bench_uncertainty_ppm double precision,
      bench_in_calibration boolean,
      file_name text NOT NULL,
      byte_count bigint NOT NULL DEFAULT 0,
      sha256 text NOT NULL DEFAULT '',
      stored_encoding text NOT NULL DEFAULT 'identity' CHECK (stored_encoding IN ('identity', 'gzip')),
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'running', 'done', 'failed', 'withdrawn')),
      stage text NOT NULL DEFAULT 'waiting' CHECK (stage IN ('waiting', 'reading', 'analysing', 'finished')),
      mapping jsonb,
      remember_mapping boolean NOT NULL DEFAULT false,
      rows_in_file integer NOT NULL DEFAULT 0,
      rows_taken integer NOT NULL DEFAULT 0,
      rows_refused integer NOT NULL DEFAULT 0,
      units_count integer NOT NULL DEFAULT 0,
      bytes_read bigint NOT NULL DEFAULT 0,
      rows_per_second double precision,
      seconds_left double precision,
      failure jsonb,
      warnings jsonb NOT NULL DEFAULT '[]',
      readings_sha256 text,
      lease_token uuid,
      lease_until timestamptz(3),
      attempts integer NOT NULL DEFAULT 0,
      uploaded_by uuid REFERENCES people,
      bench_token_id uuid REFERENCES bench_tokens,
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      started_at timestamptz(3),
      finished_at timestamptz(3),
      withdrawn_at timestamptz(3),
      withdrawn_by uuid REFERENCES people,
      withdrawn_reason text,
      CHECK (state <> 'done' OR rows_in_file = rows_taken + rows_refused)
    );
    CREATE INDEX uploads_lot ON uploads (lot_id, created_at DESC);
    CREATE INDEX uploads_sha256 ON uploads (sha256);

    CREATE TABLE upload_chunks (
      upload_id uuid NOT NULL REFERENCES uploads,
      part integer NOT NULL,
      bytes bytea NOT NULL,
      PRIMARY KEY (upload_id, part)
    );
    -- The bytes are already compressed or not worth it: do not spend time compressing them again.
    ALTER TABLE upload_chunks ALTER COLUMN bytes SET STORAGE EXTERNAL;

    CREATE TABLE readings (
      upload_number integer NOT NULL,
      file_line integer NOT NULL,
      file_column smallint NOT NULL DEFAULT 0,
      serial text COLLATE "C" NOT NULL,
      temperature_c numeric,
      frequency_hz numeric NOT NULL CHECK (frequency_hz > 0 AND frequency_hz < 'Infinity'),
      measured_at timestamptz,
      resistance_ohm numeric,
      load_capacitance_pf numeric,
      supply_v numeric,
      drive_uw numeric
    );
    CREATE INDEX readings_upload ON readings USING brin (upload_number) WITH (pages_per_range = 16);
    CREATE INDEX readings_serial ON readings USING brin (serial) WITH (pages_per_range = 16);

    CREATE TABLE refused_rows (
      upload_number integer NOT NULL,
      file_line integer NOT NULL,
      column_name text NOT NULL,
      text_found text NOT NULL,
      rule text NOT NULL,
      reason text NOT NULL,
      raw_line text NOT NULL
    );
    CREATE INDEX refused_rows_upload ON refused_rows (upload_number, file_line);

    CREATE TABLE saved_mappings (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      supplier_id uuid NOT NULL REFERENCES suppliers,
      header_hash text NOT NULL,
      version integer NOT NULL,
      mapping jsonb NOT NULL,
      saved_by uuid NOT NULL REFERENCES people,
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      UNIQUE (supplier_id, header_hash, version)
    );

    -- A sub-lot after sorting holds the named units of its parent.
    CREATE TABLE sub_lot_units (
      lot_id uuid NOT NULL REFERENCES lots,
      serial text COLLATE "C" NOT NULL,
      PRIMARY KEY (lot_id, serial)
    );
  `,
  down: `DROP TABLE sub_lot_units, saved_mappings, refused_rows, readings, upload_chunks, uploads, lot_receivers, lots`,
};
