import type { Migration } from '../server/migrate.ts'

/** The work of referees: who is asked, what they say, what they object to and what is answered. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE assignments (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      claim_id uuid NOT NULL REFERENCES claims,
      referee_id uuid NOT NULL REFERENCES members,
      asked_by uuid NOT NULL REFERENCES members,
      note text NOT NULL DEFAULT '',
      state text NOT NULL DEFAULT 'asked' CHECK (state IN ('asked', 'accepted', 'declined')),
      decline_reason text,
      verdict text CHECK (verdict IN ('confirmed', 'objected')),
      -- The claim's digest when the verdict was given: the verdict counts while the two are the same.
      verdict_digest text CHECK (verdict_digest ~ '^[0-9a-f]{64}$'),
      remark text,
      checklist jsonb NOT NULL DEFAULT '[]',
      -- Private: the verdict while it is being written.
      draft text,
      asked_at timestamptz NOT NULL DEFAULT now(),
      answered_at timestamptz,
      verdict_at timestamptz,
      reminded_at timestamptz,
      CHECK ((state = 'declined') = (decline_reason IS NOT NULL)),
      CHECK ((state = 'asked') = (answered_at IS NULL)),
      CHECK ((verdict IS NULL) = (verdict_at IS NULL)),
      CHECK ((verdict IS NULL) = (verdict_digest IS NULL))
    );
    CREATE UNIQUE INDEX assignments_active ON assignments (claim_id, referee_id) WHERE state <> 'declined';
    CREATE INDEX assignments_claim ON assignments (claim_id, asked_at);
    CREATE INDEX assignments_referee ON assignments (referee_id, claim_id);

    CREATE TABLE objections (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      claim_id uuid NOT NULL REFERENCES claims,
      assignment_id uuid NOT NULL REFERENCES assignments,
      state text NOT NULL DEFAULT 'open' CHECK (state IN ('open', 'answered', 'settled', 'upheld')),
      raised_at timestamptz NOT NULL DEFAULT now(),
      -- Since when it is in its state.
      since timestamptz NOT NULL DEFAULT now()
    );
    CREATE INDEX objections_claim ON objections (claim_id, raised_at);
    CREATE INDEX objections_assignment ON objections (assignment_id);

    CREATE TABLE objection_messages (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      objection_id uuid NOT NULL REFERENCES objections,
      author_id uuid NOT NULL REFERENCES members,
      text text NOT NULL CHECK (text <> ''),
      at timestamptz NOT NULL DEFAULT now()
    );
    CREATE INDEX objection_messages_objection ON objection_messages (objection_id, at);
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP TABLE objection_messages, objections, assignments')
}
