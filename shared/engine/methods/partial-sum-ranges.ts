/** The integers n with lo < n <= hi: the work of one shard. */
export interface Range {
  lo: number
  hi: number
  /** Whether the enclosure is worth showing at hi. */
  mark: boolean
}

/** Integers in one shard: about a tenth of a second of sieving. */
const LONGEST = 2 ** 26
/** No more shards than this, so that their results stay small. */
const MOST_SHARDS = 1_024

/**
 * Cuts (0, cutoff] at 1 and 3 times the powers of ten from 10^4 on, where the enclosure is shown, and further into pieces
 * that a worker can take. A function of the cut-off alone, so that results computed elsewhere fit.
 */
export function cutIntoRanges(cutoff: number, longest: number = LONGEST): Range[] {
  const ends: number[] = []
  for (let power = 10_000; power < cutoff; power *= 10) ends.push(power, 3 * power)
  const marks = [...ends.filter((end) => end < cutoff), cutoff]
  const stride = Math.max(longest, Math.ceil(cutoff / MOST_SHARDS))
  return marks.flatMap((end, i) => {
    const start = i === 0 ? 0 : marks[i - 1]
    const pieces = Math.ceil((end - start) / stride)
    const edge = (piece: number): number => start + Math.floor(((end - start) / pieces) * piece)
    return Array.from({ length: pieces }, (_, piece) => ({
      lo: piece === 0 ? start : edge(piece),
      hi: piece === pieces - 1 ? end : edge(piece + 1),
      mark: piece === pieces - 1,
    }))
  })
}
