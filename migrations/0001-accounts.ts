import type { Migration } from '../server/migrate.ts'

/** Groups, members and everything by which they sign in. Tokens are kept as SHA-256 only, so that a read of the table opens nothing. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE groups (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      name text NOT NULL UNIQUE CHECK (name <> ''),
      confirmations_needed integer NOT NULL DEFAULT 1 CHECK (confirmations_needed BETWEEN 1 AND 9),
      recheck_needed boolean NOT NULL DEFAULT true,
      reminder_days integer NOT NULL DEFAULT 7 CHECK (reminder_days BETWEEN 1 AND 365),
      public boolean NOT NULL DEFAULT true,
      created_at timestamptz NOT NULL DEFAULT now()
    );

    CREATE TABLE members (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      group_id uuid NOT NULL REFERENCES groups,
      email text NOT NULL CHECK (email = lower(email)),
      name text NOT NULL CHECK (name <> ''),
      password_hash text NOT NULL,
      roles text[] NOT NULL CHECK (roles <@ ARRAY['researcher', 'referee', 'lead']),
      state text NOT NULL DEFAULT 'active' CHECK (state IN ('active', 'left')),
      mail_preferences jsonb NOT NULL DEFAULT '{}',
      mail_bounced_at timestamptz,
      created_at timestamptz NOT NULL DEFAULT now(),
      left_at timestamptz,
      CHECK (state = 'left' OR cardinality(roles) > 0)
    );
    CREATE UNIQUE INDEX members_active_email ON members (email) WHERE state = 'active';
    CREATE INDEX members_group ON members (group_id);

    CREATE TABLE sessions (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      member_id uuid NOT NULL REFERENCES members,
      created_at timestamptz NOT NULL DEFAULT now(),
      last_seen_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      ended_at timestamptz,
      address text NOT NULL,
      user_agent text NOT NULL
    );
    CREATE INDEX sessions_member ON sessions (member_id) WHERE ended_at IS NULL;

    CREATE TABLE invitations (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      group_id uuid NOT NULL REFERENCES groups,
      inviter_id uuid REFERENCES members,
      email text NOT NULL CHECK (email = lower(email)),
      name text NOT NULL,
      roles text[] NOT NULL CHECK (cardinality(roles) > 0 AND roles <@ ARRAY['researcher', 'referee', 'lead']),
      token_hash text NOT NULL UNIQUE,
      created_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      accepted_at timestamptz,
      revoked_at timestamptz,
      member_id uuid REFERENCES members
    );
    CREATE UNIQUE INDEX invitations_open ON invitations (group_id, email) WHERE accepted_at IS NULL AND revoked_at IS NULL;

    CREATE TABLE password_resets (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      member_id uuid NOT NULL REFERENCES members,
      token_hash text NOT NULL UNIQUE,
      created_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      used_at timestamptz
    );
    CREATE INDEX password_resets_member ON password_resets (member_id, created_at);

    CREATE TABLE access_tokens (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      member_id uuid NOT NULL REFERENCES members,
      name text NOT NULL CHECK (name <> ''),
      token_hash text NOT NULL UNIQUE,
      scopes text[] NOT NULL CHECK (cardinality(scopes) > 0 AND scopes <@ ARRAY['read', 'run', 'draft']),
      created_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      last_used_at timestamptz,
      revoked_at timestamptz
    );
    CREATE INDEX access_tokens_member ON access_tokens (member_id);

    -- One row an attempt that failed; key names an account, a network, or the two together.
    CREATE TABLE sign_in_failures (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      key text NOT NULL,
      at timestamptz NOT NULL DEFAULT now()
    );
    CREATE INDEX sign_in_failures_key ON sign_in_failures (key, at);
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP TABLE sign_in_failures, access_tokens, password_resets, invitations, sessions, members, groups')
}
