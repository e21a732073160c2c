import { LabelList, Line, LineChart, ResponsiveContainer, Tooltip, XAxis, YAxis } from 'recharts'
import type { NarrowingStep } from './narrowing.tsx'
import { AXIS_LINE, axisLabel, CERTAIN, INK, MARGIN, TICK, TIP } from './theme.ts'

const DAY = 86_400_000
const monthAndYear = new Intl.DateTimeFormat('en-GB', { month: 'short', year: 'numeric' })
const dayAndMonth = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short' })

export default function NarrowingPlot({ steps }: { steps: NarrowingStep[] }) {
  const points = steps.map((step) => ({ ...step, time: Date.parse(step.at) }))
  const first = points[0]?.time ?? 0
  const last = points.at(-1)?.time ?? 0
  const pad = Math.max(DAY, (last - first) * 0.1)
  const ticks = dateTicks(first, last)
  // The last step goes on to the edge: it is the best enclosure still.
  const data = [...points, { time: last + pad, digits: points.at(-1)?.digits, claim: '' }]
  return (
    <ResponsiveContainer width="100%" height={260}>
      <LineChart data={data} margin={{ ...MARGIN, top: 28 }} accessibilityLayer={false}>
        <XAxis dataKey="time" type="number" domain={[first - pad, last + pad]} ticks={ticks.at} tickFormatter={(time: number) => ticks.format.format(time)} tick={TICK} tickLine={false} axisLine={AXIS_LINE} label={axisLabel('date of signature', 'below')} minTickGap={40} />
        <YAxis type="number" domain={[0, 'auto']} allowDecimals={false} tick={TICK} tickLine={false} axisLine={AXIS_LINE} width={54} label={axisLabel('certified digits', 'left')} />
        <Tooltip cursor={false} isAnimationActive={false} content={({ payload }) => <StepTip step={payload[0]?.payload as NarrowingStep | undefined} />} />
        <Line type="stepAfter" dataKey="digits" stroke={CERTAIN} strokeWidth={2} dot={<StepDot />} isAnimationActive={false}>
          <LabelList dataKey="claim" position="top" offset={9} fill={INK} fontSize={13} />
        </Line>
      </LineChart>
    </ResponsiveContainer>
  )
}

/** A dot at each signature, none where the line only goes on. */
function StepDot({ cx, cy, payload }: { cx?: number; cy?: number; payload?: { claim: string } }) {
  return payload?.claim ? <circle cx={cx} cy={cy} r={4} fill={CERTAIN} /> : null
}

/** First days of months where the span is long, else up to six days spread over it. */
function dateTicks(first: number, last: number): { at: number[]; format: Intl.DateTimeFormat } {
  const days = (last - first) / DAY
  if (days < 75) {
    const step = Math.max(1, Math.ceil(days / 5)) * DAY
    return { at: Array.from({ length: Math.floor((last - first) / step) + 1 }, (_, index) => first + index * step), format: dayAndMonth }
  }
  const stride = [1, 2, 3, 6, 12, 24, 60].find((months) => days / 30.4 / months <= 7) ?? 120
  const at: number[] = []
  const month = new Date(first)
  month.setUTCDate(1)
  month.setUTCHours(0, 0, 0, 0)
  for (month.setUTCMonth(month.getUTCMonth() + 1); month.getTime() <= last; month.setUTCMonth(month.getUTCMonth() + stride)) at.push(month.getTime())
  return { at, format: monthAndYear }
}

function StepTip({ step }: { step: NarrowingStep | undefined }) {
  if (!step?.claim) return null
  return (
    <div className={TIP}>
      {step.claim}: {step.digits} digits
      <br />
      {step.author}
    </div>
  )
}
