import type { Transaction } from 'sequelize'
import { digitsOf, intersection } from '../../shared/intersection.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { change, select } from '../db.ts'
import { PUBLIC } from '../queries/audience.ts'

/** States from the beginning of a claim's way to its end at the register; the furthest one stands for the constant. */
const WAY: readonly (ClaimState | 'stated')[] = ['stated', 'withdrawn', 'draft', 'returned', 'submitted', 'in-review', 'endorsed', 'superseded', 'suspended', 'signed']

/** What of a claim decides how the register shows its constant. */
export interface ClaimStanding {
  group_id: string
  public: boolean
  state: ClaimState
  lo: string | null
  hi: string | null
  signed: boolean
  since: Date
  in_conflict: boolean
}

/** The intersection of the signed enclosures among these claims, with its digits. */
export function bestOf(claims: readonly ClaimStanding[]) {
  const enclosures = claims.flatMap(({ signed, state, lo, hi }) => (signed && state === 'signed' && lo !== null && hi !== null ? [{ lo, hi }] : []))
  const best = intersection(enclosures)
  return best ? { ...best, ...digitsOf(best) } : { lo: null, hi: null, truncated: null, rounded: null }
}

const furthest = (claims: readonly ClaimStanding[]): ClaimState | 'stated' =>
  claims.reduce<ClaimState | 'stated'>((state, claim) => (WAY.indexOf(claim.state) > WAY.indexOf(state) ? claim.state : state), 'stated')

type Entry = ReturnType<typeof entryOf>

/** What one audience sees of a constant, from the claims that are open to it. */
function entryOf(claims: readonly ClaimStanding[]) {
  const entered = claims.filter((claim) => claim.signed)
  const newest = entered.reduce<ClaimStanding | null>((latest, claim) => (latest === null || claim.since > latest.since ? claim : latest), null)
  return {
    groupId: newest?.group_id ?? null,
    state: furthest(claims),
    enteredState: furthest(entered),
    inConflict: claims.some((claim) => claim.in_conflict),
    ...bestOf(claims),
  }
}

/** What everybody sees of a constant: audiences with the entry that they share; `null` where a constant is not open to readers without account. */
export function entriesOf(claims: readonly ClaimStanding[], groups: readonly string[]): { audiences: string[]; entry: Entry | null }[] {
  const published = claims.filter((claim) => claim.public && claim.signed)
  const shared = entryOf(published)
  // Groups without a claim of their own here all see the same.
  const own = new Set(claims.map((claim) => claim.group_id))
  return [
    { audiences: [PUBLIC], entry: published.length > 0 ? shared : null },
    { audiences: groups.filter((id) => !own.has(id)), entry: shared },
    ...[...own].map((id) => ({ audiences: [id], entry: entryOf(claims.filter((claim) => claim.group_id === id || (claim.public && claim.signed))) })),
  ]
}

/**
 * Works out anew what every audience sees of a constant: the intersection of the signed enclosures open to it, the state of the
 * claim that is furthest, whether claims contradict each other. To be called, in the same transaction, after every change of a
 * claim's state, enclosure or conflicts.
 */
export async function refreshBest(transaction: Transaction, constantId: string): Promise<void> {
  // Two who change claims of one constant at once come one after the other here, and the second sees what the first has done.
  await select('SELECT id FROM constants WHERE id = $id FOR UPDATE', { id: constantId }, transaction)
  const claims = await select<ClaimStanding>(
    `SELECT c.group_id, g.public, c.state, c.lo, c.hi, c.signed_at IS NOT NULL AS signed, c.since,
            EXISTS (SELECT 1 FROM conflicts x WHERE (x.claim_id = c.id OR x.signed_claim_id = c.id) AND x.closed_at IS NULL) AS in_conflict
     FROM claims c JOIN groups g ON g.id = c.group_id WHERE c.constant_id = $id AND c.other_constant_id IS NULL`,
    { id: constantId },
    transaction,
  )
  const best = bestOf(claims)
  await change(
    'UPDATE constants SET best_lo = $lo, best_hi = $hi, best_digits = $truncated WHERE id = $id',
    { id: constantId, lo: best.lo, hi: best.hi, truncated: best.truncated },
    transaction,
  )
  const groups = await select<{ id: string }>('SELECT id FROM groups', {}, transaction)
  for (const { audiences, entry } of entriesOf(claims, groups.map(({ id }) => id))) {
    if (entry) await writeEntry(transaction, constantId, audiences, entry)
    else await change('DELETE FROM register_entries WHERE constant_id = $id AND audience = ANY($audiences::uuid[])', { id: constantId, audiences }, transaction)
  }
}

/** Writes what audiences see; the time of change moves only where something did change. */
async function writeEntry(transaction: Transaction, constantId: string, audiences: string[], entry: Entry): Promise<void> {
  if (audiences.length === 0) return
  await change(
    `INSERT INTO register_entries AS e (constant_id, audience, number, set_kind, k, exclude, power, log_power, group_id, state, entered_state, in_conflict, best_lo, best_hi, digits_truncated, digits_rounded)
     SELECT c.id, a.id, c.number, c.set_kind, c.k, c.exclude, c.power, c.log_power, coalesce($groupId::uuid, c.group_id), $state, $enteredState, $inConflict, $lo::numeric, $hi::numeric, $truncated::int, $rounded::int
     FROM constants c, unnest($audiences::uuid[]) AS a(id) WHERE c.id = $constantId
     ON CONFLICT (constant_id, audience) DO UPDATE
     SET group_id = excluded.group_id, state = excluded.state, entered_state = excluded.entered_state, in_conflict = excluded.in_conflict, best_lo = excluded.best_lo,
         best_hi = excluded.best_hi, digits_truncated = excluded.digits_truncated, digits_rounded = excluded.digits_rounded, changed_at = now()
     WHERE (e.group_id, e.state, e.entered_state, e.in_conflict, e.best_lo, e.best_hi) IS DISTINCT FROM
           (excluded.group_id, excluded.state, excluded.entered_state, excluded.in_conflict, excluded.best_lo, excluded.best_hi)`,
    { constantId, audiences, ...entry },
    transaction,
  )
}

/** After a group has begun or ceased to publish: works out anew every constant that it has signed claims for. */
export async function refreshGroup(transaction: Transaction, groupId: string): Promise<void> {
  const touched = await select<{ constant_id: string }>(
    'SELECT DISTINCT constant_id FROM claims WHERE group_id = $groupId AND signed_at IS NOT NULL ORDER BY constant_id',
    { groupId },
    transaction,
  )
  for (const { constant_id: id } of touched) await refreshBest(transaction, id)
}
