import { type Migration } from './migration';

/** Who may come in: suppliers, people, their mailed links, their sessions and the counters that slow guessing. */
export const people: Migration = {
  name: '001-people',
  up: `
    CREATE TABLE suppliers (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      name text NOT NULL,
      location text NOT NULL DEFAULT '',
      notes text NOT NULL DEFAULT '',
      active boolean NOT NULL DEFAULT true,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE UNIQUE INDEX suppliers_name ON suppliers (lower(name));

    CREATE TABLE people (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      name text NOT NULL,
      email text NOT NULL,
      role text NOT NULL CHECK (role IN ('technician', 'quality_engineer', 'supplier_contact', 'auditor', 'administrator')),
      supplier_id uuid REFERENCES suppliers,
      password_hash text,
      state text NOT NULL DEFAULT 'invited' CHECK (state IN ('invited', 'active', 'disabled')),
      -- Raised to end every session of the person at once.
      session_epoch integer NOT NULL DEFAULT 1,
      failed_sign_ins integer NOT NULL DEFAULT 0,
      sign_in_delayed_until timestamptz(3),
      failed_signings integer NOT NULL DEFAULT 0,
      signing_locked_until timestamptz(3),
      mail_choice text NOT NULL DEFAULT 'at_once' CHECK (mail_choice IN ('at_once', 'daily')),
      table_preferences jsonb NOT NULL DEFAULT '{}',
      last_sign_in_at timestamptz(3),
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      CHECK ((role = 'supplier_contact') = (supplier_id IS NOT NULL))
    );
    -- An address belongs to one account for ever, so that a signature is never reassigned.
    CREATE UNIQUE INDEX people_email ON people (lower(email));
    CREATE INDEX people_supplier ON people (supplier_id);

    CREATE TABLE person_links (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      person_id uuid REFERENCES people,
      purpose text NOT NULL CHECK (purpose IN ('invitation', 'reset', 'first_administrator')),
      token_hash text NOT NULL UNIQUE,
      mail_id uuid,
      expires_at timestamptz(3) NOT NULL,
      used_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE INDEX person_links_person ON person_links (person_id, created_at DESC);

    CREATE TABLE sessions (
      sid text PRIMARY KEY,
      sess json NOT NULL,
      expire timestamptz(6) NOT NULL
    );
    CREATE INDEX sessions_expire ON sessions (expire);
    CREATE INDEX sessions_person ON sessions ((sess -> 'passport' ->> 'user'));

    -- Counters hold across several server processes (rate-limiter-flexible's columns).
    CREATE TABLE rate_limits (
      key text PRIMARY KEY,
      points integer NOT NULL DEFAULT 0,
      expire bigint
    );

    CREATE TABLE saved_filters (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      person_id uuid NOT NULL REFERENCES people,
      list text NOT NULL,
      name text NOT NULL,
      query text NOT NULL,
      shared_with_role text,
      created_at timestamptz(3) NOT NULL DEFAULT now(),
      UNIQUE (person_id, list, name)
    );
  `,
  down: `DROP TABLE saved_filters, rate_limits, sessions, person_links, people, suppliers`,
};
