import type { QueryClient } from '@tanstack/react-query'
import type { RouteObject } from 'react-router-dom'
import { estimateQuery, estimatesQuery } from '../features/estimates/queries.ts'
import { keysQuery } from '../features/keys/queries.ts'
import type { Prefetch } from './prefetch.ts'
import { routeOf } from './route-of.ts'

/** Pages for every reader, with or without an account: estimates, digits, certificates, keys, help. */
export function readingRoutes(client: QueryClient, prefetch: Prefetch): RouteObject[] {
  return [
    {
      ...routeOf('estimates'),
      loader: prefetch(() => client.prefetchQuery(estimatesQuery())),
      lazy: async () => ({ Component: (await import('../pages/estimates/estimates-page.tsx')).EstimatesPage }),
    },
    {
      ...routeOf('estimate'),
      loader: prefetch(({ params }) => client.prefetchQuery(estimateQuery(params.id ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/estimate/estimate-page.tsx')).EstimatePage }),
    },
    { ...routeOf('digitCheck'), lazy: async () => ({ Component: (await import('../pages/digit-check/digit-check-page.tsx')).DigitCheckPage }) },
    { ...routeOf('lookUp'), lazy: async () => ({ Component: (await import('../pages/look-up/look-up-page.tsx')).LookUpPage }) },
    {
      ...routeOf('keys'),
      loader: prefetch(() => client.prefetchQuery(keysQuery())),
      lazy: async () => ({ Component: (await import('../pages/keys/keys-page.tsx')).KeysPage }),
    },
    { ...routeOf('verify'), lazy: async () => ({ Component: (await import('../pages/verify/verify-page.tsx')).VerifyPage }) },
    { ...routeOf('programs'), lazy: async () => ({ Component: (await import('../pages/programs/programs-page.tsx')).ProgramsPage }) },
    { ...routeOf('about'), lazy: async () => ({ Component: (await import('../pages/about/about-page.tsx')).AboutPage }) },
  ]
}
