import bcrypt from 'bcryptjs'
import type pg from 'pg'
import { ROLES, type Role } from '../../shared/permissions.ts'
import type { Claim, ClaimSummary } from '../../shared/schemas/claim.ts'
import type { Random } from './random.ts'

const PASSWORD = 'one of a crowd of people'

interface Account {
  id: string
  email: string
  roles: Role[]
}

/** Groups of people with all mixtures of roles, put into the database directly: signing up is not what a crowd tests. */
export async function makePeople(client: pg.Client, count: number, random: Random): Promise<Account[]> {
  const groups = Math.max(2, Math.ceil(count / 50))
  const hash = bcrypt.hashSync(PASSWORD, 4)
  const people: Account[] = []
  for (let index = 0; index < count; index += 1) {
    const group = `Crowd ${index % groups}`
    // The first of each group leads it; everybody else has some of the roles.
    const some = ROLES.filter(() => random.whole(0, 2) === 0)
    const roles: Role[] = index < groups ? ['lead'] : some.length > 0 ? some : ['researcher']
    const { rows } = await client.query(
      `WITH g AS (INSERT INTO groups (name) VALUES ($1) ON CONFLICT (name) DO UPDATE SET name = excluded.name RETURNING id)
       INSERT INTO members (group_id, email, name, password_hash, roles) SELECT id, $2, $3, $4, $5 FROM g RETURNING id, email, roles`,
      [group, `person-${index}@crowd.test`, `Person ${index}`, hash, roles],
    )
    people.push(rows[0] as Account)
  }
  return people
}

/** What a crowd met with: answers by status, and requests that got none because the server was being killed. */
export class Tally {
  readonly statuses = new Map<number, number>()
  readonly faults: string[] = []
  lost = 0

  /** Requests that were answered. */
  get answered(): number {
    return [...this.statuses.values()].reduce((sum, count) => sum + count, 0)
  }

  note(status: number, what: string, body: string): void {
    this.statuses.set(status, (this.statuses.get(status) ?? 0) + 1)
    if (status >= 500) this.faults.push(`${status} ${what}: ${body.slice(0, 300)}`)
  }
}

const pick = <T>(random: Random, items: readonly T[]): T | undefined => (items.length === 0 ? undefined : items[random.whole(0, items.length - 1)])
const REASON = 'for no other reason than chance'

/** What an act is asked with: what a person who reads this claim would send, or now and then what they read before. */
function bodyOf(act: string, claim: Claim, random: Random): object {
  const version = claim.version - (random.whole(0, 9) === 0 ? 1 : 0)
  const objectionId = pick(random, claim.objections)?.id
  switch (act) {
    case 'submit':
      return { version }
    case 'assign':
      return { refereeId: pick(random, claim.possibleReferees)?.id ?? claim.author.id }
    case 'remind':
      return { assignmentId: pick(random, claim.assignments)?.id ?? claim.id }
    case 'recheck':
      return { method: 'transform', arithmetic: 'mpfr', digits: 8 }
    case 'object':
      return { text: REASON }
    case 'answer':
      return { objectionId, text: REASON }
    case 'settle':
      return { objectionId, outcome: pick(random, ['settled', 'settled', 'upheld']), text: REASON }
    case 'confirm':
    case 'resubmit':
      return { version, remark: REASON }
    case 'sign':
      return { version, password: PASSWORD }
    default:
      return { reason: REASON }
  }
}

const ACTS = ['submit', 'assign', 'remind', 'accept', 'decline', 'object', 'answer', 'settle', 'confirm', 'return', 'resubmit', 'sign', 'suspend', 'reinstate', 'withdraw'] as const
/** Acts that end a claim's way are tried less often, so that some claims get to the end of it. */
const RARE = new Set<string>(['decline', 'withdraw', 'suspend', 'return', 'object', 'recheck', 'edit'])

/** One of the crowd: signs in and does one thing after the other, what the claim's page offers or, at times, what it does not. */
export class Person {
  private readonly account: Account
  private readonly address: string
  private readonly random: Random
  private readonly tally: Tally
  private cookie = ''

  constructor(account: Account, address: string, random: Random, tally: Tally) {
    this.account = account
    this.address = address
    this.random = random
    this.tally = tally
  }

  /** States constants for the crowd to make claims about, and answers their numbers. */
  async stateConstants(count: number): Promise<string[]> {
    await this.signIn()
    const numbers = new Set<string>()
    // Odd moduli only: the primes that are 1 mod 6 are those that are 1 mod 3.
    for (let modulus = 3; numbers.size < count; modulus += 2) {
      const definition = { type: 'series', set: { kind: 'residue-class', modulus, residue: 1 }, weight: {} }
      const stated = await this.request('POST', '/constants', { definition })
      if (stated?.status !== 201) throw new Error(`A constant is refused: ${JSON.stringify(stated?.data)}`)
      numbers.add((stated.data as { number: string }).number)
    }
    return [...numbers]
  }

  async actUntil(stop: AbortSignal, constants: readonly string[]): Promise<void> {
    while (!stop.aborted) {
      if (this.cookie === '') await this.signIn()
      else if (this.account.roles.some((role) => role !== 'referee') && this.random.whole(0, 14) === 0) await this.draft(constants)
      else await this.actOnSomething()
      await new Promise((resolve) => setTimeout(resolve, this.random.whole(20, 400)))
    }
  }

  /** The chain check, by a lead. */
  async checkAudit(): Promise<unknown> {
    await this.signIn()
    return (await this.request('GET', '/audit/check'))?.data
  }

  private async request(method: string, path: string, body?: object): Promise<{ status: number; data: unknown } | undefined> {
    try {
      const response = await fetch(`${this.address}/api/v1${path}`, {
        method,
        headers: { Cookie: this.cookie, 'X-Merestone': '1', 'Content-Type': 'application/json' },
        ...(body && { body: JSON.stringify(body) }),
        signal: AbortSignal.timeout(60_000),
      })
      const text = await response.text()
      this.tally.note(response.status, `${method} ${path}`, text)
      const cookie = response.headers.getSetCookie()[0]?.split(';')[0]
      if (cookie !== undefined) this.cookie = cookie
      return { status: response.status, data: text === '' ? null : JSON.parse(text) }
    } catch {
      this.tally.lost += 1
      return undefined
    }
  }

  private async signIn(): Promise<void> {
    await this.request('POST', '/session', { email: this.account.email, password: PASSWORD })
  }

  /** States a value of a constant; values differ a little, so that some meet and some contradict each other. */
  private async draft(constants: readonly string[]): Promise<void> {
    const lo = this.random.whole(1_000, 1_010)
    const drafted = await this.request('POST', '/claims', {
      kind: 'stated',
      constant: pick(this.random, constants),
      value: { lo: `1.${lo}`, hi: `1.${lo + this.random.whole(1, 12)}` },
      source: 'drawn by lot',
    })
    const claim = drafted?.data as Claim | undefined
    if (drafted?.status === 201 && claim && this.random.whole(0, 9) > 0) await this.request('POST', `/claims/${claim.id}/submit`, { version: claim.version })
  }

  private async actOnSomething(): Promise<void> {
    const listed = await this.request('GET', this.random.whole(0, 5) === 0 ? '/claims?limit=100' : '/desk')
    if (listed?.status !== 200) return
    const claims = Object.values(listed.data as Record<string, unknown>).flatMap((part) => (Array.isArray(part) ? (part as (ClaimSummary | { claim: ClaimSummary })[]) : []))
    const chosen = pick(this.random, claims)
    if (!chosen) return
    const { id } = 'claim' in chosen ? chosen.claim : chosen
    const detail = await this.request('GET', `/claims/${id}`)
    if (detail?.status !== 200) return
    const claim = detail.data as Claim
    const act = this.chooseAct(claim)
    if (act !== undefined) await this.request('POST', `/claims/${id}/${act}`, bodyOf(act, claim, this.random))
  }

  private chooseAct(claim: Claim): string | undefined {
    if (this.random.whole(0, 4) === 0) return pick(this.random, ACTS)
    const offered = ACTS.filter((act) => claim.abilities[act])
    const common = offered.filter((act) => !RARE.has(act))
    return pick(this.random, common.length > 0 && this.random.whole(0, 5) > 0 ? common : offered)
  }
}
