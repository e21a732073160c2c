import type { Migration } from '../server/migrate.ts'

/**
 * Which claims in force rest on which published estimates: one row an estimate for each signed claim whose run used it, kept by
 * the database itself with every change of a claim, so that an estimate's page counts and lists them without opening certificates.
 */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE estimate_uses (
      estimate text NOT NULL,
      claim_id uuid NOT NULL REFERENCES claims ON DELETE CASCADE,
      group_id uuid NOT NULL REFERENCES groups,
      used_at text NOT NULL,
      signed_at timestamptz NOT NULL,
      PRIMARY KEY (claim_id, estimate)
    );
    CREATE INDEX estimate_uses_newest ON estimate_uses (estimate, signed_at DESC, claim_id);
    CREATE INDEX estimate_uses_group ON estimate_uses (group_id, estimate);

    CREATE FUNCTION keep_estimate_uses() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      DELETE FROM estimate_uses WHERE claim_id = NEW.id;
      IF NEW.state = 'signed' AND NEW.run_id IS NOT NULL THEN
        INSERT INTO estimate_uses (estimate, claim_id, group_id, used_at, signed_at)
        SELECT used->>'id', NEW.id, NEW.group_id, string_agg(used->>'usedAt', '; '), NEW.signed_at
        FROM runs r CROSS JOIN LATERAL jsonb_array_elements(r.outcome->'estimates') AS used WHERE r.id = NEW.run_id AND r.state = 'done' GROUP BY used->>'id';
      END IF;
      RETURN NULL;
    END $$;
    CREATE TRIGGER claims_keep_estimate_uses AFTER INSERT OR UPDATE OF state, run_id, signed_at ON claims FOR EACH ROW EXECUTE FUNCTION keep_estimate_uses();
    -- Every signed claim tells of itself once more.
    UPDATE claims SET state = state WHERE state = 'signed' AND run_id IS NOT NULL;

    DROP INDEX runs_estimates;
  `)
}

export const down: Migration['down'] = async (query) => {
  await query(`
    CREATE INDEX runs_estimates ON runs USING gin (estimates) WHERE state = 'done';
    DROP TRIGGER claims_keep_estimate_uses ON claims;
    DROP FUNCTION keep_estimate_uses;
    DROP TABLE estimate_uses;
  `)
}
