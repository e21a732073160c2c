import { CartesianGrid, Line, LineChart, ReferenceLine, ResponsiveContainer, XAxis, YAxis } from 'recharts'
import type { ConvergencePoint } from './convergence.tsx'
import { funnel } from './funnel.ts'
import { PowerTick } from './power.tsx'
import { exponentTicks } from './scale.ts'
import { AXIS_LINE, axisLabel, CERTAIN, INK, MARGIN, RULE, TICK, UNDECIDED } from './theme.ts'

export default function ConvergencePlot({ points, unit }: { points: ConvergencePoint[]; unit: string }) {
  const distances = funnel(points)
  const logs = distances.flatMap((point) => [point.above, point.below].filter((log) => log !== null))
  if (logs.length === 0) return <p className="py-6">The enclosure is a single number.</p>
  // The centre line stands for the smallest distance there is, one decade further in.
  const floor = Math.floor(Math.min(...logs)) - 1
  const reach = Math.ceil(Math.max(...logs)) - floor
  const data = distances.map(({ at, above, below }) => ({ at, upper: above === null ? 0 : above - floor, lower: below === null ? 0 : floor - below }))
  const decades = exponentTicks(floor + reach * 0.15, floor + reach, 4).map((tick) => tick - floor)
  const read = (height: number) => (height === 0 ? '0' : { prefix: height > 0 ? '+' : '−', exponent: Math.abs(height) + floor })
  const ats = data.map((point) => point.at)
  const logarithmic = Math.max(...ats) / Math.max(1, Math.min(...ats)) > 50
  return (
    <ResponsiveContainer width="100%" height={320}>
      <LineChart data={data} margin={MARGIN} accessibilityLayer={false}>
        <CartesianGrid horizontal vertical={false} stroke={RULE} />
        <XAxis dataKey="at" type="number" scale={logarithmic ? 'log' : 'linear'} domain={logarithmic ? ['dataMin', 'dataMax'] : [0, 'auto']} tickFormatter={(at: number) => at.toLocaleString('en-GB')} tick={TICK} tickLine={AXIS_LINE} axisLine={AXIS_LINE} label={axisLabel(unit, 'below')} minTickGap={30} />
        <YAxis type="number" domain={[-reach, reach]} ticks={[...decades.map((height) => -height).reverse(), 0, ...decades]} interval={0} tick={<PowerTick read={read} />} tickLine={false} axisLine={AXIS_LINE} width={78} label={axisLabel('distance from the middle', 'left')} />
        <ReferenceLine y={0} stroke={INK} />
        <Line type="linear" dataKey="upper" stroke={CERTAIN} strokeWidth={2} dot={{ r: 2.5, fill: CERTAIN }} isAnimationActive={false} />
        <Line type="linear" dataKey="lower" stroke={UNDECIDED} strokeWidth={2} strokeDasharray="6 4" dot={{ r: 2.5, fill: UNDECIDED, strokeDasharray: 'none' }} isAnimationActive={false} />
      </LineChart>
    </ResponsiveContainer>
  )
}
