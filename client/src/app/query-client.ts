import { QueryCache, QueryClient } from '@tanstack/react-query'
import { sessionKeys } from '../features/session/queries.ts'
import { ApiError, isSignedOut } from '../lib/errors.ts'

/** Refusals are final; only an unreachable or broken server is asked again. */
function worthAnotherTry(failures: number, error: unknown): boolean {
  return failures < 2 && error instanceof ApiError && (error.status === 0 || error.status >= 502)
}

/** The one place where server data lives. A 401 anywhere means that the session has ended: it is read anew. */
export function createQueryClient(): QueryClient {
  const client: QueryClient = new QueryClient({
    defaultOptions: { queries: { staleTime: 5_000, retry: worthAnotherTry }, mutations: { retry: false } },
    queryCache: new QueryCache({
      onError: (error, query) => {
        if (isSignedOut(error) && query.queryKey[0] !== sessionKeys.all[0]) void client.invalidateQueries({ queryKey: sessionKeys.all })
      },
    }),
  })
  return client
}
