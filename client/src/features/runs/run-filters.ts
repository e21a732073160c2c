import type { Query } from '../../lib/api-client.ts'

/** What the address asks of the list of runs. */
export function runListQueryOf(search: URLSearchParams): Query {
  const query: Query = {}
  for (const name of ['state', 'mine', 'constant', 'cursor']) {
    const value = search.get(name)
    if (value !== null && value !== '') query[name] = value
  }
  return query
}
