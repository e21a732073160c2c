/** Numbers that begin with these digits, truncated, or round to them. */
export function leadingDigits(digits: string): [lo: string, hi: string] {
  const [whole, part = ''] = digits.replace('-', '').split('.')
  const scaled = BigInt(whole + part) * 2n
  const write = (half: bigint): string => {
    const tenths = (half * 5n).toString().padStart(part.length + 2, '0')
    return `${tenths.slice(0, -part.length - 1)}.${tenths.slice(-part.length - 1)}`
  }
  // Truncated digits allow a whole unit upwards, rounded ones half a unit each way.
  const [low, high] = [scaled > 0n ? scaled - 1n : 0n, scaled + 2n]
  return digits.startsWith('-') ? [`-${write(high)}`, `-${write(low)}`] : [write(low), write(high)]
}
