import { NavLink } from 'react-router-dom'
import type { Group } from '../../../../../shared/schemas/group.ts'
import { paths } from '../../../app/paths.ts'
import { classNames } from '../../../lib/class-names.ts'

/** Name of the group and, below it, its pages that are open to this reader. */
export function GroupHead({ group }: { group: Group | undefined }) {
  const pages: [label: string, to: string, open: boolean][] = [
    ['Members and rules', paths.group(), true],
    ['Audit trail', paths.groupAudit(), group?.abilities.readAudit ?? false],
    ['Outgoing mail', paths.groupMail(), group?.abilities.manageOutbox ?? false],
    ['Keys', paths.groupKeys(), true],
  ]
  return (
    <>
      <h1>{group?.name ?? 'Group'}</h1>
      <nav aria-label="Pages of the group" className="mt-3 print:hidden">
        <ul className="flex flex-wrap gap-x-6 gap-y-1">
          {pages.map(([label, to, open]) =>
            open ? (
              <li key={to}>
                <NavLink
                  to={to}
                  end
                  className={({ isActive }) =>
                    classNames('underline-offset-[0.3em]', isActive ? 'underline decoration-certain decoration-2' : 'text-soft no-underline hover:text-ink hover:underline')
                  }
                >
                  {label}
                </NavLink>
              </li>
            ) : null,
          )}
        </ul>
      </nav>
    </>
  )
}
