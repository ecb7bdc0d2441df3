import { type Migration } from './migration';

/** What lots are judged by: parts, receivers and their revisions, and the benches that measure. */
export const criteria: Migration = {
  name: '002-criteria',
  up: `
    CREATE TABLE parts (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      part_number text NOT NULL,
      device_kind text NOT NULL CHECK (device_kind IN ('crystal', 'XO', 'VCXO', 'TCXO', 'OCXO')),
      description text NOT NULL DEFAULT '',
      active boolean NOT NULL DEFAULT true,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE UNIQUE INDEX parts_part_number ON parts (lower(part_number));

    CREATE TABLE part_revisions (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      part_id uuid NOT NULL REFERENCES parts,
      revision text NOT NULL,
      state text NOT NULL DEFAULT 'draft' CHECK (state IN ('draft', 'approved', 'withdrawn')),
      effective_from date,
      change_note text NOT NULL DEFAULT '',
      -- Exact decimal as written: numeric keeps every digit, a binary float would not.
      nominal_frequency_hz numeric NOT NULL CHECK (nominal_frequency_hz > 0 AND nominal_frequency_hz < 'Infinity'),
      criteria jsonb NOT NULL,
      created_by uuid NOT NULL REFERENCES people,
      approval_signature_id uuid,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      UNIQUE (part_id, revision)
    );

    CREATE TABLE receivers (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      name text NOT NULL,
      description text NOT NULL DEFAULT '',
      active boolean NOT NULL DEFAULT true,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE UNIQUE INDEX receivers_name ON receivers (lower(name));

    CREATE TABLE receiver_revisions (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      receiver_id uuid NOT NULL REFERENCES receivers,
      revision text NOT NULL,
      state text NOT NULL DEFAULT 'draft' CHECK (state IN ('draft', 'approved', 'withdrawn')),
      effective_from date,
      change_note text NOT NULL DEFAULT '',
      criteria jsonb NOT NULL,
      created_by uuid NOT NULL REFERENCES people,
      approval_signature_id uuid,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      UNIQUE (receiver_id, revision)
    );

    CREATE TABLE receiver_parts (
      receiver_id uuid NOT NULL REFERENCES receivers,
      part_id uuid NOT NULL REFERENCES parts,
      PRIMARY KEY (receiver_id, part_id)
    );
    CREATE INDEX receiver_parts_part ON receiver_parts (part_id);

    CREATE TABLE benches (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      name text NOT NULL,
      counter text NOT NULL,
      location text NOT NULL DEFAULT '',
      expanded_uncertainty_ppm double precision NOT NULL CHECK (expanded_uncertainty_ppm > 0),
      coverage_factor double precision NOT NULL DEFAULT 2,
      calibration_due date NOT NULL,
      calibration_reference text NOT NULL DEFAULT '',
      chamber_low_c double precision,
      chamber_high_c double precision,
      usual boolean NOT NULL DEFAULT false,
      active boolean NOT NULL DEFAULT true,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE UNIQUE INDEX benches_name ON benches (lower(name));
    CREATE UNIQUE INDEX benches_usual ON benches (usual) WHERE usual;

    CREATE TABLE bench_tokens (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      bench_id uuid NOT NULL REFERENCES benches,
      label text NOT NULL,
      token_hash text NOT NULL UNIQUE,
      created_by uuid NOT NULL REFERENCES people,
      last_used_at timestamptz(3),
      revoked_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE INDEX bench_tokens_bench ON bench_tokens (bench_id);
  `,
  down: `DROP TABLE bench_tokens, benches, receiver_parts, receiver_revisions, receivers, part_revisions, parts`,
};
