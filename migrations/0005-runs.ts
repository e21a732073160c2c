import type { Migration } from '../server/migrate.ts'

/**
 * Computations. `attempt` counts who took the run up and fences: what a worker writes counts only while the run is in its attempt.
 * `state`, `attempt` and `lease_until` together are the right to compute.
 */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE runs (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      constant_id uuid NOT NULL REFERENCES constants,
      group_id uuid NOT NULL REFERENCES groups,
      started_by uuid NOT NULL REFERENCES members,
      purpose text NOT NULL DEFAULT 'run' CHECK (purpose IN ('run', 'recheck')),
      -- The claim that a recheck belongs to.
      claim_id uuid,
      method text NOT NULL,
      arithmetic text NOT NULL,
      -- The request as the engine takes it; text, so that it is repeated to the letter.
      request text NOT NULL,
      -- The same for the same person asking for the same thing: a double click finds the run that it has just started.
      request_key text NOT NULL,
      goal jsonb NOT NULL,
      parameters text,
      -- Digest of the engine's sources that the stored shards come from.
      engine_digest text,
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'running', 'done', 'failed', 'stopped')),
      attempt integer NOT NULL DEFAULT 0,
      -- Attempts in a row that ended with a dead worker before another shard was stored.
      losses integer NOT NULL DEFAULT 0,
      lease_until timestamptz,
      progress numeric(7, 6) NOT NULL DEFAULT 0 CHECK (progress BETWEEN 0 AND 1),
      shards_done integer NOT NULL DEFAULT 0,
      shards_total integer,
      interim_lo text,
      interim_hi text,
      cpu_ms bigint NOT NULL DEFAULT 0,
      seconds_left numeric,
      forecast_seconds numeric,
      outcome jsonb,
      certificate text,
      certificate_digest text,
      -- Ids of the published estimates that the enclosure rests on.
      estimates text[] NOT NULL DEFAULT '{}',
      failure text,
      created_at timestamptz NOT NULL DEFAULT now(),
      started_at timestamptz,
      finished_at timestamptz,
      CHECK ((purpose = 'recheck') = (claim_id IS NOT NULL)),
      CHECK ((state = 'done') = (certificate IS NOT NULL AND outcome IS NOT NULL)),
      CHECK ((state IN ('done', 'failed', 'stopped')) = (finished_at IS NOT NULL)),
      CHECK ((state = 'running') = (lease_until IS NOT NULL))
    );
    CREATE INDEX runs_group ON runs (group_id, created_at DESC, id);
    CREATE INDEX runs_member ON runs (started_by, created_at DESC, id);
    CREATE INDEX runs_constant ON runs (constant_id, created_at DESC, id);
    CREATE INDEX runs_claim ON runs (claim_id) WHERE claim_id IS NOT NULL;
    CREATE INDEX runs_open ON runs (state, lease_until) WHERE state IN ('queued', 'running');
    CREATE INDEX runs_estimates ON runs USING gin (estimates) WHERE state = 'done';

    CREATE TABLE run_shards (
      run_id uuid NOT NULL REFERENCES runs ON DELETE CASCADE,
      index integer NOT NULL CHECK (index >= 0),
      -- JSON text as the engine gave it.
      result text NOT NULL,
      cpu_ms bigint NOT NULL,
      attempt integer NOT NULL,
      finished_at timestamptz NOT NULL DEFAULT now(),
      PRIMARY KEY (run_id, index)
    );

    -- Speed of this installation's machines as measured by the engine's own calibration, newest row in force.
    CREATE TABLE calibrations (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      engine_digest text NOT NULL,
      speed numeric NOT NULL CHECK (speed > 0),
      cores integer NOT NULL,
      measured_at timestamptz NOT NULL DEFAULT now()
    );

    -- Every process that follows a run hears of its changes, whoever makes them.
    CREATE FUNCTION tell_run_change() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      PERFORM pg_notify('run_change', NEW.id::text);
      RETURN NULL;
    END $$;
    CREATE TRIGGER runs_tell_change AFTER UPDATE ON runs FOR EACH ROW
      WHEN (OLD.state IS DISTINCT FROM NEW.state OR OLD.progress IS DISTINCT FROM NEW.progress OR OLD.shards_done IS DISTINCT FROM NEW.shards_done)
      EXECUTE FUNCTION tell_run_change();
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP TABLE calibrations, run_shards, runs; DROP FUNCTION tell_run_change')
}
