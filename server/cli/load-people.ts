import bcrypt from 'bcryptjs'
import type { Role } from '../../shared/permissions.ts'
import { change } from '../db.ts'

export const PASSWORD = 'a load that can be borne'

export interface LoadMember {
  id: string
  name: string
  email: string
  roles: Role[]
}

export interface LoadGroup {
  id: string
  public: boolean
  members: LoadMember[]
  researchers: LoadMember[]
  referees: LoadMember[]
  lead: LoadMember
}

/** What each of a group's members does: one lead, referees, researchers, and people of two trades. */
const ROLES: Role[][] = [['lead'], ['lead', 'researcher'], ['referee'], ['referee'], ['researcher', 'referee'], ['researcher'], ['researcher'], ['researcher'], ['researcher'], ['researcher']]

/** Groups with their members; every third keeps its claims to itself. Made through the application's own tables, so that passwords work. */
export async function makePeople(groups: number): Promise<LoadGroup[]> {
  const hash = bcrypt.hashSync(PASSWORD, 4)
  const made: LoadGroup[] = []
  for (let index = 0; index < groups; index += 1) {
    const isPublic = index % 3 !== 2
    const [group] = await change<{ id: string }>('INSERT INTO groups (name, confirmations_needed, public) VALUES ($name, $confirmations, $isPublic) RETURNING id', { name: `Load group ${index + 1}`, confirmations: 1 + (index % 2), isPublic })
    const members: LoadMember[] = []
    for (const [place, roles] of ROLES.entries()) {
      const name = `Reader ${String.fromCharCode(65 + index)}${place}`
      const email = `reader-${index}-${place}@load.test`
      const [row] = await change<{ id: string }>('INSERT INTO members (group_id, email, name, password_hash, roles) VALUES ($group, $email, $name, $hash, $roles) RETURNING id', { group: group!.id, email, name, hash, roles })
      members.push({ id: row!.id, name, email, roles })
    }
    const withRole = (role: Role) => members.filter(({ roles }) => roles.includes(role))
    made.push({ id: group!.id, public: isPublic, members, researchers: withRole('researcher'), referees: withRole('referee'), lead: members[0]! })
  }
  return made
}
