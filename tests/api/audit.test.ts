import pg from 'pg'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { recordAudit } from '../../server/audit/record.ts'
import { inTransaction } from '../../server/db.ts'
import { checkAudit } from '../../server/queries/audit.ts'
import { makeGroup, makeMember, signedInAs, type Agent, type TestGroup, type TestMember } from '../support/people.ts'
import { databaseUrls } from '../support/test-database.ts'

const app = createApp()

async function asRole<T>(url: string, work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    return await work(client)
  } finally {
    await client.end()
  }
}

describe('the audit trail', () => {
  let group: TestGroup
  let lead: TestMember
  let asLead: Agent
  beforeAll(async () => {
    group = await makeGroup()
    lead = await makeMember({ roles: ['lead'], group, name: 'Wanda "W", of the trail' })
    asLead = await signedInAs(lead, app)
  })

  const write = (act: string, reason = 'because') =>
    inTransaction((transaction) =>
      recordAudit(transaction, {
        act, actorId: lead.id, groupId: group.id, subject: { kind: 'claim', id: act, label: 'MST-0001/1' }, reason, detail: { z: 1, a: ['ü', null, 1.5, { nested: true }] },
      }),
    )

  it('stays one unbroken chain under thirty writers at once', async () => {
    const before = (await checkAudit()).entries
    await Promise.all(Array.from({ length: 30 }, (_, index) => write(`test.${index}`)))
    expect(await checkAudit()).toMatchObject({ entries: before + 30, broken: null })
  })

  it('holds nothing of a transaction that was undone', async () => {
    const before = (await checkAudit()).entries
    await inTransaction(async (transaction) => {
      await recordAudit(transaction, { act: 'test.undone', actorId: null, groupId: group.id, subject: { kind: 'claim', id: 'x' } })
      throw new Error('undone')
    }).catch(() => undefined)
    expect(await checkAudit()).toMatchObject({ entries: before, broken: null })
  })

  it('is filtered and paged; a cursor of other filters is refused', async () => {
    await Promise.all([write('page.one', 'needle'), write('page.two'), write('page.three')])
    const first = (await asLead.get('/api/v1/audit').query({ act: 'page', limit: 2 }).expect(200)).body
    expect(first.items).toHaveLength(2)
    const second = (await asLead.get('/api/v1/audit').query({ act: 'page', limit: 2, cursor: first.next }).expect(200)).body
    expect(second.items).toHaveLength(1)
    expect(second.next).toBeNull()
    expect(new Set([...first.items, ...second.items].map((entry: { act: string }) => entry.act))).toEqual(new Set(['page.one', 'page.two', 'page.three']))
    await asLead.get('/api/v1/audit').query({ act: 'test', cursor: first.next }).expect(400)
    const found = (await asLead.get('/api/v1/audit').query({ text: 'needle', actor: lead.id, subjectKind: 'claim' }).expect(200)).body
    expect(found.items.map((entry: { act: string }) => entry.act)).toEqual(['page.one'])
    expect((await asLead.get('/api/v1/audit').query({ act: '%' }).expect(200)).body.items).toEqual([])
  })

  it("shows a lead their own group's entries only", async () => {
    await write('own.entry')
    const other = await signedInAs(await makeMember({ roles: ['lead'] }), app)
    expect((await other.get('/api/v1/audit').expect(200)).body.items).toEqual([])
    expect((await other.get('/api/v1/audit/export').responseType('blob').expect(200)).body.toString()).toBe('')
  })

  it('is exported as JSON lines and as CSV, whole', async () => {
    await write('export.me', '=1+1, "quoted"\nsecond line')
    const lines = (await asLead.get('/api/v1/audit/export').query({ act: 'export' }).responseType('blob').expect(200)).body.toString('utf8').trim().split('\n')
    expect(lines.map((line: string) => JSON.parse(line).reason)).toEqual(['=1+1, "quoted"\nsecond line'])
    const csv = await asLead.get('/api/v1/audit/export').query({ act: 'export', format: 'csv' }).expect(200)
    expect(csv.headers['content-disposition']).toMatch(/^attachment; filename="?audit-trail.csv/)
    expect(csv.text).toContain(`"'=1+1, ""quoted""\nsecond line"`)
  })

  it('cannot be changed: not by the role of the product, and not by the owner of the table', async () => {
    for (const statement of ["UPDATE audit_entries SET act = 'x'", 'DELETE FROM audit_entries', 'TRUNCATE audit_entries']) {
      await expect(asRole(databaseUrls.application, (client) => client.query(statement)), statement).rejects.toThrow(/permission denied/)
      await expect(asRole(databaseUrls.owner, (client) => client.query(statement)), statement).rejects.toThrow(/append-only/)
    }
    await expect(asRole(databaseUrls.application, (client) => client.query('ALTER TABLE audit_entries DISABLE TRIGGER ALL'))).rejects.toThrow(/must be owner/)
  })

  it('names the first entry that somebody with power over the database has changed', async () => {
    await write('last.one')
    const tamper = (statement: string) =>
      asRole(databaseUrls.owner, async (client) => {
        await client.query('ALTER TABLE audit_entries DISABLE TRIGGER audit_entries_append_only')
        await client.query(statement)
        await client.query('ALTER TABLE audit_entries ENABLE TRIGGER audit_entries_append_only')
      })
    expect((await asLead.get('/api/v1/audit/check').expect(200)).body.broken).toBeNull()
    await tamper(`UPDATE audit_entries SET reason = 'a better reason' WHERE seq = 7`)
    expect((await asLead.get('/api/v1/audit/check').expect(200)).body).toMatchObject({ entries: 6, broken: { seq: 7 } })
    await tamper('DELETE FROM audit_entries WHERE seq = 3')
    expect((await checkAudit()).broken).toEqual({ seq: 4, reason: 'entry 3 is missing' })
  })
})
