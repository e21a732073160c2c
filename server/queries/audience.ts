import { hasRight } from '../../shared/permissions.ts'
import type { SignedInMember } from '../middleware/request.ts'

/** A member, or a reader without account. */
export type Reader = SignedInMember | undefined

/** Audience of readers without an account, beside the groups, which go by their ids. */
export const PUBLIC = '00000000-0000-0000-0000-000000000000'

/** Whose view of the register somebody gets: their group's, or what is public. */
export const audienceOf = (reader: Reader): string => reader?.groupId ?? PUBLIC

/** The column of register_entries with the state that this reader sees: a pure referee sees of the group's work only what was signed. */
export const stateColumn = (reader: Reader): 'state' | 'entered_state' => (reader && hasRight(reader.roles, 'group-work.read') ? 'state' : 'entered_state')
