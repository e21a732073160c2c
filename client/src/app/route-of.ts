import { PAGES } from '../../../shared/pages.ts'
import type { PageName } from '../../../shared/pages.ts'
import type { RouteHandle } from './shell.tsx'

/** What the router takes from the list of pages: the address, and whether the page is for members only. */
export function routeOf(name: PageName): { path: string; handle: RouteHandle } {
  const { path, access } = PAGES[name]
  return { path, handle: { membersOnly: access === 'members' } }
}
