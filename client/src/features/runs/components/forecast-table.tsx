import type { Plan } from '../../../../../shared/schemas/run.ts'
import { METHOD_WORDS } from '../../../../../shared/words.ts'
import { Magnitude } from '../../../components/charts/error-budget.tsx'
import { secondsInWords } from '../../../components/ui/time.tsx'
import { Table } from '../../../components/ui/table.tsx'

type Forecast = Plan['forecasts'][number]
export type Choice = Pick<Forecast, 'method' | 'arithmetic'>

interface ForecastTableProps {
  forecasts: Forecast[]
  chosen: Choice | null
  onChoose: (choice: Choice) => void
  busy: boolean
}

const key = (forecast: Choice) => `${forecast.method} ${forecast.arithmetic}`

/** What each method and arithmetic would reach and how long it would take; one row is chosen. */
export function ForecastTable({ forecasts, chosen, onChoose, busy }: ForecastTableProps) {
  return (
    <Table
      caption="Methods and what they would reach"
      rows={forecasts.filter((forecast) => forecast.possible)}
      rowKey={key}
      busy={busy}
      columns={[
        {
          key: 'method',
          header: 'Method',
          plain: true,
          cell: (row) => (
            <label className="flex items-baseline gap-2.5">
              <input
                type="radio"
                name="forecast"
                className="relative top-px size-4 shrink-0 accent-certain"
                checked={chosen !== null && key(chosen) === key(row)}
                onChange={() => onChoose({ method: row.method, arithmetic: row.arithmetic })}
              />
              <span>
                {METHOD_WORDS[row.method]}
                <span className="sr-only">, {row.arithmetic} arithmetic</span>
              </span>
            </label>
          ),
        },
        { key: 'arithmetic', header: 'Arithmetic', cell: (row) => row.arithmetic },
        { key: 'radius', header: 'Radius', align: 'right', cell: (row) => row.radius && <Magnitude text={row.radius} /> },
        { key: 'seconds', header: 'Time', align: 'right', cell: (row) => row.seconds !== null && <span className="whitespace-nowrap">about {secondsInWords(row.seconds)}</span> },
        { key: 'remark', header: '', plain: true, cell: (row) => row.recommended && 'the quickest' },
      ]}
    />
  )
}

/** What can't be done, and why, folded away unless nothing can: one line a reason, since both arithmetics of a method mostly share it. */
export function ForecastRefusals({ forecasts }: { forecasts: Forecast[] }) {
  const reasons = new Map<string, Forecast[]>()
  for (const forecast of forecasts) {
    if (!forecast.possible) reasons.set(`${forecast.method} ${forecast.reason}`, [...(reasons.get(`${forecast.method} ${forecast.reason}`) ?? []), forecast])
  }
  if (reasons.size === 0) return null
  return (
    <details className="mt-4 text-[0.92rem]" open={forecasts.every((forecast) => !forecast.possible)}>
      <summary className="w-fit text-certain underline decoration-rule underline-offset-[0.2em]">
        Methods that do not serve this constant and goal
      </summary>
      <ul className="mt-2 grid gap-1 text-soft">
        {[...reasons.entries()].map(([reason, [first, ...others]]) => (
          <li key={reason}>
            {first && METHOD_WORDS[first.method]}
            {others.length === 0 && first && first.arithmetic === 'mpfr' && ', mpfr'}: {first?.reason}
          </li>
        ))}
      </ul>
    </details>
  )
}
