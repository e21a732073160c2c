import type { Migration } from '../server/migrate.ts'

/** Mails to be sent. A worker holds a row by `lease_until` while it sends; `lease_token` tells its answer from that of a worker that was too slow. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE outbox (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      group_id uuid REFERENCES groups,
      member_id uuid REFERENCES members,
      recipient_name text NOT NULL,
      recipient_email text NOT NULL,
      template text NOT NULL,
      subject text NOT NULL,
      text text,
      html text,
      dedupe_key text UNIQUE,
      state text NOT NULL DEFAULT 'waiting' CHECK (state IN ('waiting', 'sending', 'sent', 'bounced', 'failed')),
      attempts integer NOT NULL DEFAULT 0,
      next_attempt_at timestamptz NOT NULL DEFAULT now(),
      lease_token uuid,
      lease_until timestamptz,
      last_error text,
      created_at timestamptz NOT NULL DEFAULT now(),
      sent_at timestamptz,
      resent_from uuid REFERENCES outbox
    );
    CREATE INDEX outbox_due ON outbox (next_attempt_at) WHERE state IN ('waiting', 'sending');
    CREATE INDEX outbox_group ON outbox (group_id, created_at DESC, id);
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP TABLE outbox')
}
