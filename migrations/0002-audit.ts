import type { Migration } from '../server/migrate.ts'

/** The audit trail. The trigger refuses every change whoever asks; the application's role lacks the right besides (server/migrate.ts). */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE audit_entries (
      seq bigint PRIMARY KEY,
      at timestamptz(3) NOT NULL,
      group_id uuid,
      actor_id uuid,
      actor_name text NOT NULL,
      act text NOT NULL,
      subject_kind text NOT NULL,
      subject_id text NOT NULL,
      subject_label text NOT NULL,
      reason text,
      digest text,
      detail jsonb NOT NULL,
      previous_hash text NOT NULL CHECK (previous_hash ~ '^[0-9a-f]{64}$'),
      hash text NOT NULL UNIQUE CHECK (hash ~ '^[0-9a-f]{64}$')
    );
    CREATE INDEX audit_entries_group ON audit_entries (group_id, seq DESC);
    CREATE INDEX audit_entries_subject ON audit_entries (subject_kind, subject_id, seq);

    CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      RAISE EXCEPTION 'the audit trail is append-only: % refused', TG_OP USING ERRCODE = 'insufficient_privilege';
    END $$;
    CREATE TRIGGER audit_entries_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_entries
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP TABLE audit_entries; DROP FUNCTION refuse_change')
}
