import { createHash } from 'node:crypto'
import { canonicalJson } from '../../shared/engine/certificate/canonical-json.ts'
import type { Json, Outcome } from '../../shared/engine/methods/computation.ts'
import { decimalText } from '../../shared/digits.ts'
import { digitsOf } from '../../shared/intersection.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { makeStatement } from '../claim-kinds/statement.ts'
import { labelOf } from '../commands/claim-locked.ts'
import type { ReadDefinition } from '../engine/definition.ts'
import { pick, type Roll } from './load-definitions.ts'
import type { LoadGroup, LoadMember } from './load-people.ts'

/** A row by the names of its columns. */
export type Row = Record<string, unknown>

/** Something that happened, for the audit trail and the mails. */
export interface Happening {
  at: number
  group: LoadGroup
  actor: LoadMember
  act: string
  subject: { kind: string; id: string; label: string }
  digest: string
  detail: { [key: string]: Json }
  told?: LoadMember
}

/** Rows of one claim and what hangs on it. */
export interface ClaimRows {
  claim: Row
  group: LoadGroup
  run?: Row
  rechecks: Row[]
  assignments: Row[]
  objections: Row[]
  messages: Row[]
  evidence: Row[]
  happenings: Happening[]
}

export const DAY = 86_400_000

/** Random (version 4) UUID of a die. */
export function someUuid(roll: Roll): string {
  const hex = Array.from({ length: 8 }, () => roll(65_536).toString(16).padStart(4, '0')).join('')
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-4${hex.slice(13, 16)}-${(8 + roll(4)).toString(16)}${hex.slice(17, 20)}-${hex.slice(20)}`
}

const sha256 = (text: string): string => createHash('sha256').update(text).digest('hex')

/** A number that an enclosure may be of, to 320 places: as the sums are, most near 1, 1/2 and 6/pi^2, others up to 3. */
export function someValue(roll: Roll): bigint {
  const centre = pick(roll, [[1_000, 60], [1_000, 8], [500, 40], [608, 30], [1_636, 200], [0, 3_000]] as const)
  const thousandths = centre[0] + roll(centre[1] + 1)
  return BigInt(String(thousandths) + Array.from({ length: 53 }, () => String(roll(1_000_000)).padStart(6, '0')).join('').slice(0, 317))
}
const PLACES = 320

/** The enclosure of a value by one unit of its last place but for what is added outward. */
function enclosureOf(value: bigint, digits: number, wider: bigint): { lo: string; hi: string } {
  const low = value / 10n ** BigInt(PLACES - digits)
  return { lo: decimalText(low > wider ? low - wider : 0n, digits), hi: decimalText(low + 1n + wider, digits) }
}

export interface ClaimPlan {
  constant: { id: string; number: number; read: ReadDefinition }
  value: bigint
  digits: number
  /** Null for a draft. */
  ordinal: number | null
  state: ClaimState
  group: LoadGroup
  at: number
}

const ENTERED = new Set<ClaimState>(['signed', 'superseded', 'suspended'])
const REVIEWED = new Set<ClaimState>(['in-review', 'returned', 'endorsed', ...ENTERED])

/** The rows of one claim in its state, as if its people had taken it there. */
export function claimRows(roll: Roll, plan: ClaimPlan, estimates: readonly { id: string; validFor: string; conditional: boolean }[]): ClaimRows {
  const { constant, digits, ordinal, state, group, at } = plan
  const author = pick(roll, group.researchers)
  const id = someUuid(roll)
  const { lo, hi } = enclosureOf(plan.value, digits, roll(12) === 0 ? BigInt(roll(40)) : 0n)
  const told = digitsOf({ lo, hi })
  const computed = roll(5) < 3
  const run = computed ? runRow(roll, plan, { lo, hi, author, estimates, method: digits <= 9 ? 'partial-sum' : pick(roll, ['transform', 'panels']), arithmetic: 'ball', at: at - DAY }) : undefined
  const statement = makeStatement({ kind: 'stated', definition: constant.read.definition as unknown as Json, enclosure: { lo, hi }, source: `J. Load Tests ${1 + roll(90)} (${1960 + roll(60)}), Table ${1 + roll(9)}` })
  const certificate = computed ? (run!.certificate as string) : statement.text
  const certificateDigest = computed ? (run!.certificate_digest as string) : statement.digest
  const signer = ENTERED.has(state) ? group.lead : null
  const signature = { algorithm: 'Ed25519', keyId: '0'.repeat(16), value: 'made for a load run, signed by nobody' }
  const claim: Row = {
    id, kind: computed ? 'enclosure' : 'stated', constant_id: constant.id, other_constant_id: null, ordinal, group_id: group.id, author_id: author.id, state, version: 1 + roll(6), lo, hi,
    digits_truncated: told.truncated, digits_rounded: told.rounded, run_id: run?.id ?? null, basis: {}, source: computed ? null : 'J. Load Tests, Table 1', remark: roll(4) === 0 ? 'Needed for the tail of the main sum.' : '',
    certificate: signer ? canonicalJson({ ...(JSON.parse(certificate) as { [key: string]: Json }), signature }) : certificate,
    certificate_digest: certificateDigest, digest: sha256(`${id}${lo}${hi}`), repeated_here: computed || roll(2) === 0, superseded_by: null, signed_by: signer?.id ?? null,
    signed_at: signer && new Date(at + 9 * DAY).toISOString(), created_at: new Date(at).toISOString(), submitted_at: state === 'draft' ? null : new Date(at + DAY).toISOString(), since: new Date(at + 9 * DAY + roll(DAY)).toISOString(),
  }
  const label = labelOf({ ordinal }, constant)
  const happening = (days: number, actor: LoadMember, act: string, from: ClaimState | null, to: ClaimState, mailTo?: LoadMember): Happening => ({
    at: at + days * DAY + roll(DAY), group, actor, act: `claim.${act}`, subject: { kind: 'claim', id, label }, digest: claim.digest as string, detail: { from, to }, ...(mailTo && { told: mailTo }),
  })
  const referee = pick(roll, group.referees.filter((one) => one.id !== author.id))
  const rows: ClaimRows = { claim, group, ...(run && { run }), rechecks: [], assignments: [], objections: [], messages: [], evidence: [], happenings: [happening(0, author, 'create', null, 'draft')] }
  if (state !== 'draft') rows.happenings.push(happening(1, author, 'submit', 'draft', 'submitted', group.lead))
  if (REVIEWED.has(state)) review(roll, plan, rows, referee, computed)
  if (signer) rows.happenings.push(happening(9, signer, 'sign', 'endorsed', 'signed', author))
  if (roll(60) === 0) {
    const content = Buffer.from(`term,partial sum\n1,${lo}\n2,${hi}\n`)
    rows.evidence.push({ id: someUuid(roll), claim_id: id, name: 'partial-sums.csv', media_type: 'text/csv', bytes: content.length, digest: sha256(content.toString()), content: `\\x${content.toString('hex')}`, uploaded_by: author.id, uploaded_at: claim.created_at })
  }
  return rows
}

/** What a referee has done by now: asked, accepted, objected, confirmed, with a recheck by the other arithmetic now and then. */
function review(roll: Roll, plan: ClaimPlan, rows: ClaimRows, referee: LoadMember, computed: boolean): void {
  const { claim, group } = rows
  const { state, at } = plan
  const asked = state === 'in-review' && roll(3) === 0
  const verdict = state === 'endorsed' || ENTERED.has(state) ? 'confirmed' : state === 'returned' ? 'objected' : null
  const assignment = someUuid(roll)
  const day = (days: number): string => new Date(at + days * DAY).toISOString()
  rows.assignments.push({
    id: assignment, claim_id: claim.id, referee_id: referee.id, asked_by: group.lead.id, note: '', state: asked ? 'asked' : 'accepted', verdict, verdict_digest: verdict && claim.digest, remark: verdict && 'Repeated; the enclosures meet.',
    checklist: [], asked_at: day(2), answered_at: asked ? null : day(3), verdict_at: verdict && day(6),
  })
  if (state === 'returned' || roll(10) === 0) {
    const objection = someUuid(roll)
    rows.objections.push({ id: objection, claim_id: claim.id, assignment_id: assignment, state: state === 'returned' ? 'open' : 'settled', raised_at: day(4), since: day(5) })
    rows.messages.push({ id: someUuid(roll), objection_id: objection, author_id: referee.id, text: 'Is the estimate used inside its range?', at: day(4) })
  }
  const { lo, hi } = claim as { lo: string; hi: string }
  if (computed && roll(8) === 0) rows.rechecks.push(runRow(roll, plan, { lo, hi, author: referee, estimates: [], method: 'panels', arithmetic: 'mpfr', at: at + 4 * DAY, claimId: claim.id as string }))
}

interface RunPlan {
  lo: string
  hi: string
  author: LoadMember
  method: 'transform' | 'panels' | 'partial-sum'
  arithmetic: 'ball' | 'mpfr'
  estimates: readonly { id: string; validFor: string; conditional: boolean }[]
  at: number
  claimId?: string
}

/** A run that is done, with an outcome and a certificate of the usual size. */
function runRow(roll: Roll, { constant, digits, group }: ClaimPlan, { lo, hi, author, method, arithmetic, estimates, at, claimId }: RunPlan): Row {
  const direct = method === 'partial-sum'
  const used = direct && estimates.length > 0 ? [pick(roll, estimates), pick(roll, estimates)].filter((one, index, all) => all.indexOf(one) === index) : []
  const outcome = {
    definition: constant.read.definition, enclosure: { lo, hi }, radius: `5.0e-${digits}`, digits: digitsOf({ lo, hi }), method, arithmetic, goal: direct ? { cutoff: '1000000000' } : { digits },
    parameters: { bits: 64 + 4 * digits, step: '1/16', nodes: 400 + roll(2_000), from: -300, to: 60 },
    budget: (['discretisation', 'truncation-below', 'truncation-above', 'tail', 'rounding'] as const).map((source, index) => ({ source, bound: `T-${index + 2}`, magnitude: `${1 + roll(9)}.${roll(10)}e-${digits + index}` })),
    estimates: used.map(({ id, validFor, conditional }) => ({ id, usedAt: 'x >= 1000000000', validFor, conditional })),
    convergence: Array.from({ length: 4 }, (_, index) => ({ at: String(100 << index), lo, hi })),
  }
  const { convergence: _left, ...content } = outcome
  const certificate = { format: 'merestone-certificate', version: 1, ...content, engine: { version: 'load', digest: '0'.repeat(64) } } as unknown as { [key: string]: Json }
  const digest = sha256(canonicalJson(certificate))
  const time = (seconds: number): string => new Date(at + 1000 * seconds).toISOString()
  return {
    id: someUuid(roll), constant_id: constant.id, group_id: group.id, started_by: author.id, purpose: claimId === undefined ? 'run' : 'recheck', claim_id: claimId ?? null, method, arithmetic,
    request: canonicalJson({ definitions: [constant.read.definition as unknown as Json], method, arithmetic, goal: outcome.goal as unknown as Json }), request_key: someUuid(roll), goal: outcome.goal, state: 'done', progress: 1, shards_done: 8, shards_total: 8, cpu_ms: 200 + roll(60_000),
    outcome: outcome as unknown as Outcome, certificate: canonicalJson({ ...certificate, digest }), certificate_digest: digest, estimates: used.map(({ id }) => id), failure: null, created_at: time(0), started_at: time(1), finished_at: time(60),
  }
}
