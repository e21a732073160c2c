import { Bar, BarChart, Cell, ResponsiveContainer, XAxis, YAxis } from 'recharts'
import type { BudgetLine } from './error-budget.tsx'
import { SOURCE_WORDS } from '../../../../shared/words.ts'
import { PowerTick } from './power.tsx'
import { exponentTicks, log10OfText } from './scale.ts'
import { AXIS_LINE, axisLabel, CERTAIN, INK, MARGIN, TICK } from './theme.ts'

export default function ErrorBudgetPlot({ items, radius }: { items: BudgetLine[]; radius: string }) {
  const bars = [...items.map((item) => ({ name: `${SOURCE_WORDS[item.source]}, ${item.bound}`, log: log10OfText(item.magnitude), total: false })), { name: 'Radius', log: log10OfText(radius), total: true }]
  const logs = bars.flatMap((bar) => bar.log ?? [])
  if (logs.length === 0) return <p className="py-6">Every contribution is zero: the value is exact.</p>
  // Bars grow from a floor one step below the smallest source, since a logarithmic scale has no zero.
  const spread = Math.max(...logs) - Math.min(...logs)
  const floor = Math.floor(Math.min(...logs) - Math.max(1, spread * 0.12))
  const top = Math.ceil(Math.max(...logs) + 0.001)
  const data = bars.map((bar) => ({ ...bar, length: bar.log === null ? 0 : bar.log - floor }))
  return (
    <ResponsiveContainer width="100%" height={58 + 34 * data.length}>
      <BarChart data={data} layout="vertical" margin={MARGIN} barCategoryGap={9} accessibilityLayer={false}>
        <XAxis type="number" domain={[0, top - floor]} ticks={exponentTicks(floor, top).map((tick) => tick - floor)} interval="equidistantPreserveStart" minTickGap={32} tick={<PowerTick below read={(length) => ({ exponent: length + floor })} />} tickLine={AXIS_LINE} axisLine={AXIS_LINE} label={axisLabel('contribution to the radius', 'below')} />
        <YAxis type="category" dataKey="name" tick={{ ...TICK, fill: INK }} tickLine={false} axisLine={AXIS_LINE} width={164} />
        <Bar dataKey="length" isAnimationActive={false}>
          {data.map((bar, index) => (
            <Cell key={index} fill={bar.total ? INK : CERTAIN} stroke={bar.total ? INK : CERTAIN} fillOpacity={bar.total ? 1 : 0.55} />
          ))}
        </Bar>
      </BarChart>
    </ResponsiveContainer>
  )
}
