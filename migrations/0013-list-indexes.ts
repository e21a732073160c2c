import type { Migration } from '../server/migrate.ts'

/**
 * Indexes that answer every list of a large register: each filter of a list together with the order of its rows, so that a page is
 * read in order and no further than it is long. Both extensions belong to PostgreSQL, and the owner of a database may add them.
 */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE EXTENSION IF NOT EXISTS btree_gist;
    CREATE EXTENSION IF NOT EXISTS pg_trgm;

    -- Enclosures that hold given digits: of one audience only, and, where very many do, the narrowest first.
    DROP INDEX register_entries_within;
    CREATE INDEX register_entries_within ON register_entries USING gist (audience, numrange(best_lo, best_hi, '[]')) WHERE best_lo IS NOT NULL;
    CREATE INDEX register_entries_width ON register_entries (audience, (best_hi - best_lo)) WHERE best_lo IS NOT NULL;

    CREATE STATISTICS register_entries_range ON (numrange(best_lo, best_hi, '[]')) FROM register_entries;

    -- What was signed, for those who read nothing else; the work of a group, of a person.
    DROP INDEX claims_state, claims_group_state, claims_author;
    CREATE INDEX claims_entered ON claims (since DESC, id DESC) WHERE signed_at IS NOT NULL;
    CREATE INDEX claims_entered_state ON claims (state, since DESC, id DESC) WHERE signed_at IS NOT NULL;
    CREATE INDEX claims_group ON claims (group_id, since DESC, id DESC);
    CREATE INDEX claims_group_state ON claims (group_id, state, since DESC, id DESC);
    CREATE INDEX claims_author ON claims (author_id, since DESC, id DESC);
    CREATE INDEX claims_author_state ON claims (author_id, state, since DESC, id DESC);
    CREATE INDEX claims_orders ON claims (id) WHERE kind = 'order';

    DROP INDEX runs_group, runs_member;
    CREATE INDEX runs_group ON runs (group_id, created_at DESC, id DESC);
    CREATE INDEX runs_group_state ON runs (group_id, state, created_at DESC, id DESC);
    CREATE INDEX runs_member ON runs (started_by, created_at DESC, id DESC);
    CREATE INDEX runs_member_state ON runs (started_by, state, created_at DESC, id DESC);

    DROP INDEX outbox_group;
    CREATE INDEX outbox_group ON outbox (group_id, created_at DESC, id DESC);
    CREATE INDEX outbox_group_state ON outbox (group_id, state, created_at DESC, id DESC);

    CREATE INDEX audit_entries_act ON audit_entries (group_id, act text_pattern_ops, at DESC, seq DESC);
    CREATE INDEX audit_entries_actor ON audit_entries (group_id, actor_id, at DESC, seq DESC);
    CREATE INDEX audit_entries_kind ON audit_entries (group_id, subject_kind, at DESC, seq DESC);
    CREATE INDEX audit_entries_subject_id ON audit_entries (subject_id, at DESC, seq DESC);
    CREATE INDEX audit_entries_at ON audit_entries (group_id, at DESC, seq DESC);
    CREATE INDEX audit_entries_digest ON audit_entries (digest text_pattern_ops) WHERE digest IS NOT NULL;
    CREATE INDEX audit_entries_words ON audit_entries USING gin (subject_label gin_trgm_ops, actor_name gin_trgm_ops, reason gin_trgm_ops);
  `)
}

export const down: Migration['down'] = async (query) => {
  await query(`
    DROP INDEX audit_entries_act, audit_entries_actor, audit_entries_kind, audit_entries_subject_id, audit_entries_at, audit_entries_digest, audit_entries_words;
    DROP INDEX outbox_group, outbox_group_state;
    CREATE INDEX outbox_group ON outbox (group_id, created_at DESC, id);
    DROP INDEX runs_group, runs_group_state, runs_member, runs_member_state;
    CREATE INDEX runs_group ON runs (group_id, created_at DESC, id);
    CREATE INDEX runs_member ON runs (started_by, created_at DESC, id);
    DROP INDEX claims_entered, claims_entered_state, claims_group, claims_group_state, claims_author, claims_author_state, claims_orders;
    CREATE INDEX claims_state ON claims (state, since DESC, id DESC);
    CREATE INDEX claims_group_state ON claims (group_id, state);
    CREATE INDEX claims_author ON claims (author_id, since DESC, id DESC);
    DROP STATISTICS register_entries_range;
    DROP INDEX register_entries_within, register_entries_width;
    CREATE INDEX register_entries_within ON register_entries USING gist (numrange(best_lo, best_hi, '[]')) WHERE best_lo IS NOT NULL;
    DROP EXTENSION pg_trgm, btree_gist;
  `)
}
