import type { Query } from '../../lib/api-client.ts'

/** Filters and sorting of the register, by the names that they have in the address and at the API. */
export const REGISTER_FILTERS = ['text', 'set', 'k', 'power', 'logPower', 'exclude', 'state', 'minDigits', 'group', 'sort', 'order'] as const
export type RegisterFilter = (typeof REGISTER_FILTERS)[number]

/** What the address asks of the register; anything else in it is left out. */
export function registerQueryOf(search: URLSearchParams): Query {
  const query: Query = {}
  for (const name of [...REGISTER_FILTERS, 'cursor']) {
    const value = search.get(name)
    if (value !== null && value !== '') query[name] = value
  }
  return query
}

/** Filters that are set, sorting aside: whether an empty page means an empty register or a filter that fits nothing. */
export function isFiltered(query: Query): boolean {
  return REGISTER_FILTERS.some((name) => name !== 'sort' && name !== 'order' && query[name] !== undefined)
}
