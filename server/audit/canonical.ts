/** What can be written as JSON. */
export type Json = null | boolean | number | string | Json[] | { [key: string]: Json }

/**
 * JSON with one spelling: keys sorted by code unit, no white space, undefined members left out. The same content always gives
 * the same text, whatever the database did to the order of keys.
 */
export function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map((item) => canonicalJson(item ?? null)).join(',')}]`
  if (value !== null && typeof value === 'object') {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
    return `{${members.map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`).join(',')}}`
  }
  const text = JSON.stringify(value)
  if (text === undefined || (typeof value === 'number' && !Number.isFinite(value))) throw new TypeError('not a JSON value')
  return text
}
