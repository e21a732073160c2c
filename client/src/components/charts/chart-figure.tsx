import { Suspense, useState } from 'react'
import type { KeyboardEvent, ReactNode } from 'react'
import { Button } from '../ui/button.tsx'

interface ChartFigureProps {
  /** What the chart shows, with its units. */
  caption: ReactNode
  chart: ReactNode
  /** The same numbers as a table. */
  table: ReactNode
}

/** A chart and the table of the same numbers: the button or the key T, while the focus is in the figure, changes between them. */
export function ChartFigure({ caption, chart, table }: ChartFigureProps) {
  const [asTable, setAsTable] = useState(false)
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key.toLowerCase() === 't' && !event.ctrlKey && !event.metaKey && !event.altKey) setAsTable(!asTable)
  }
  return (
    <figure onKeyDown={onKeyDown} className="my-3">
      {asTable ? table : <Suspense fallback={<div className="h-64" />}>{chart}</Suspense>}
      <figcaption className="mt-2 flex flex-wrap items-baseline justify-between gap-x-6 text-[0.92rem] leading-snug text-soft">
        <span className="max-w-prose">{caption}</span>
        <Button tone="quiet" aria-keyshortcuts="T" onClick={() => setAsTable(!asTable)} className="print:hidden">
          {asTable ? 'Show as chart' : 'Show as table'}
        </Button>
      </figcaption>
    </figure>
  )
}
