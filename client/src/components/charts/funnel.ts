import { scaleEnclosure } from '../../../../shared/digits.ts'
import type { ConvergencePoint } from './convergence.tsx'
import { log10OfScaled } from './scale.ts'

export interface FunnelPoint {
  at: number
  /** log10 of how far the upper end is above, and the lower end below, the last middle; null when on its wrong side or on it. */
  above: number | null
  below: number | null
}

/** Distances of both ends from the middle of the last enclosure, subtracted exactly. */
export function funnel(points: ConvergencePoint[]): FunnelPoint[] {
  const last = points.at(-1)
  if (!last) return []
  const places = Math.max(...points.map((point) => scaleEnclosure(point.lo, point.hi).places)) + 1
  const at = (text: string) => {
    const { low, places: own } = scaleEnclosure(text, text)
    return low * 10n ** BigInt(places - own)
  }
  const middle = (at(last.lo) + at(last.hi)) / 2n
  return points.map((point) => ({ at: Number(point.at), above: log10OfScaled(at(point.hi) - middle, places), below: log10OfScaled(middle - at(point.lo), places) }))
}
