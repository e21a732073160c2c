import type { Transaction } from 'sequelize'
import { recordAudit } from '../server/audit/record.ts'
import { hashPassword } from '../server/auth/passwords.ts'
import { Group } from '../server/models/group.ts'
import { Member } from '../server/models/member.ts'
import type { Role } from '../shared/permissions.ts'

/** One password for everybody in the demo; the installation listens on this machine only. */
export const DEMO_PASSWORD = 'boundary stone'

/** An invented institute and an invented seminar, with invented people. */
const GROUPS = [
  {
    name: 'Quarrow Institute, Constants',
    members: [
      { name: 'Maren Oldacre', email: 'maren@quarrow.example', roles: ['lead'] },
      { name: 'Tobin Aster', email: 'tobin@quarrow.example', roles: ['researcher'] },
      { name: 'Ilka Venn', email: 'ilka@quarrow.example', roles: ['researcher'] },
      { name: 'Rosamund Peake', email: 'rosamund@quarrow.example', roles: ['referee'] },
      { name: 'Davit Sorrel', email: 'davit@quarrow.example', roles: ['referee'] },
    ],
  },
  {
    name: 'Lindholt Seminar',
    members: [
      { name: 'Henrike Faulds', email: 'henrike@lindholt.example', roles: ['lead', 'researcher'] },
      { name: 'Osric Tamm', email: 'osric@lindholt.example', roles: ['researcher', 'referee'] },
    ],
  },
] satisfies { name: string; members: { name: string; email: string; roles: Role[] }[] }[]

/** Everybody by e-mail address. */
export type DemoPeople = Map<string, Member>

/** For whoever starts the demo: who can sign in. */
export const demoAccounts = (): { email: string; name: string; roles: string[]; group: string }[] =>
  GROUPS.flatMap((group) => group.members.map(({ email, name, roles }) => ({ email, name, roles, group: group.name })))

export async function seedPeople(transaction: Transaction): Promise<DemoPeople> {
  const passwordHash = await hashPassword(DEMO_PASSWORD)
  const people: DemoPeople = new Map()
  for (const { name, members } of GROUPS) {
    const group = await Group.create({ name }, { transaction })
    for (const person of members) {
      const member = await Member.create({ ...person, groupId: group.id, passwordHash }, { transaction })
      people.set(person.email, member)
      await recordAudit(transaction, {
        act: 'member.join',
        actorId: member.id,
        groupId: group.id,
        subject: { kind: 'member', id: member.id, label: member.name },
        detail: { roles: member.roles },
      })
    }
  }
  return people
}
