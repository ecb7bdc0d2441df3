import { type Migration } from './migration';

/** Holds as a conversation with the supplier, and the outbox of outgoing mail. */
export const holdsAndMail: Migration = {
  name: '005-holds-and-mail',
  up: `
    CREATE TABLE holds (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      -- Named after the lot, never counted through: a running number would tell a supplier how many others there are.
      number text NOT NULL UNIQUE,
      lot_id uuid NOT NULL REFERENCES lots,
      supplier_id uuid NOT NULL REFERENCES suppliers,
      disposition_id uuid NOT NULL REFERENCES dispositions,
      analysis_id uuid NOT NULL REFERENCES analyses,
      state text NOT NULL DEFAULT 'open' CHECK (state IN ('open', 'acknowledged', 'answered', 'closed')),
      reason text NOT NULL,
      acknowledgement_due_at timestamptz(3) NOT NULL,
      answer_due_at timestamptz(3) NOT NULL,
      acknowledged_at timestamptz(3),
      answered_at timestamptz(3),
      closed_at timestamptz(3),
      closing_disposition_id uuid REFERENCES dispositions,
      reminders_sent integer NOT NULL DEFAULT 0,
      last_reminder_at timestamptz(3),
      version integer NOT NULL DEFAULT 1,
      opened_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE UNIQUE INDEX holds_one_open ON holds (lot_id) WHERE state <> 'closed';
    CREATE INDEX holds_supplier ON holds (supplier_id, state, opened_at);
    CREATE INDEX holds_opened ON holds (opened_at DESC, id);

    CREATE TABLE hold_messages (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      hold_id uuid NOT NULL REFERENCES holds,
      kind text NOT NULL CHECK (kind IN ('notice', 'acknowledgement', 'answer', 'question', 'reply', 'reminder', 'closing')),
      author_id uuid REFERENCES people,
      side text NOT NULL CHECK (side IN ('house', 'supplier', 'system')),
      text text NOT NULL DEFAULT '',
      containment text NOT NULL DEFAULT '',
      cause text NOT NULL DEFAULT '',
      corrective_action text NOT NULL DEFAULT '',
      created_at timestamptz(3) NOT NULL DEFAULT clock_timestamp()
    );
    CREATE INDEX hold_messages_hold ON hold_messages (hold_id, created_at);

    CREATE TABLE attachments (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      hold_message_id uuid NOT NULL REFERENCES hold_messages,
      file_name text NOT NULL,
      media_type text NOT NULL,
      byte_count integer NOT NULL,
      sha256 text NOT NULL,
      bytes bytea NOT NULL
    );
    CREATE INDEX attachments_message ON attachments (hold_message_id);

    CREATE TABLE mails (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      -- Fixed when the act commits, so that a second delivery of the same mail can be told as such.
      message_id text NOT NULL UNIQUE,
      in_reply_to text,
      kind text NOT NULL,
      urgency text NOT NULL DEFAULT 'at_once' CHECK (urgency IN ('at_once', 'digest')),
      person_id uuid NOT NULL REFERENCES people,
      to_name text NOT NULL,
      to_email text NOT NULL,
      subject text NOT NULL,
      text_body text NOT NULL,
      html_body text NOT NULL,
      -- Pictures that the HTML body shows: [{cid, fileName, mediaType, base64}].
      pictures jsonb NOT NULL DEFAULT '[]',
      why text NOT NULL,
      -- Bodies that carry a single-use link are wiped from view and, once accepted, from the table.
      secret boolean NOT NULL DEFAULT false,
      hold_id uuid REFERENCES holds,
      lot_id uuid REFERENCES lots,
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'accepted', 'refused', 'dead')),
      tries integer NOT NULL DEFAULT 0,
      next_try_at timestamptz(3) DEFAULT now(),
      lease_token uuid,
      lease_until timestamptz(3),
      last_answer text NOT NULL DEFAULT '',
      attempts jsonb NOT NULL DEFAULT '[]',
      digest_mail_id uuid REFERENCES mails,
      accepted_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT now()
    );
    CREATE INDEX mails_due ON mails (next_try_at) WHERE state IN ('queued', 'refused');
    CREATE INDEX mails_created ON mails (created_at DESC, id);
    CREATE INDEX mails_hold ON mails (hold_id);
    ALTER TABLE person_links ADD FOREIGN KEY (mail_id) REFERENCES mails;
  `,
  down: `
    ALTER TABLE person_links DROP CONSTRAINT person_links_mail_id_fkey;
    DROP TABLE mails, attachments, hold_messages, holds;
  `,
};
