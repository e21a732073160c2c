import { setTimeout as pause } from 'node:timers/promises'
import bcrypt from 'bcryptjs'
import { PERSON_ACTS, type PersonAct } from '../../shared/claim-life.ts'
import { ROLES, type Role } from '../../shared/permissions.ts'
import type { EstimateDoubt } from '../../shared/schemas/estimate.ts'
import type { Claim, Desk } from '../../shared/schemas/claim.ts'
import { change } from '../db.ts'
import { dice } from './dice.ts'

const PASSWORD = 'rain from all sides at once'

export interface Person {
  id: string
  email: string
  roles: Role[]
  cookie: string
}

/** What everybody shares: where the server is, who there is, what there is to act on, and what came of it. */
export interface World {
  address: string
  roll: (below: number) => number
  people: Person[]
  constants: string[]
  claims: string[]
  /** Answers by act and status; 0 stands for a connection that was cut. */
  tally: Map<string, number>
  faults: string[]
}

export function emptyWorld(address: string, seed: number): World {
  return { address, roll: dice(seed), people: [], constants: [], claims: [], tally: new Map(), faults: [] }
}

const oneOf = <T>({ roll }: World, items: readonly T[]): T | undefined => items[roll(Math.max(1, items.length))]

interface Answer {
  status: number
  body: unknown
}

/** One request, noted by what it was for. */
async function send(world: World, person: Person, what: string, method: string, path: string, body?: object | FormData): Promise<Answer> {
  let answer: Answer = { status: 0, body: null }
  try {
    const form = body instanceof FormData
    const response = await fetch(`${world.address}/api/v1${path}`, {
      method,
      headers: { 'X-Merestone': '1', ...(person.cookie !== '' && { Cookie: person.cookie }), ...(body && !form && { 'Content-Type': 'application/json' }) },
      ...(body && { body: form ? body : JSON.stringify(body) }),
    })
    const text = await response.text()
    answer = { status: response.status, body: text === '' || !response.headers.get('content-type')?.includes('json') ? null : JSON.parse(text) }
    const [cookie] = response.headers.getSetCookie()
    if (cookie) person.cookie = cookie.split(';', 1)[0] ?? ''
    if (response.status >= 500) world.faults.push(`${what}: ${response.status} ${text.slice(0, 300)}`)
  } catch {
    // The server was killed while it was asked: nobody knows whether the act was done, as in life.
    await pause(1_000)
  }
  const key = `${what} ${answer.status}`
  world.tally.set(key, (world.tally.get(key) ?? 0) + 1)
  return answer
}

/** Makes groups with people of all mixtures of roles, signs them in, and states some constants. */
export async function gather(world: World, count: number): Promise<void> {
  const hash = bcrypt.hashSync(PASSWORD, 4)
  const groups: string[] = []
  for (let index = 0; index < Math.max(2, Math.ceil(count / 25)); index += 1) {
    const rules = { name: `Storm ${index} ${hash.slice(-6)}`, confirmations: 1 + (index % 2), recheck: index % 3 === 0, open: index % 4 !== 3 }
    const [row] = await change<{ id: string }>('INSERT INTO groups (name, confirmations_needed, recheck_needed, public) VALUES ($name, $confirmations, $recheck, $open) RETURNING id', rules)
    groups.push(row!.id)
  }
  for (let index = 0; index < count; index += 1) {
    // One or two leads and researchers a group for sure, then mixtures.
    const round = Math.floor(index / groups.length)
    const roles: Role[] = round < 3 ? [ROLES[round]!] : ROLES.filter((_, bit) => ((index % 7) + 1) & (1 << bit))
    const [row] = await change<{ id: string; email: string }>(
      'INSERT INTO members (group_id, email, name, password_hash, roles) VALUES ($group, $email, $name, $hash, $roles) RETURNING id, email',
      { group: groups[index % groups.length], email: `storm-${index}-${hash.slice(-6).toLowerCase().replace(/\W/g, 'x')}@merestone.test`, name: `Storm person ${index}`, hash, roles },
    )
    world.people.push({ ...row!, roles, cookie: '' })
  }
  const waiting = [...world.people]
  await Promise.all(Array.from({ length: 10 }, async () => {
    for (let person = waiting.pop(); person; person = waiting.pop()) await send(world, person, 'sign in', 'POST', '/session', { email: person.email, password: PASSWORD })
  }))
  const researcher = world.people.find(({ roles }) => roles.includes('researcher'))!
  for (const exclude of [[], [2], [3], [5], [2, 3], [7]]) {
    const { body } = await send(world, researcher, 'state a constant', 'POST', '/constants', { definition: { type: 'series', set: { kind: 'primes', exclude }, weight: { power: '2', logPower: '1' } } })
    world.constants.push((body as { number: string }).number)
  }
}

/** Lives until the time is over: one thing after the other, with hardly a thought in between. */
export async function live(world: World, person: Person, over: AbortSignal): Promise<void> {
  while (!over.aborted) {
    if (person.cookie === '') await send(world, person, 'sign in', 'POST', '/session', { email: person.email, password: PASSWORD })
    const whim = world.roll(20)
    if (whim === 0 && person.roles.includes('lead')) await doubt(world, person)
    else if (whim < 3) await beginSomething(world, person)
    else if (whim < 5) await lookAround(world, person)
    else await actOn(world, person, whim < 9)
    await pause(world.roll(60))
  }
}

/** Estimates that the storm's partial sums rest on. */
const ESTIMATES = ['theta-buthe-2018-b', 'theta-johnston-2022']

/** Marks an estimate as in doubt, or lifts the doubt and reinstates what it suspended; mostly the latter, so that something stays in force. */
async function doubt(world: World, person: Person): Promise<void> {
  const path = `/estimates/${oneOf(world, ESTIMATES)}/doubt`
  const { status, body } = await send(world, person, 'look at a doubt', 'GET', path)
  if (status !== 200) return
  const { doubt: open, digest, claims } = body as EstimateDoubt
  const reason = `because of ${world.roll(1000)}`
  if (open) await send(world, person, 'lift a doubt', 'POST', `${path}/lift`, { reason, reinstate: claims.filter(({ fate }) => fate === 'fallen' && world.roll(4) > 0).map(({ id }) => id) })
  else if (world.roll(2) === 0) await send(world, person, 'mark in doubt', 'POST', path, { reason, digest })
}

async function lookAround(world: World, person: Person): Promise<void> {
  const path = oneOf(world, ['/desk', '/session', '/claims?limit=50', '/claims?mine=true', '/runs', '/constants', `/constants/${oneOf(world, world.constants)}`, '/audit', '/outbox'])!
  await send(world, person, `look at ${path.split(/[?/]/)[1]}`, 'GET', path)
}

async function beginSomething(world: World, person: Person): Promise<void> {
  const { roll } = world
  const remember = ({ status, body }: Answer): void => {
    if (status === 201) world.claims.push((body as Claim).id)
  }
  switch (roll(4)) {
    case 0: {
      const exclude = oneOf(world, [[], [2], [3], [5]])
      const definition = { type: 'series', set: { kind: 'primes', exclude }, weight: { power: '2', logPower: '1' } }
      const how = roll(2) === 0 ? { goal: { digits: 4 + roll(8) }, method: 'transform', arithmetic: oneOf(world, ['ball', 'mpfr']) } : { goal: { cutoff: String(2_000 + 1_000 * roll(9)) }, method: 'partial-sum' }
      await send(world, person, 'start a run', 'POST', '/runs', { definition, ...how })
      return
    }
    case 1: {
      const runs = (await send(world, person, 'look at runs', 'GET', '/runs?state=done&limit=20')).body as { items?: { id: string }[] } | null
      const run = oneOf(world, runs?.items ?? [])
      if (run) remember(await send(world, person, 'claim a run', 'POST', '/claims', { kind: 'enclosure', runId: run.id }))
      return
    }
    case 2: {
      const [lesser, greater] = [oneOf(world, world.constants), oneOf(world, world.constants)]
      remember(await send(world, person, 'claim an order', 'POST', '/claims', { kind: 'order', lesser, greater }))
      return
    }
    default: {
      // Sums of 1/(p^2 log p) lie between 0 and 1; now and then a value contradicts the others.
      const lo = roll(8) === 0 ? 900 : roll(50)
      const value = { lo: `0.${String(lo).padStart(3, '0')}`, hi: `0.${lo + 50 + roll(49)}` }
      remember(await send(world, person, 'claim a value', 'POST', '/claims', { kind: 'stated', constant: oneOf(world, world.constants), value: roll(3) === 0 ? { digits: `0.${roll(9)}`, reading: 'rounded' } : value, source: 'by lot' }))
    }
  }
}

/** Does something to a claim: mostly what its page offers, at times (`blindly`) anything at all. */
async function actOn(world: World, person: Person, blindly: boolean): Promise<void> {
  const id = await chooseClaim(world, person, blindly)
  if (id === undefined) return
  const { status, body } = await send(world, person, 'look at a claim', 'GET', `/claims/${id}`)
  const claim = status === 200 ? (body as Claim) : undefined
  const offered = claim ? PERSON_ACTS.filter((act) => claim.abilities[act]) : []
  const act = oneOf(world, blindly ? PERSON_ACTS : offered)
  // What ends a claim's way is done more rarely than what leads on, so that some get to the end.
  if (act === undefined || (!blindly && ['withdraw', 'decline', 'return', 'delete', 'suspend'].includes(act) && world.roll(4) > 0)) return
  await perform(world, person, act, id, claim)
}

const itemsOf = ({ researcher, referee, lead }: Desk) => [...researcher, ...referee, ...lead]

/** A claim that waits for this person, or any of the crowd's. */
async function chooseClaim(world: World, person: Person, blindly: boolean): Promise<string | undefined> {
  if (blindly || world.roll(3) === 0) return oneOf(world, world.claims)
  const { status, body } = await send(world, person, 'look at desk', 'GET', '/desk')
  return status === 200 ? oneOf(world, itemsOf(body as Desk))?.claim.id : undefined
}

async function perform(world: World, person: Person, act: PersonAct, id: string, claim: Claim | undefined): Promise<void> {
  const { roll } = world
  const because = { reason: `because of ${roll(1000)}` }
  const version = (claim?.version ?? 1) - (roll(12) === 0 ? 1 : 0)
  const objectionId = oneOf(world, claim?.objections ?? [])?.id ?? id
  const ask = (method: string, path: string, body?: object) => send(world, person, act, method, `/claims/${id}${path}`, body)
  switch (act) {
    case 'edit':
      return void (await ask('PATCH', '', { version, remark: `remark ${roll(1000)}`, ...(claim?.kind === 'stated' && { source: `by lot, ${roll(5)}` }) }))
    case 'delete':
      return void (await ask('DELETE', ''))
    case 'attach': {
      const form = new FormData()
      form.append('file', new Blob([`digits ${roll(1_000_000)}`]), `note ${roll(100)}.txt`)
      return void (await ask('POST', '/evidence', form))
    }
    case 'detach':
      return void (await send(world, person, act, 'DELETE', `/evidence/${oneOf(world, claim?.evidence ?? [])?.id ?? id}`))
    case 'draft-verdict':
      return void (await ask('PUT', '/verdict-draft', { text: `so far ${roll(1000)}` }))
    case 'settle':
    case 'uphold':
      return void (await ask('POST', '/settle', { objectionId, outcome: act === 'settle' ? 'settled' : 'upheld', text: 'said' }))
    case 'assign':
      return void (await ask('POST', '/assign', { refereeId: oneOf(world, claim?.possibleReferees ?? [])?.id ?? oneOf(world, world.people)?.id }))
    case 'remind':
      return void (await ask('POST', '/remind', { assignmentId: oneOf(world, claim?.assignments ?? [])?.id ?? id }))
    case 'recheck':
      return void (await ask('POST', '/recheck', { method: 'transform', arithmetic: oneOf(world, ['ball', 'mpfr']), digits: 4 + roll(6) }))
    case 'object':
      return void (await ask('POST', '/object', { text: 'why?' }))
    case 'answer':
      return void (await ask('POST', '/answer', { objectionId, text: 'so.' }))
    case 'sign':
      return void (await ask('POST', '/sign', { version, password: roll(20) === 0 ? 'wrong' : PASSWORD }))
    case 'submit':
      return void (await ask('POST', '/submit', { version }))
    case 'confirm':
    case 'resubmit':
      return void (await ask('POST', `/${act}`, { version, remark: 'by lot' }))
    case 'accept':
      return void (await ask('POST', '/accept', {}))
    default:
      return void (await ask('POST', `/${act}`, because))
  }
}
