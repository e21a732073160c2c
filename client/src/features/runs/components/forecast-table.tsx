import type { Plan } from '../../../../../shared/schemas/run.ts'
import { Magnitude } from '../../../components/charts/error-budget.tsx'
import { secondsInWords } from '../../../components/ui/time.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { METHOD_WORDS } from '../run-words.ts'

type Forecast = Plan['forecasts'][number]
export type Choice = Pick<Forecast, 'method' | 'arithmetic'>

interface ForecastTableProps {
  forecasts: Forecast[]
  chosen: Choice | null
  onChoose: (choice: Choice) => void
  busy: boolean
}

/** What each method and arithmetic would reach and how long it would take; one row is chosen. What can't be done says why. */
export function ForecastTable({ forecasts, chosen, onChoose, busy }: ForecastTableProps) {
  const key = (forecast: Choice) => `${forecast.method} ${forecast.arithmetic}`
  return (
    <Table
      caption="Methods and what they would reach"
      rows={forecasts}
      rowKey={key}
      busy={busy}
      columns={[
        {
          key: 'method',
          header: 'Method',
          plain: true,
          cell: (row) => (
            <label className={row.possible ? 'flex items-baseline gap-2.5' : 'flex items-baseline gap-2.5 text-soft'}>
              <input
                type="radio"
                name="forecast"
                className="relative top-px size-4 shrink-0 accent-certain"
                disabled={!row.possible}
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
        { key: 'arithmetic', header: 'Arithmetic', cell: (row) => <span className={row.possible ? undefined : 'text-soft'}>{row.arithmetic}</span> },
        { key: 'radius', header: 'Radius', align: 'right', cell: (row) => row.radius && <Magnitude text={row.radius} /> },
        { key: 'seconds', header: 'Time', align: 'right', cell: (row) => row.seconds !== null && <span className="whitespace-nowrap">about {secondsInWords(row.seconds)}</span> },
        { key: 'remark', header: '', plain: true, cell: (row) => (row.possible ? row.recommended && 'the quickest' : <span className="text-refused">{row.reason}</span>) },
      ]}
    />
  )
}
