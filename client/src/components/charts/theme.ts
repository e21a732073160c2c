/** The one look of all charts: ink on paper, hairline axes, numbers in the text face. */
export const INK = 'var(--color-ink)'
export const SOFT = 'var(--color-soft)'
export const RULE = 'var(--color-rule)'
export const CERTAIN = 'var(--color-certain)'
export const UNDECIDED = 'var(--color-undecided)'
export const REFUSED = 'var(--color-refused)'

export const TICK = { fill: SOFT, fontSize: 13, fontFamily: 'var(--font-serif)' }
export const AXIS_LINE = { stroke: INK, strokeWidth: 1 }
export const MARGIN = { top: 12, right: 18, bottom: 28, left: 8 }

/** The name and unit of an axis, set below it or along it. */
export function axisLabel(value: string, side: 'below' | 'left') {
  return side === 'below'
    ? { value, position: 'insideBottom' as const, offset: -18, fill: SOFT, fontSize: 13, fontStyle: 'italic' }
    : { value, angle: -90, position: 'insideLeft' as const, offset: 4, fill: SOFT, fontSize: 13, fontStyle: 'italic', style: { textAnchor: 'middle' as const } }
}

/** Box of a tooltip. */
export const TIP = 'border border-ink bg-leaf px-2.5 py-1.5 text-[0.88rem] leading-snug text-ink'
