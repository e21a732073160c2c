import type { Migration } from '../server/migrate.ts'

/** How many entries each audience sees, kept by the database with every entry, so that a page of the whole register counts nothing. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE register_counts (
      audience uuid PRIMARY KEY,
      entries integer NOT NULL
    );
    INSERT INTO register_counts SELECT audience, count(*) FROM register_entries GROUP BY audience;

    CREATE FUNCTION keep_register_counts() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      -- In one order, so that two who state constants at once do not wait for each other in a circle.
      INSERT INTO register_counts SELECT audience, CASE TG_OP WHEN 'INSERT' THEN count(*) ELSE -count(*) END FROM changed GROUP BY audience ORDER BY audience
      ON CONFLICT (audience) DO UPDATE SET entries = register_counts.entries + excluded.entries;
      RETURN NULL;
    END $$;
    CREATE TRIGGER register_entries_count_more AFTER INSERT ON register_entries REFERENCING NEW TABLE AS changed FOR EACH STATEMENT EXECUTE FUNCTION keep_register_counts();
    CREATE TRIGGER register_entries_count_less AFTER DELETE ON register_entries REFERENCING OLD TABLE AS changed FOR EACH STATEMENT EXECUTE FUNCTION keep_register_counts();
  `)
}

export const down: Migration['down'] = async (query) => {
  await query(`
    DROP TRIGGER register_entries_count_less ON register_entries;
    DROP TRIGGER register_entries_count_more ON register_entries;
    DROP FUNCTION keep_register_counts;
    DROP TABLE register_counts;
  `)
}
