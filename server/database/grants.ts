/** Only added to, never changed: the trust in old records rests on this list. */
const appendOnly = [
  'history_entries',
  'history_checkpoints',
  'history_verifications',
  'history_personal',
  'signatures',
  'hold_messages',
  'attachments',
  'concession_files',
  'upload_chunks',
  'readings',
  'refused_rows',
];
/** Written by nobody but the sealing trigger and the migrations. */
const readOnly = ['history_seals', 'schema_migrations'];
/** Records whose rows may be taken away; everything else only changes state. */
const removable = [
  'sessions',
  'rate_limits',
  'saved_filters',
  'receiver_parts',
  'lot_receivers',
  'analysis_offsets',
];

/**
 * What the application's role may do. It owns nothing, so it can neither drop a table nor switch a trigger off.
 * Idempotent: revokes everything and grants anew.
 */
export function grantSql(appRole: string): string {
  const role = `"${appRole.replaceAll('"', '""')}"`;
  const list = (tables: string[]) => tables.map((table) => `'${table}'`).join(', ');
  return `
    DO $grants$
    DECLARE name text;
    BEGIN
      IF NOT EXISTS (SELECT FROM pg_roles WHERE rolname = '${appRole.replaceAll("'", "''")}') THEN RETURN; END IF;
      GRANT USAGE ON SCHEMA public TO ${role};
      FOR name IN SELECT tablename FROM pg_tables WHERE schemaname = 'public' AND tableowner = current_user LOOP
        EXECUTE format('REVOKE ALL ON TABLE public.%I FROM ${role}', name);
        EXECUTE format('GRANT SELECT ON TABLE public.%I TO ${role}', name);
        IF name = ANY (ARRAY[${list(readOnly)}]) THEN CONTINUE; END IF;
        EXECUTE format('GRANT INSERT ON TABLE public.%I TO ${role}', name);
        IF name = ANY (ARRAY[${list(appendOnly)}]) THEN CONTINUE; END IF;
        EXECUTE format('GRANT UPDATE ON TABLE public.%I TO ${role}', name);
        IF name = ANY (ARRAY[${list(removable)}]) THEN
          EXECUTE format('GRANT DELETE ON TABLE public.%I TO ${role}', name);
        END IF;
      END LOOP;
      GRANT USAGE ON ALL SEQUENCES IN SCHEMA public TO ${role};
      GRANT USAGE ON SCHEMA jobs TO ${role};
      GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA jobs TO ${role};
      GRANT USAGE ON ALL SEQUENCES IN SCHEMA jobs TO ${role};
      GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA jobs TO ${role};
    END $grants$;
  `;
}
