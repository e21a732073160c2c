import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { freePort } from '../../server/scripts/cluster.mjs'
import { addresses } from '../../server/scripts/database.mjs'
import { leadsTo, type LifeAct } from '../../shared/claim-life.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { makePeople, Person, Tally } from '../support/crowd.ts'
import { dataFolder, Installation, until } from '../support/installation.ts'
import { Random } from '../support/random.ts'

/*
 * A crowd that does random acts against the product as `npm start` runs it, while its processes are killed: nothing may come out
 * that the rules forbid. CROWD_PEOPLE=200 CROWD_SECONDS=60 makes it as large as the product is meant to bear.
 */
const PEOPLE = Number(process.env.CROWD_PEOPLE ?? 60)
const SECONDS = Number(process.env.CROWD_SECONDS ?? 20)
const LONG = 420_000 + SECONDS * 1_000

interface ClaimEntry {
  seq: string
  subject_id: string
  act: string
  detail: { from: ClaimState | null; to: ClaimState | null; told?: string[] }
}

/** How often each of the items occurs. */
function count(items: string[]): Record<string, number> {
  const counts: Record<string, number> = {}
  for (const item of items) counts[item] = (counts[item] ?? 0) + 1
  return counts
}

describe(`${PEOPLE} people doing random acts for ${SECONDS} seconds while web process and worker are killed`, { timeout: LONG }, () => {
  const random = new Random()
  const tally = new Tally()
  const data = dataFolder()
  let installation: Installation
  let client: pg.Client
  let entries: ClaimEntry[]
  let audited: { broken: unknown; entries: number }

  const message = (): string => `RANDOM_SEED=${random.seed}; answers: ${JSON.stringify(Object.fromEntries(tally.statuses))}, lost: ${tally.lost}`
  const enough = Math.min(PEOPLE * 15, 1_000)
  const isOneSigned = async () => (await client.query(`SELECT 1 FROM audit_entries WHERE act = 'claim.sign' LIMIT 1`)).rows.length > 0

  /** Half of the time, and on a slow machine as long as it takes to do enough. */
  async function halfTheActs(before: number): Promise<void> {
    await pause(SECONDS * 500)
    await until(async () => tally.answered - before >= enough && (await isOneSigned()), 150_000, `the crowd to do enough and to sign a claim; ${message()}`)
  }

  beforeAll(async () => {
    installation = new Installation(data.path, { PORT: String(await freePort()), RATE_LIMIT: '10000000', DEMO: 'off' })
    const { address } = await installation.ready()
    const { port, passwords } = JSON.parse(readFileSync(join(data.path, 'postgres', 'settings.json'), 'utf8'))
    client = new pg.Client({ connectionString: addresses(port, passwords).owner })
    await client.connect()
    const accounts = await makePeople(client, PEOPLE, random)
    const people = accounts.map((account) => new Person(account, address, random, tally))
    const constants = await people[0]!.stateConstants(12)
    const stop = new AbortController()
    const crowd = Promise.all(people.map((person) => person.actUntil(stop.signal, constants)))
    await halfTheActs(0)
    await Promise.all(['index.js web', 'index.js worker'].map((part) => installation.killAndAwaitNext(part)))
    await halfTheActs(tally.answered)
    stop.abort()
    await crowd
    audited = (await people[0]!.checkAudit()) as typeof audited
    entries = (await client.query(`SELECT seq, subject_id, act, detail FROM audit_entries WHERE subject_kind = 'claim' ORDER BY seq`)).rows
  }, LONG)

  afterAll(async () => {
    await client?.end()
    await installation?.end('SIGTERM')
    data.remove()
  }, LONG)


  it('meet with no fault of the server', () => {
    expect(tally.faults, message()).toEqual([])
    expect(tally.statuses.get(200) ?? 0, message()).toBeGreaterThan(PEOPLE)
  })

  it('take claims all the way, and try what is not allowed', () => {
    const acts = count(entries.map(({ act }) => act))
    for (const act of ['create', 'submit', 'assign', 'accept', 'confirm', 'endorse', 'sign']) expect(acts[`claim.${act}`] ?? 0, `${act}; ${message()}`).toBeGreaterThan(0)
    for (const status of [403, 409]) expect(tally.statuses.get(status) ?? 0, message()).toBeGreaterThan(0)
  })

  it('leave the audit trail whole', () => {
    expect(audited.broken, message()).toBeNull()
    expect(audited.entries).toBeGreaterThanOrEqual(entries.length)
  })

  it('move every claim by allowed moves only, to the state that its row has', async () => {
    const states = new Map<string, ClaimState | null>()
    for (const { seq, subject_id: id, act, detail } of entries) {
      const at = `entry ${seq}, ${act} of ${id}; ${message()}`
      expect(detail.from, at).toBe(states.get(id) ?? null)
      const name = act.replace(/^claim\./, '')
      const free = ['create', 'delete', 'conflict', 'conflict-closed'].includes(name)
      if (!free) expect(leadsTo(name as LifeAct, detail.from!), at).toBe(detail.to)
      states.set(id, detail.to)
    }
    const { rows } = await client.query<{ id: string; state: ClaimState }>('SELECT id, state FROM claims')
    const living = new Map([...states].filter(([, state]) => state !== null))
    expect(new Map(rows.map(({ id, state }) => [id, state])), message()).toEqual(living)
  })

  it('never let anybody judge or sign a claim of their own, nor sign one that they refereed', async () => {
    const { rows } = await client.query(
      `SELECT c.id FROM claims c WHERE c.signed_by = c.author_id
       UNION SELECT s.claim_id FROM assignments s JOIN claims c ON c.id = s.claim_id WHERE s.referee_id = c.author_id
       UNION SELECT c.id FROM claims c JOIN assignments s ON s.claim_id = c.id AND s.referee_id = c.signed_by AND s.verdict IS NOT NULL`,
    )
    expect(rows, message()).toEqual([])
  })

  it('leave one mail in the outbox for each that a committed change told of, and each is sent once', async () => {
    const told = count(entries.flatMap(({ detail }) => detail.told ?? []))
    const mails = async () => (await client.query<{ mail: string; state: string; attempts: number }>(`SELECT template || ':' || member_id AS mail, state, attempts FROM outbox`)).rows
    expect(count((await mails()).map(({ mail }) => mail)), message()).toEqual(told)
    // The worker that was killed may have had one mail in hand; that one waits for its lease to lapse.
    const unsent = async () => (await mails()).filter(({ state }) => state !== 'sent').length
    await expect.poll(unsent, { timeout: 90_000, interval: 500 }).toBeLessThanOrEqual(1)
    expect((await mails()).filter(({ attempts }) => attempts > 1).length, message()).toBeLessThanOrEqual(1)
  })
})
