/**
 * Positions for drawing. What reaches the screen is a pixel, so doubles are enough here; the subtraction that leads to it is
 * exact, since two ends that agree to forty digits differ only beyond a double's reach.
 */

/** log10 of a positive magnitude such as "3.1e-42" or "0.00071"; null for zero. */
export function log10OfText(text: string): number | null {
  const match = /^(\d+)(?:\.(\d+))?(?:e([+-]?\d+))?$/i.exec(text)
  if (!match) return null
  const [, whole = '', fraction = '', exponent = '0'] = match
  const digits = (whole + fraction).replace(/^0+/, '')
  if (digits === '') return null
  const leading = Number(`${digits[0]}.${digits.slice(1, 16)}`)
  return Number(exponent) - fraction.length + digits.length - 1 + Math.log10(leading)
}

/** log10 of a positive integer over a power of ten; null for zero and below. */
export function log10OfScaled(value: bigint, places: number): number | null {
  return value > 0n ? log10OfText(`${value}e-${places}`) : null
}

/** part / whole for drawing, correct to a millionth. */
export function ratio(part: bigint, whole: bigint): number {
  return Number((part * 1_000_000n) / whole) / 1_000_000
}

/** Whole exponents that divide [low, high] into at most `count` steps. */
export function exponentTicks(low: number, high: number, count = 6): number[] {
  const step = Math.max(1, Math.ceil((high - low) / count))
  const ticks: number[] = []
  for (let tick = Math.ceil(low / step) * step; tick <= high; tick += step) ticks.push(tick)
  return ticks
}
