import { leadsTo, type LifeAct } from '../../shared/claim-life.ts'
import { hasRight, type Role } from '../../shared/permissions.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { select } from '../db.ts'
import { checkAudit } from '../queries/audit.ts'

interface Entry {
  seq: string
  claim_id: string
  actor_id: string | null
  act: string
  digest: string
  from: ClaimState | null
  to: ClaimState | null
  told: string[] | null
}

interface ClaimFacts {
  id: string
  state: ClaimState
  kind: string
  author_id: string
  group_id: string
  confirmations_needed: number
  recheck_needed: boolean
}

const AUTHORS = new Set(['create', 'edit', 'delete', 'attach', 'detach', 'submit', 'answer', 'resubmit'])
const LEADS = new Set(['assign', 'remind', 'return', 'sign', 'suspend', 'reinstate', 'withdraw'])
const REFEREES = new Set(['accept', 'decline', 'recheck', 'object', 'uphold', 'confirm'])
/** Entries that tell of a claim without moving it. */
const STILL = new Set(['conflict', 'conflict-closed'])

/**
 * Looks at what a storm has left behind and answers what must not be: moves that the table of a claim's life does not know, acts by
 * those who may not, endorsements without ground, states and conflicts that do not follow from the enclosures, a broken audit
 * chain, mails that are missing or double.
 */
export async function findFaults(): Promise<string[]> {
  const entries = await select<Entry>(
    `SELECT seq, subject_id AS claim_id, actor_id, substr(act, 7) AS act, digest, detail->>'from' AS from, detail->>'to' AS to,
       CASE WHEN detail ? 'told' THEN ARRAY(SELECT jsonb_array_elements_text(detail->'told')) END AS told
     FROM audit_entries WHERE subject_kind = 'claim' AND act LIKE 'claim.%' ORDER BY seq`,
  )
  const chain = await checkAudit()
  return [
    ...(chain.broken ? [`the audit trail is broken at entry ${chain.broken.seq}: ${chain.broken.reason}`] : []),
    ...(await faultsOfLives(entries)),
    ...(await faultsOfMails(entries)),
    ...(await faultsOfRegister()),
  ]
}

async function faultsOfLives(entries: readonly Entry[]): Promise<string[]> {
  const claims = new Map((await select<ClaimFacts>('SELECT c.id, c.state, c.kind, c.author_id, c.group_id, g.confirmations_needed, g.recheck_needed FROM claims c JOIN groups g ON g.id = c.group_id')).map((claim) => [claim.id, claim]))
  const people = new Map((await select<{ id: string; group_id: string; roles: Role[] }>('SELECT id, group_id, roles FROM members')).map((member) => [member.id, member]))
  const referees = new Set((await select<{ key: string }>(`SELECT claim_id || ' ' || referee_id AS key FROM assignments`)).map(({ key }) => key))
  const faults: string[] = []
  const lives = new Map<string, Entry[]>()
  for (const entry of entries) lives.set(entry.claim_id, [...(lives.get(entry.claim_id) ?? []), entry])

  for (const [id, life] of lives) {
    const claim = claims.get(id)
    let state: ClaimState | null = null
    for (const [index, entry] of life.entries()) {
      const complain = (what: string) => faults.push(`entry ${entry.seq}, ${entry.act} of claim ${id}: ${what}`)
      if (entry.from !== state) complain(`it begins in ${entry.from}, but the claim was ${state}`)
      const expected: ClaimState | null | undefined = entry.act === 'create' ? 'draft' : entry.act === 'delete' ? null : STILL.has(entry.act) ? entry.from : entry.from && leadsTo(entry.act as LifeAct, entry.from)
      if (entry.to !== expected || (entry.act === 'delete' && entry.from !== 'draft')) complain(`from ${entry.from} to ${entry.to} is no move of a claim's life`)
      if (claim) {
        const member = entry.actor_id === null ? undefined : people.get(entry.actor_id)
        const own = entry.actor_id === claim.author_id
        const referee = referees.has(`${id} ${entry.actor_id}`)
        if (AUTHORS.has(entry.act) && !own) complain('not by its author')
        if (LEADS.has(entry.act) && !(member?.group_id === claim.group_id && hasRight(member.roles, 'claims.decide'))) complain('not by a lead of its group')
        if (REFEREES.has(entry.act) && (own || !referee || !member?.roles.includes('referee'))) complain('not by a referee of this claim')
        if (entry.act === 'sign' && (own || life.slice(0, index).some((earlier) => earlier.actor_id === entry.actor_id && REFEREES.has(earlier.act)))) complain('by its author or a referee of it')
        if (entry.act === 'endorse' && confirmationsAt(life.slice(0, index), entry.digest) < claim.confirmations_needed) complain('without the confirmations that it needs')
      }
      state = entry.to
    }
    if (claim ? claim.state !== state : state !== null) faults.push(`claim ${id} is ${claim?.state ?? 'gone'}, but its trail ends in ${state}`)
  }
  for (const id of claims.keys()) if (!lives.has(id)) faults.push(`claim ${id} has no trail`)
  return faults
}

/** Referees whose last word on this very content was a confirmation. */
function confirmationsAt(life: readonly Entry[], digest: string): number {
  const words = new Map<string | null, Entry>()
  for (const entry of life) if (entry.act === 'confirm' || entry.act === 'object') words.set(entry.actor_id, entry)
  return [...words.values()].filter((word) => word.act === 'confirm' && word.digest === digest).length
}

/** Every mail that the trail tells of is in the outbox once, and no other about a claim or an estimate. */
async function faultsOfMails(entries: readonly Entry[]): Promise<string[]> {
  const balance = new Map<string, number>()
  for (const key of entries.flatMap(({ told }) => told ?? [])) balance.set(key, (balance.get(key) ?? 0) + 1)
  const ofDoubts = await select<{ key: string }>(`SELECT jsonb_array_elements_text(detail->'told') AS key FROM audit_entries WHERE act = 'estimate.doubt'`)
  for (const { key } of ofDoubts) balance.set(key, (balance.get(key) ?? 0) + 1)
  const mails = await select<{ key: string }>(`SELECT template || ':' || member_id AS key FROM outbox WHERE template NOT IN ('invitation', 'password-reset') AND resent_from IS NULL AND dedupe_key IS NULL`)
  for (const { key } of mails) balance.set(key, (balance.get(key) ?? 0) - 1)
  return [...balance].filter(([, count]) => count !== 0).map(([key, count]) => (count > 0 ? `${count} mails missing: ${key}` : `${-count} mails too many: ${key}`))
}

/** What has to be so between the claims of one constant, worked out anew from their enclosures. */
async function faultsOfRegister(): Promise<string[]> {
  const checks: [what: string, sql: string][] = [
    ['two signed claims do not meet', `SELECT a.id FROM claims a JOIN claims b ON b.constant_id = a.constant_id AND a.lo > b.hi WHERE a.state = 'signed' AND b.state = 'signed'`],
    ['a signed claim has a narrower one within it', `SELECT a.id FROM claims a JOIN claims b ON b.constant_id = a.constant_id AND b.lo >= a.lo AND b.hi <= a.hi AND b.hi - b.lo < a.hi - a.lo WHERE a.state = 'signed' AND b.state = 'signed'`],
    ['a superseded claim has no signed one within it', `SELECT a.id FROM claims a LEFT JOIN claims b ON b.id = a.superseded_by AND b.state = 'signed' AND b.lo >= a.lo AND b.hi <= a.hi WHERE a.state = 'superseded' AND b.id IS NULL`],
    ['a conflict is not open', `SELECT a.id FROM claims a JOIN claims b ON b.constant_id = a.constant_id AND (a.lo > b.hi OR a.hi < b.lo) WHERE a.state = 'signed' AND b.state IN ('submitted', 'in-review', 'endorsed', 'signed')
      AND NOT EXISTS (SELECT 1 FROM conflicts k WHERE k.closed_at IS NULL AND a.id IN (k.claim_id, k.signed_claim_id) AND b.id IN (k.claim_id, k.signed_claim_id))`],
    ['a conflict is open with a claim that is withdrawn', `SELECT k.id FROM conflicts k JOIN claims c ON c.id IN (k.claim_id, k.signed_claim_id) WHERE k.closed_at IS NULL AND c.state = 'withdrawn'`],
    ['the best enclosure is not the intersection of the signed ones', `SELECT k.id FROM constants k LEFT JOIN (SELECT constant_id, max(lo) AS lo, min(hi) AS hi FROM claims WHERE state = 'signed' GROUP BY constant_id) s ON s.constant_id = k.id
      WHERE (k.best_lo, k.best_hi) IS DISTINCT FROM (s.lo, s.hi)`],
    ['a claim was signed in spite of an objection', `SELECT c.id FROM claims c JOIN objections o ON o.claim_id = c.id WHERE c.state IN ('endorsed', 'signed', 'superseded', 'suspended') AND o.state <> 'settled'`],
    ['a computed claim was endorsed without the recheck that its group needs', `SELECT c.id FROM claims c JOIN groups g ON g.id = c.group_id WHERE g.recheck_needed AND c.kind = 'enclosure' AND c.state IN ('endorsed', 'signed', 'superseded', 'suspended')
      AND NOT EXISTS (SELECT 1 FROM runs r JOIN runs own ON own.id = c.run_id WHERE r.claim_id = c.id AND r.state = 'done' AND (r.method <> own.method OR r.arithmetic <> own.arithmetic)
        AND (r.outcome->'enclosure'->>'lo')::numeric <= c.hi AND (r.outcome->'enclosure'->>'hi')::numeric >= c.lo)`],
    ['a claim is in force on an estimate that its group has in doubt', `SELECT c.id FROM claims c JOIN claim_estimates u ON u.claim_id = c.id JOIN estimate_doubts d ON d.estimate = u.estimate AND d.group_id = c.group_id
      WHERE d.lifted_at IS NULL AND c.state IN ('signed', 'superseded')`],
    ['numbers of a constant have a gap', `SELECT constant_id AS id FROM claims WHERE ordinal IS NOT NULL GROUP BY constant_id HAVING max(ordinal) <> count(*)`],
    ['evidence belongs to no upload in the trail', `SELECT e.id FROM evidence e WHERE NOT EXISTS (SELECT 1 FROM audit_entries a WHERE a.act = 'claim.attach' AND a.subject_id = e.claim_id::text AND a.detail->>'evidence' = e.id::text)`],
  ]
  const found = await Promise.all(checks.map(async ([what, sql]) => (await select<{ id: string }>(sql)).map(({ id }) => `${what}: ${id}`)))
  return found.flat()
}
