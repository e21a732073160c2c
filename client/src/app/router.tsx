import type { QueryClient } from '@tanstack/react-query'
import { createBrowserRouter } from 'react-router-dom'
import type { RouteObject } from 'react-router-dom'
import { claimQuery } from '../features/claims/queries.ts'
import { constantListQuery, constantQuery } from '../features/constants/queries.ts'
import { registerQueryOf } from '../features/constants/register-filters.ts'
import { deskQuery } from '../features/desk/queries.ts'
import { runListQuery, runQuery } from '../features/runs/queries.ts'
import { runListQueryOf } from '../features/runs/run-filters.ts'
import { sessionQuery } from '../features/session/queries.ts'
import { peopleRoutes } from './people-routes.ts'
import type { Prefetch } from './prefetch.ts'
import { routeOf } from './route-of.ts'
import { RouteError } from './route-error.tsx'
import { readingRoutes } from './reading-routes.ts'
import { Shell } from './shell.tsx'

/**
 * All routes. A page's code comes when it is first opened; its data is asked for at the same time and not waited for, since
 * each view shows by itself what it is still missing.
 */
export function createRouter(client: QueryClient) {
  const prefetch: Prefetch = (start) => ({ params, request }) => {
    void start({ params, search: new URL(request.url).searchParams })
    return null
  }

  const pages: RouteObject[] = [
    { index: true, lazy: async () => ({ Component: (await import('../pages/home/home-page.tsx')).HomePage }) },
    {
      ...routeOf('register'),
      loader: prefetch(({ search }) => client.prefetchQuery(constantListQuery(registerQueryOf(search)))),
      lazy: async () => ({ Component: (await import('../pages/register/register-page.tsx')).RegisterPage }),
    },
    {
      ...routeOf('constant'),
      loader: prefetch(({ params }) => client.prefetchQuery(constantQuery(params.number ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/constant/constant-page.tsx')).ConstantPage }),
    },
    {
      ...routeOf('runs'),
      loader: prefetch(({ search }) => client.prefetchQuery(runListQuery(runListQueryOf(search)))),
      lazy: async () => ({ Component: (await import('../pages/runs/runs-page.tsx')).RunsPage }),
    },
    { ...routeOf('newRun'), lazy: async () => ({ Component: (await import('../pages/new-run/new-run-page.tsx')).NewRunPage }) },
    {
      ...routeOf('run'),
      loader: prefetch(({ params }) => client.prefetchQuery(runQuery(params.id ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/run/run-page.tsx')).RunPage }),
    },
    { ...routeOf('newClaim'), lazy: async () => ({ Component: (await import('../pages/new-claim/new-claim-page.tsx')).NewClaimPage }) },
    { ...routeOf('importDigits'), lazy: async () => ({ Component: (await import('../pages/import/import-page.tsx')).ImportPage }) },
    {
      ...routeOf('claim'),
      loader: prefetch(({ params }) => client.prefetchQuery(claimQuery(params.id ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/claim/claim-page.tsx')).ClaimPage }),
    },
    {
      ...routeOf('desk'),
      loader: prefetch(() => client.prefetchQuery(deskQuery())),
      lazy: async () => ({ Component: (await import('../pages/desk/desk-page.tsx')).DeskPage }),
    },
    { ...routeOf('signIn'), lazy: async () => ({ Component: (await import('../pages/sign-in/sign-in-page.tsx')).SignInPage }) },
    ...peopleRoutes(client, prefetch),
    ...readingRoutes(client, prefetch),
    { path: '*', lazy: async () => ({ Component: (await import('../pages/not-found/not-found-page.tsx')).NotFoundPage }) },
  ]

  return createBrowserRouter([
    {
      path: '/',
      Component: Shell,
      ErrorBoundary: RouteError,
      loader: prefetch(() => client.prefetchQuery(sessionQuery())),
      HydrateFallback: () => null,
      children: [{ ErrorBoundary: RouteError, children: pages }],
    },
  ])
}
