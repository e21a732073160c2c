/** A power of ten inside a drawing, its exponent raised; `prefix` is a sign or a multiplication cross. */
export function SvgPower({ exponent, prefix = '' }: { exponent: number; prefix?: string }) {
  return (
    <>
      {prefix}10
      <tspan dy="-0.5em" fontSize="0.72em">
        {exponentText(exponent)}
      </tspan>
    </>
  )
}

/** A power of ten in running text. */
export function Power({ exponent, factor }: { exponent: number; factor?: string }) {
  return (
    <span className="whitespace-nowrap">
      {factor && `${factor} · `}10<sup className="text-[0.7em] leading-none">{exponentText(exponent)}</sup>
    </span>
  )
}

function exponentText(exponent: number): string {
  return String(Math.round(exponent)).replace('-', '−')
}

interface PowerTickProps {
  /** Set by the chart. */
  x?: number | string
  y?: number | string
  payload?: { value: number }
  textAnchor?: 'start' | 'middle' | 'end'
  /** What the tick stands for: an exponent with its prefix, or a plain word. */
  read: (value: number) => { exponent: number; prefix?: string } | string
  below?: boolean
}

/** A tick of a logarithmic axis. */
export function PowerTick({ x, y, payload, textAnchor, read, below }: PowerTickProps) {
  const label = read(payload?.value ?? 0)
  return (
    <text x={x} y={y} dy={below ? '0.9em' : '0.36em'} textAnchor={textAnchor} fill="var(--color-soft)" fontSize={13}>
      {typeof label === 'string' ? label : <SvgPower {...label} />}
    </text>
  )
}
