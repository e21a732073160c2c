import type { Migration } from '../server/migrate.ts'

/** Files in support of a claim. They come in compressed forms already, so that PostgreSQL need not try. */
export const up: Migration['up'] = async (query) => {
  await query(`
    CREATE TABLE evidence (
      id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
      claim_id uuid NOT NULL REFERENCES claims ON DELETE CASCADE,
      name text NOT NULL CHECK (name <> ''),
      media_type text NOT NULL,
      bytes integer NOT NULL CHECK (bytes > 0),
      digest text NOT NULL CHECK (digest ~ '^[0-9a-f]{64}$'),
      content bytea NOT NULL,
      uploaded_by uuid NOT NULL REFERENCES members,
      uploaded_at timestamptz NOT NULL DEFAULT now(),
      UNIQUE (claim_id, digest)
    );
    ALTER TABLE evidence ALTER COLUMN content SET STORAGE EXTERNAL;
  `)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP TABLE evidence')
}
