import type { Migration } from '../server/migrate.ts'

/** Claims, and the pairs of them that contradict each other. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE claims (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      kind text NOT NULL,
      constant_id uuid NOT NULL REFERENCES constants,
      -- For an order: the greater constant.
      other_constant_id uuid REFERENCES constants,
      -- From the first submission on; never changes and is never given again.
      ordinal integer CHECK (ordinal > 0),
      group_id uuid NOT NULL REFERENCES groups,
      author_id uuid NOT NULL REFERENCES members,
      state text NOT NULL DEFAULT 'draft'
        CHECK (state IN ('draft', 'submitted', 'in-review', 'returned', 'endorsed', 'signed', 'superseded', 'suspended', 'withdrawn')),
      -- Grows with every change of content or state: what a person decides on what they read is checked against it.
      version integer NOT NULL DEFAULT 1,
      lo numeric,
      hi numeric,
      digits_truncated integer,
      digits_rounded integer,
      run_id uuid REFERENCES runs,
      -- What the kind of claim knows beside the columns: printed digits, the enclosures that an order rests on.
      basis jsonb NOT NULL DEFAULT '{}',
      source text,
      remark text NOT NULL DEFAULT '',
      -- The file to download, to the letter, and its digest.
      certificate text NOT NULL,
      certificate_digest text NOT NULL CHECK (certificate_digest ~ '^[0-9a-f]{64}$'),
      -- SHA-256 of what is asserted: verdicts and the signature are about this.
      digest text NOT NULL CHECK (digest ~ '^[0-9a-f]{64}$'),
      -- Whether a run of this installation meets the enclosure.
      repeated_here boolean NOT NULL,
      superseded_by uuid REFERENCES claims,
      signed_by uuid REFERENCES members,
      signed_at timestamptz,
      created_at timestamptz NOT NULL DEFAULT now(),
      submitted_at timestamptz,
      -- Since when it is in its state.
      since timestamptz NOT NULL DEFAULT now(),
      UNIQUE (constant_id, ordinal),
      CHECK ((state = 'draft') = (ordinal IS NULL)),
      CHECK ((lo IS NULL) = (hi IS NULL)),
      CHECK (lo <= hi),
      CHECK (state NOT IN ('signed', 'superseded', 'suspended') OR signed_at IS NOT NULL),
      CHECK ((signed_at IS NULL) = (signed_by IS NULL)),
      CHECK (state <> 'superseded' OR superseded_by IS NOT NULL)
    );
    CREATE INDEX claims_since ON claims (since DESC, id DESC);
    CREATE INDEX claims_state ON claims (state, since DESC, id DESC);
    CREATE INDEX claims_group_state ON claims (group_id, state);
    CREATE INDEX claims_author ON claims (author_id, since DESC, id DESC);
    CREATE INDEX claims_other_constant ON claims (other_constant_id) WHERE other_constant_id IS NOT NULL;
    CREATE INDEX claims_run ON claims (run_id) WHERE run_id IS NOT NULL;
    CREATE INDEX claims_superseded_by ON claims (superseded_by) WHERE superseded_by IS NOT NULL;

    -- A recheck is a run for a claim; a claim with rechecks is never deleted, since only a draft is.
    ALTER TABLE runs ADD FOREIGN KEY (claim_id) REFERENCES claims;

    CREATE TABLE conflicts (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      -- The one that was found not to meet the register, and the signed one that it does not meet.
      claim_id uuid NOT NULL REFERENCES claims,
      signed_claim_id uuid NOT NULL REFERENCES claims,
      opened_at timestamptz NOT NULL DEFAULT now(),
      closed_at timestamptz,
      CHECK (claim_id <> signed_claim_id)
    );
    CREATE UNIQUE INDEX conflicts_open ON conflicts (least(claim_id, signed_claim_id), greatest(claim_id, signed_claim_id)) WHERE closed_at IS NULL;
    CREATE INDEX conflicts_claim ON conflicts (claim_id);
    CREATE INDEX conflicts_signed ON conflicts (signed_claim_id);
  `)
}

export const down: Migration['down'] = async (query) => {
  await query(`
    DROP TABLE conflicts;
    ALTER TABLE runs DROP CONSTRAINT runs_claim_id_fkey;
    DROP TABLE claims;
  `)
}
