import type { Json } from '../methods/computation.ts'

/**
 * JSON text by RFC 8785 (JSON Canonicalization Scheme): no spaces, members sorted by their names' UTF-16 code units, numbers
 * and strings as ECMAScript writes them. Two programs that agree on the data agree on the bytes, and so on the digest.
 */
export function canonicalJson(value: Json): string {
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`
  if (value !== null && typeof value === 'object') {
    const members = Object.keys(value).sort().map((name) => `${JSON.stringify(name)}:${canonicalJson(value[name])}`)
    return `{${members.join(',')}}`
  }
  if (typeof value === 'number' && !Number.isFinite(value)) throw new RangeError('a number that JSON does not have')
  return JSON.stringify(value)
}

/** SHA-256 of a text's UTF-8 bytes, in hexadecimal; the same in Node and in a browser. */
export async function sha256Hex(text: string): Promise<string> {
  const hash = await globalThis.crypto.subtle.digest('SHA-256', new TextEncoder().encode(text))
  return [...new Uint8Array(hash)].map((byte) => byte.toString(16).padStart(2, '0')).join('')
}
