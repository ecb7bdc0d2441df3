import { type Migration } from './migration';

/** What a hold rests on, kept with the hold; and how often a mail was handed over without an answer. */
export const holdRecords: Migration = {
  name: '020-hold-records',
  up: `
    ALTER TABLE holds
      ADD COLUMN finding jsonb NOT NULL DEFAULT '[]',
      ADD COLUMN band_strip jsonb;
    CREATE INDEX holds_waiting ON holds (opened_at) WHERE state IN ('open', 'acknowledged');
    -- Each such try may have delivered the mail: they are bounded more tightly than refusals are.
    ALTER TABLE mails ADD COLUMN uncertain_tries integer NOT NULL DEFAULT 0;
    CREATE INDEX mails_digest ON mails (person_id) WHERE urgency = 'digest' AND digest_mail_id IS NULL;
    CREATE INDEX mails_lease ON mails (lease_until) WHERE lease_until IS NOT NULL;
    CREATE INDEX mails_digest_parts ON mails (digest_mail_id) WHERE digest_mail_id IS NOT NULL;
  `,
  down: `
    DROP INDEX mails_digest_parts, mails_lease, mails_digest, holds_waiting;
    ALTER TABLE mails DROP COLUMN uncertain_tries;
    ALTER TABLE holds DROP COLUMN band_strip, DROP COLUMN finding;
  `,
};
