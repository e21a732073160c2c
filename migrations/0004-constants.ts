import type { Migration } from '../server/migrate.ts'

/**
 * Constants and what each audience sees of them in the register. An audience is a group or, with the nil UUID, readers without
 * account; a group that does not publish keeps its claims to itself, so that one constant can look different to two readers.
 */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE constants (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      number integer NOT NULL UNIQUE CHECK (number > 0),
      definition jsonb NOT NULL,
      definition_key text NOT NULL UNIQUE CHECK (definition_key ~ '^[0-9a-f]{64}$'),
      set_kind text NOT NULL,
      k integer,
      exclude text NOT NULL,
      power text,
      log_power text,
      latex text NOT NULL,
      text text NOT NULL,
      aliases text[] NOT NULL DEFAULT '{}',
      -- Words by which it is found, folded as the search folds what is typed.
      words text NOT NULL,
      search tsvector GENERATED ALWAYS AS (to_tsvector('simple', words)) STORED,
      group_id uuid NOT NULL REFERENCES groups,
      stated_by uuid NOT NULL REFERENCES members,
      stated_at timestamptz NOT NULL DEFAULT now(),
      -- Intersection of all signed enclosures, whoever may see them; null while there is none or it is empty.
      best_lo numeric,
      best_hi numeric,
      best_digits integer,
      CHECK (best_lo <= best_hi)
    );
    CREATE INDEX constants_search ON constants USING gin (search);

    CREATE TABLE register_entries (
      constant_id uuid NOT NULL REFERENCES constants,
      audience uuid NOT NULL,
      -- What the register filters by, copied from the constant, where it never changes: one index serves a filter and a sorting.
      number integer NOT NULL,
      set_kind text NOT NULL,
      k integer,
      exclude text NOT NULL,
      power text,
      log_power text,
      -- Group that is named with it: the one whose signed claim is newest to this audience, else the one that stated it.
      group_id uuid NOT NULL REFERENCES groups,
      -- Of the claims that this audience may see the one that is furthest on its way; entered_state: of those that were signed.
      state text NOT NULL DEFAULT 'stated',
      entered_state text NOT NULL DEFAULT 'stated',
      in_conflict boolean NOT NULL DEFAULT false,
      best_lo numeric,
      best_hi numeric,
      digits_truncated integer,
      digits_rounded integer,
      changed_at timestamptz NOT NULL DEFAULT now(),
      PRIMARY KEY (constant_id, audience),
      CHECK (best_lo <= best_hi)
    );
    CREATE UNIQUE INDEX register_entries_number ON register_entries (audience, number);
    CREATE INDEX register_entries_set ON register_entries (audience, set_kind, k, number);
    CREATE INDEX register_entries_k ON register_entries (audience, coalesce(k, 0), number);
    CREATE INDEX register_entries_weight ON register_entries (audience, power, log_power, number);
    CREATE INDEX register_entries_exclude ON register_entries (audience, exclude, number);
    CREATE INDEX register_entries_state ON register_entries (audience, state, number);
    CREATE INDEX register_entries_entered ON register_entries (audience, entered_state, number);
    CREATE INDEX register_entries_group ON register_entries (audience, group_id, number);
    CREATE INDEX register_entries_digits ON register_entries (audience, coalesce(digits_truncated, -1), number);
    CREATE INDEX register_entries_changed ON register_entries (audience, changed_at, number);
    CREATE INDEX register_entries_value ON register_entries (audience, coalesce(best_lo, 'Infinity'), number);
    CREATE INDEX register_entries_value_down ON register_entries (audience, coalesce(best_lo, '-Infinity'), number);
    CREATE INDEX register_entries_below ON register_entries (audience, best_lo);
    CREATE INDEX register_entries_within ON register_entries USING gist (numrange(best_lo, best_hi, '[]')) WHERE best_lo IS NOT NULL;

    -- A new group sees at once what is public, and every constant that is stated.
    CREATE FUNCTION open_register() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      INSERT INTO register_entries (constant_id, audience, number, set_kind, k, exclude, power, log_power, group_id, state, entered_state, in_conflict,
                                    best_lo, best_hi, digits_truncated, digits_rounded, changed_at)
      SELECT c.id, NEW.id, c.number, c.set_kind, c.k, c.exclude, c.power, c.log_power, coalesce(p.group_id, c.group_id), coalesce(p.state, 'stated'), coalesce(p.entered_state, 'stated'), coalesce(p.in_conflict, false),
             p.best_lo, p.best_hi, p.digits_truncated, p.digits_rounded, coalesce(p.changed_at, c.stated_at)
      FROM constants c LEFT JOIN register_entries p ON p.constant_id = c.id AND p.audience = '00000000-0000-0000-0000-000000000000';
      RETURN NEW;
    END $$;
    CREATE TRIGGER groups_open_register AFTER INSERT ON groups FOR EACH ROW EXECUTE FUNCTION open_register();
  `)
}

export const down: Migration['down'] = async (query) => {
  await query(`
    DROP TRIGGER groups_open_register ON groups;
    DROP FUNCTION open_register;
    DROP TABLE register_entries, constants;
  `)
}
