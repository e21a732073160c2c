import { useQuery } from '@tanstack/react-query'
import { useEffect, useRef } from 'react'
import { Navigate, Outlet, ScrollRestoration, useLocation, useMatches, useNavigate, useNavigation } from 'react-router-dom'
import { sessionQuery, useSignOut } from '../features/session/queries.ts'
import { Colophon } from './colophon.tsx'
import { Masthead } from './masthead.tsx'
import { navigationWords } from './navigation.ts'
import { paths } from './paths.ts'
import { SkipLink } from './skip-link.tsx'

/** What a route may say of itself. */
export interface RouteHandle {
  /** Only for members: others are asked to sign in and then brought back. */
  membersOnly?: boolean
}

/** The frame of every page. */
export function Shell() {
  const { data: session } = useQuery(sessionQuery())
  const navigate = useNavigate()
  const location = useLocation()
  const turning = useNavigation().state === 'loading'
  const signOut = useSignOut()
  const membersOnly = useMatches().some((match) => (match.handle as RouteHandle | undefined)?.membersOnly)
  useFocusOnNewPage(location.pathname)

  const leave = () => signOut.mutate(undefined, { onSuccess: () => void navigate(paths.register()) })
  return (
    <>
      <SkipLink />
      <Masthead
        words={navigationWords(session)}
        person={session?.member ? { name: session.member.name, group: session.member.group.name } : null}
        onSearch={location.pathname === paths.register() ? null : (text) => void navigate(paths.register({ text }))}
        onAccount={() => void navigate(paths.account())}
        onSignOut={leave}
      />
      <div className={turning ? 'opacity-60 transition-opacity delay-300' : undefined} aria-busy={turning || undefined}>
        {membersOnly && session?.member === null ? <Navigate to={paths.signIn(location.pathname + location.search)} replace /> : <Outlet />}
      </div>
      <Colophon />
      <ScrollRestoration getKey={({ pathname, search }) => pathname + search} />
    </>
  )
}

/** After a change of page the keyboard and the screen reader go on at its beginning, not where the link was. */
function useFocusOnNewPage(pathname: string): void {
  const seen = useRef(pathname)
  useEffect(() => {
    if (seen.current === pathname) return
    seen.current = pathname
    document.getElementById('main')?.focus({ preventScroll: true })
  }, [pathname])
}
