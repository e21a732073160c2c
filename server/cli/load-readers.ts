import { Agent, request } from 'node:http'
import { setTimeout as pause } from 'node:timers/promises'
import { hasRight, type Role } from '../../shared/permissions.ts'
import { pick, type Roll } from './load-definitions.ts'
import type { Facts } from './load-facts.ts'
import { PASSWORD, type LoadGroup, type LoadMember } from './load-people.ts'
import { DEEP_LISTS, EXPORTS, VISITS, type Asked, type Own, type Visit } from './load-visits.ts'

interface Reader {
  cookie: string
  roles: readonly Role[] | undefined
  own: Own
}

/** What came of one way of asking: milliseconds until the last byte, one a request. */
export interface Measured {
  visit: Visit
  milliseconds: number[]
}

export interface Crowd {
  address: string
  facts: Facts
  readers: Reader[]
  measured: Map<Visit, Measured>
  faults: string[]
}

const agent = new Agent({ keepAlive: true, maxSockets: 200 })

interface Answer {
  status: number
  text: string
  cookie: string
}

/** One request over a connection that is kept; nothing but what a program has to do to send it and to read all of the answer. */
function send(address: string, cookie: string, { path, body }: Asked): Promise<Answer> {
  const text = body && JSON.stringify(body)
  const headers = { ...(cookie !== '' && { Cookie: cookie }), ...(text !== undefined && { 'Content-Type': 'application/json', 'Content-Length': String(Buffer.byteLength(text)), 'X-Merestone': '1' }) }
  return new Promise((resolve, reject) => {
    const asked = request(`${address}/api/v1${path}`, { agent, method: text === undefined ? 'GET' : 'POST', headers }, (response) => {
      const parts: Buffer[] = []
      response.on('data', (part: Buffer) => parts.push(part))
      response.on('end', () => resolve({ status: response.statusCode ?? 0, text: Buffer.concat(parts).toString(), cookie: response.headers['set-cookie']?.[0]?.split(';', 1)[0] ?? '' }))
      response.on('error', reject)
    })
    asked.on('error', reject)
    asked.end(text)
  })
}

/** Half of the readers have no account; the others are members of all roles and of every group in turn. */
export async function gatherCrowd(address: string, facts: Facts, groups: readonly LoadGroup[], count: number, deep: number): Promise<Crowd> {
  const members = Array.from({ length: Math.floor(count / 2) }, (_, index) => groups[index % groups.length]!.members[Math.floor(index / groups.length) + (index % 2 === 0 ? 0 : 4)]!)
  const crowd: Crowd = { address, facts, readers: [], measured: new Map([...VISITS, ...EXPORTS].map((visit) => [visit, { visit, milliseconds: [] }])), faults: [] }
  const anonymous: Reader = { cookie: '', roles: undefined, own: { name: '', runs: [], claims: [], cursors: new Map() } }
  await findDeepPages(crowd, anonymous, deep)
  crowd.readers = await Promise.all(members.map((member) => signIn(crowd, member, deep)))
  crowd.readers.push(...Array.from({ length: count - members.length }, () => anonymous))
  return crowd
}

async function signIn(crowd: Crowd, { name, email, roles }: LoadMember, deep: number): Promise<Reader> {
  const { status, cookie } = await send(crowd.address, '', { path: '/session', body: { email, password: PASSWORD } })
  if (status !== 200) throw new Error(`signing in was answered with ${status}`)
  const ids = async (path: string): Promise<string[]> => ((JSON.parse((await send(crowd.address, cookie, { path })).text) as { items: { id: string }[] }).items ?? []).map(({ id }) => id)
  const reader: Reader = { cookie, roles, own: { name, runs: await ids('/runs?limit=100'), claims: await ids('/claims?limit=100'), cursors: new Map() } }
  await findDeepPages(crowd, reader, deep)
  return reader
}

/** Goes so many rows into the lists that are entered deep inside, a hundred at a time, and keeps where it came to. */
async function findDeepPages({ address }: Crowd, reader: Reader, rows: number): Promise<void> {
  await Promise.all(
    DEEP_LISTS.filter(({ by }) => mayAsk(reader, by)).map(async ({ path }) => {
      for (let gone = 0, cursor = ''; gone < rows; gone += 100) {
        const { text } = await send(address, reader.cookie, { path: `${path}&limit=${Math.min(100, rows)}${cursor}` })
        const { next } = JSON.parse(text) as { next: string | null }
        if (next === null || next === undefined) return
        cursor = `&cursor=${next}`
        reader.own.cursors.set(path, next)
      }
    }),
  )
}

function mayAsk({ roles }: Reader, by: Visit['by']): boolean {
  return by === 'anyone' || (roles !== undefined && (by === 'member' || hasRight(roles, by)))
}

/** Whether there is anything to ask for: some readers have no runs and no list is so long for them. */
const canAsk = ({ own }: Reader, { what, path }: { what: string; path: string }): boolean =>
  !path.includes('undefined') && !(what.startsWith('deep page') && path.endsWith('cursor=')) && own !== undefined

/** Lets every reader ask one thing after the other, in an order of their own, until the time is over. */
export async function letRead(crowd: Crowd, seconds: number, thinkMs: number, roll: Roll): Promise<number> {
  const begun = performance.now()
  const over = begun + 1000 * seconds
  await Promise.all(crowd.readers.map((reader) => readOn(crowd, reader, over, thinkMs, roll)))
  return (performance.now() - begun) / 1000
}

async function readOn(crowd: Crowd, reader: Reader, over: number, thinkMs: number, roll: Roll): Promise<void> {
  const open = VISITS.filter(({ by }) => mayAsk(reader, by))
  while (performance.now() < over) {
    const visit = pick(roll, open)
    await pay(crowd, reader, visit, roll)
    if (thinkMs > 0) await pause(roll(2 * thinkMs))
  }
}

/** Asks for each thing once, by the first reader who may: everything for the plans and to warm up, and the large files. */
export async function askOnce(crowd: Crowd, visits: readonly Visit[], roll: Roll, between: (visit: Visit) => void = () => undefined): Promise<void> {
  for (const visit of visits) {
    const reader = crowd.readers.find((one) => mayAsk(one, visit.by) && canAsk(one, { what: visit.what, path: visit.ask(crowd.facts, one.own, roll).path }))
    if (reader) await pay(crowd, reader, visit, roll)
    else crowd.faults.push(`nobody can ask ${visit.route}, ${visit.what}`)
    between(visit)
  }
}

async function pay(crowd: Crowd, reader: Reader, visit: Visit, roll: Roll): Promise<void> {
  const asked = visit.ask(crowd.facts, reader.own, roll)
  if (!canAsk(reader, { what: visit.what, path: asked.path })) return
  const begun = performance.now()
  const { status, text } = await send(crowd.address, reader.cookie, asked)
  crowd.measured.get(visit)!.milliseconds.push(performance.now() - begun)
  if (status !== 200) crowd.faults.push(`${visit.route}, ${visit.what} (${asked.path}) was answered with ${status}: ${text.slice(0, 200)}`)
}

/** What was measured of some ways of asking. */
export const measuredOf = (crowd: Crowd, visits: readonly Visit[]): Measured[] => visits.map((visit) => crowd.measured.get(visit)!)

/** Forgets what was measured so far. */
export function resetMeasured(crowd: Crowd): void {
  for (const one of crowd.measured.values()) one.milliseconds = []
}
