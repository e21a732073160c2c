import type { Right } from '../../../shared/permissions.ts'
import type { Session } from '../../../shared/schemas/session.ts'
import type { NavigationWord } from './masthead.tsx'
import { paths } from './paths.ts'

/** The words of the navigation that lead somewhere for this reader. */
export function navigationWords(session: Session | undefined): NavigationWord[] {
  const member = session?.member ?? null
  const may = (right: Right) => member?.rights.includes(right) ?? false
  return [
    { label: 'Register', to: paths.register() },
    ...(may('group-work.read') ? [{ label: 'Runs', to: paths.runs(), count: session?.counts.runs }] : []),
    ...(member ? [{ label: 'Desk', to: paths.desk(), count: session?.counts.desk }] : []),
    { label: 'Estimates', to: paths.estimates() },
    ...(member ? [{ label: 'Group', to: paths.group() }] : []),
  ]
}
