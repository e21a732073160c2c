import { env } from './env.ts'
import { migrate } from './migrate.ts'

/**
 * Applies the migrations with the owner's rights and gives the application's role its own. `separateRoles` is false where both are
 * one: then only the trigger guards the audit trail.
 */
export async function bringUpToDate(): Promise<{ applied: string[]; separateRoles: boolean }> {
  const ownerUrl = env.DATABASE_OWNER_URL ?? env.DATABASE_URL
  const [owner, application] = [ownerUrl, env.DATABASE_URL].map((url) => decodeURIComponent(new URL(url).username))
  const separateRoles = owner !== application
  return { applied: await migrate(ownerUrl, separateRoles ? application : undefined), separateRoles }
}
