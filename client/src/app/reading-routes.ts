import type { QueryClient } from '@tanstack/react-query'
import type { RouteObject } from 'react-router-dom'
import { estimateQuery, estimatesQuery } from '../features/estimates/queries.ts'
import { keysQuery } from '../features/keys/queries.ts'
import type { Prefetch } from './prefetch.ts'

/** Pages for every reader, with or without an account: estimates, digits, certificates, keys, help. */
export function readingRoutes(client: QueryClient, prefetch: Prefetch): RouteObject[] {
  return [
    {
      path: 'estimates',
      loader: prefetch(() => client.prefetchQuery(estimatesQuery())),
      lazy: async () => ({ Component: (await import('../pages/estimates/estimates-page.tsx')).EstimatesPage }),
    },
    {
      path: 'estimates/:id',
      loader: prefetch(({ params }) => client.prefetchQuery(estimateQuery(params.id ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/estimate/estimate-page.tsx')).EstimatePage }),
    },
    { path: 'digit-check', lazy: async () => ({ Component: (await import('../pages/digit-check/digit-check-page.tsx')).DigitCheckPage }) },
    { path: 'look-up', lazy: async () => ({ Component: (await import('../pages/look-up/look-up-page.tsx')).LookUpPage }) },
    {
      path: 'keys',
      loader: prefetch(() => client.prefetchQuery(keysQuery())),
      lazy: async () => ({ Component: (await import('../pages/keys/keys-page.tsx')).KeysPage }),
    },
    { path: 'verify', lazy: async () => ({ Component: (await import('../pages/verify/verify-page.tsx')).VerifyPage }) },
    { path: 'programs', lazy: async () => ({ Component: (await import('../pages/programs/programs-page.tsx')).ProgramsPage }) },
    { path: 'about', lazy: async () => ({ Component: (await import('../pages/about/about-page.tsx')).AboutPage }) },
  ]
}
