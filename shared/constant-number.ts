/** Register numbers: constants are MST-0042, claims MST-0042/1, written MST-0042-1 in an address. */

const CONSTANT = /^MST-(\d{4,9})$/
const CLAIM = /^MST-(\d{4,9})[/-](\d{1,6})$/

/** MST-0042 for 42. */
export function constantNumberText(number: number): string {
  return `MST-${String(number).padStart(4, '0')}`
}

/** 42 for MST-0042; null where the text is no register number of a constant. */
export function parseConstantNumber(text: string): number | null {
  const match = CONSTANT.exec(text)
  const number = Number(match?.[1] ?? 0)
  // Only the one spelling counts, so that a page has one address: not MST-00042.
  return number > 0 && constantNumberText(number) === text ? number : null
}

/** MST-0042/1 for the first claim of constant 42. */
export function claimNumberText(number: number, ordinal: number): string {
  return `${constantNumberText(number)}/${ordinal}`
}

/** MST-0042-1, the form of a claim's number that goes into an address. */
export function claimSlug(number: number, ordinal: number): string {
  return `${constantNumberText(number)}-${ordinal}`
}

/** Reads MST-0042/1 or MST-0042-1; null where the text is neither. */
export function parseClaimNumber(text: string): { number: number; ordinal: number } | null {
  const match = CLAIM.exec(text)
  if (!match) return null
  const number = Number(match[1])
  const ordinal = Number(match[2])
  return number > 0 && ordinal > 0 && constantNumberText(number) === `MST-${match[1]}` && String(ordinal) === match[2] ? { number, ordinal } : null
}
