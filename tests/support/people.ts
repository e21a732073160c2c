import { randomBytes } from 'node:crypto'
import bcrypt from 'bcryptjs'
import type { Express } from 'express'
import request from 'supertest'
import type { Role } from '../../shared/permissions.ts'
import { createApp } from '../../server/app.ts'
import { change, selectOne } from '../../server/db.ts'

/** Everybody's password in the tests, hashed once and cheaply. */
export const PASSWORD = 'a stone between two fields'
const HASH = bcrypt.hashSync(PASSWORD, 4)

export interface TestGroup {
  id: string
  name: string
}

export interface TestMember {
  id: string
  groupId: string
  name: string
  email: string
  roles: Role[]
}

const unique = (): string => randomBytes(5).toString('hex')

/** A group with the rules given; columns of the table by name, e.g. `{ confirmations_needed: 2 }`. */
export async function makeGroup(rules: Record<string, unknown> = {}): Promise<TestGroup> {
  const columns = Object.entries({ name: `Group ${unique()}`, ...rules })
  const [group] = await change<TestGroup>(
    `INSERT INTO groups (${columns.map(([column]) => column).join(', ')}) VALUES (${columns.map(([column]) => `$${column}`).join(', ')}) RETURNING id, name`,
    Object.fromEntries(columns),
  )
  return group!
}

/** An active member; without a group a new one is made. */
export async function makeMember({ roles = ['researcher'], group, name }: { roles?: Role[]; group?: TestGroup; name?: string } = {}): Promise<TestMember> {
  const home = group ?? (await makeGroup())
  const [row] = await change<{ id: string; name: string; email: string }>(
    'INSERT INTO members (group_id, email, name, password_hash, roles) VALUES ($groupId, $email, $name, $hash, $roles) RETURNING id, name, email',
    { groupId: home.id, email: `${unique()}@merestone.test`, name: name ?? `Person ${unique()}`, hash: HASH, roles },
  )
  return { ...row!, groupId: home.id, roles }
}

export type Agent = ReturnType<typeof request.agent>

/** A browser, so to speak: keeps its cookies and sends the header that our pages send. */
export function browser(app: Express = createApp()): Agent {
  return request.agent(app).set('X-Merestone', '1')
}

/** A browser in which this member has signed in. */
export async function signedInAs(member: TestMember, app: Express = createApp()): Promise<Agent> {
  const agent = browser(app)
  await agent.post('/api/v1/session').send({ email: member.email, password: PASSWORD }).expect(200)
  return agent
}

/** The text of the last mail written to an address, or undefined. */
export async function lastMailTo(email: string): Promise<{ subject: string; text: string; template: string } | undefined> {
  return selectOne('SELECT subject, text, template FROM outbox WHERE recipient_email = $email ORDER BY created_at DESC, id LIMIT 1', { email })
}
