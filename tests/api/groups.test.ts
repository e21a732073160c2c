import { describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { select } from '../../server/db.ts'
import { makeGroup, makeMember, signedInAs } from '../support/people.ts'

const app = createApp()

describe("a group's rules", () => {
  it('are shown to its members with what each may do', async () => {
    const group = await makeGroup()
    const asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
    const asReferee = await signedInAs(await makeMember({ roles: ['referee'], group }), app)
    expect((await asLead.get('/api/v1/group').expect(200)).body).toEqual({
      id: group.id,
      name: group.name,
      confirmationsNeeded: 1,
      recheckNeeded: true,
      reminderDays: 7,
      public: true,
      abilities: { setRules: true, manageMembers: true, readAudit: true, manageOutbox: true, leave: true },
    })
    expect((await asReferee.get('/api/v1/group').expect(200)).body.abilities).toMatchObject({ setRules: false, manageMembers: false })
  })

  it('are set by a lead; the trail names each that changed, and no other', async () => {
    const group = await makeGroup()
    const asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
    const changed = await asLead.patch('/api/v1/group').send({ confirmationsNeeded: 2, public: true }).expect(200)
    expect(changed.body).toMatchObject({ confirmationsNeeded: 2, recheckNeeded: true, public: true })
    await asLead.patch('/api/v1/group').send({ confirmationsNeeded: 2 }).expect(200)
    const entries = await select<{ detail: object }>(`SELECT detail FROM audit_entries WHERE act = 'group.rules' AND subject_id = $id`, { id: group.id })
    expect(entries).toEqual([{ detail: { from: { confirmationsNeeded: 1 }, to: { confirmationsNeeded: 2 } } }])
  })
})
