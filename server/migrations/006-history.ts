import { type Migration } from './migration';

/**
 * The history: one entry per act, sealed into a hash chain while the act commits.
 *
 * hash(n) = SHA-256 of UTF-8 `sequence LF previous_hash LF payload`, hex. The first previous_hash is 64 zeros.
 * A deferred trigger seals under one advisory lock that lives only through the commit, with a sequence counted under
 * that lock, because a PostgreSQL sequence would leave gaps when a transaction rolls back.
 */
export const history: Migration = {
  name: '006-history',
  up: `
    CREATE TABLE history_entries (
      id uuid PRIMARY KEY,
      at timestamptz(3) NOT NULL,
      act text NOT NULL,
      actor_id text NOT NULL,
      record_type text NOT NULL,
      record_id text NOT NULL,
      lot_id uuid,
      -- Canonical JSON; the chain covers these characters and nothing else. Holds ids, never names or addresses.
      payload text NOT NULL
    );
    CREATE INDEX history_entries_at ON history_entries (at DESC);
    CREATE INDEX history_entries_record ON history_entries (record_type, record_id);
    CREATE INDEX history_entries_lot ON history_entries (lot_id) WHERE lot_id IS NOT NULL;
    CREATE INDEX history_entries_actor ON history_entries (actor_id);

    -- Names and addresses beside the chain, so that a person can be forgotten without breaking a hash.
    CREATE TABLE history_personal (
      entry_id uuid PRIMARY KEY REFERENCES history_entries,
      before jsonb,
      after jsonb
    );

    CREATE TABLE history_seals (
      sequence bigint PRIMARY KEY,
      entry_id uuid NOT NULL UNIQUE REFERENCES history_entries,
      previous_hash text NOT NULL UNIQUE,
      hash text NOT NULL UNIQUE,
      sealed_at timestamptz(3) NOT NULL DEFAULT clock_timestamp()
    );

    CREATE TABLE history_checkpoints (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      count bigint NOT NULL,
      head text NOT NULL,
      at timestamptz(3) NOT NULL,
      signature text NOT NULL,
      public_key text NOT NULL
    );

    CREATE TABLE history_verifications (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      result jsonb NOT NULL,
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );

    CREATE FUNCTION seal_history() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public AS $$
    DECLARE
      last_sequence bigint;
      last_hash text;
    BEGIN
      -- In a stricter isolation the snapshot is older than the lock and a stale head would be read.
      IF current_setting('transaction_isolation') <> 'read committed' THEN
        RAISE EXCEPTION 'history is sealed in read committed transactions only';
      END IF;
      PERFORM pg_advisory_xact_lock(7172617);
      SELECT sequence, hash INTO last_sequence, last_hash FROM history_seals ORDER BY sequence DESC LIMIT 1;
      last_sequence := coalesce(last_sequence, 0) + 1;
      last_hash := coalesce(last_hash, repeat('0', 64));
      INSERT INTO history_seals (sequence, entry_id, previous_hash, hash)
      VALUES (last_sequence, NEW.id, last_hash,
        encode(sha256(convert_to(last_sequence || E'\\n' || last_hash || E'\\n' || NEW.payload, 'UTF8')), 'hex'));
      RETURN NULL;
    END $$;
    CREATE CONSTRAINT TRIGGER seal_history AFTER INSERT ON history_entries
      DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION seal_history();

    CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      RAISE EXCEPTION '% is append-only: % refused', TG_TABLE_NAME, TG_OP;
    END $$;
    DO $$
    DECLARE kept text;
    BEGIN
      FOREACH kept IN ARRAY ARRAY['history_entries', 'history_seals', 'history_checkpoints', 'signatures', 'upload_chunks'] LOOP
        EXECUTE format('CREATE TRIGGER %I BEFORE UPDATE OR DELETE ON %I FOR EACH ROW EXECUTE FUNCTION refuse_change()', kept || '_keep', kept);
        EXECUTE format('CREATE TRIGGER %I BEFORE TRUNCATE ON %I FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', kept || '_keep_all', kept);
      END LOOP;
    END $$;
  `,
  down: `
    DROP TRIGGER signatures_keep ON signatures; DROP TRIGGER signatures_keep_all ON signatures;
    DROP TRIGGER upload_chunks_keep ON upload_chunks; DROP TRIGGER upload_chunks_keep_all ON upload_chunks;
    DROP TABLE history_verifications, history_checkpoints, history_seals, history_personal, history_entries;
    DROP FUNCTION seal_history(); DROP FUNCTION refuse_change();
  `,
};
