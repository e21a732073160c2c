import type { Migration } from '../server/migrate.ts'

/** Doubts of groups about published estimates, the claims that they suspended, and what every claim rests on. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE estimate_doubts (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      -- Id in the engine's library.
      estimate text NOT NULL,
      group_id uuid NOT NULL REFERENCES groups,
      marked_by uuid NOT NULL REFERENCES members,
      marked_at timestamptz NOT NULL DEFAULT now(),
      reason text NOT NULL CHECK (reason <> ''),
      lifted_by uuid REFERENCES members,
      lifted_at timestamptz,
      lift_reason text CHECK (lift_reason <> ''),
      CHECK ((lifted_at IS NULL) = (lifted_by IS NULL)),
      CHECK ((lifted_at IS NULL) = (lift_reason IS NULL))
    );
    CREATE UNIQUE INDEX estimate_doubts_open ON estimate_doubts (group_id, estimate) WHERE lifted_at IS NULL;
    CREATE INDEX estimate_doubts_estimate ON estimate_doubts (estimate, marked_at);

    -- Claims that a doubt suspended. It is still that suspension while the claim is suspended since the same instant.
    CREATE TABLE estimate_doubt_claims (
      doubt_id uuid NOT NULL REFERENCES estimate_doubts,
      claim_id uuid NOT NULL REFERENCES claims,
      since timestamptz NOT NULL,
      PRIMARY KEY (doubt_id, claim_id)
    );
    CREATE INDEX estimate_doubt_claims_claim ON estimate_doubt_claims (claim_id);

    -- Estimates that a claim rests on by its own run, or, an order, by the runs of the enclosures it compares ("through").
    CREATE VIEW claim_estimates AS
      SELECT c.id AS claim_id, used.estimate, NULL::uuid AS through
      FROM claims c JOIN runs r ON r.id = c.run_id CROSS JOIN LATERAL unnest(r.estimates) AS used (estimate)
      UNION ALL
      SELECT c.id, used.estimate, b.id
      FROM claims c
      CROSS JOIN LATERAL jsonb_array_elements((c.basis->'lesser'->'claims') || (c.basis->'greater'->'claims')) AS side (claim)
      JOIN claims b ON b.id = (side.claim->>'id')::uuid JOIN runs r ON r.id = b.run_id CROSS JOIN LATERAL unnest(r.estimates) AS used (estimate)
      WHERE c.kind = 'order';
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP VIEW claim_estimates; DROP TABLE estimate_doubt_claims, estimate_doubts')
}
