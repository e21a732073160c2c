import { useEffect, useRef, useState } from 'react'
import { DigitLine } from '../digit-line/digit-line.tsx'
import { Table } from '../ui/table.tsx'
import { ChartFigure } from './chart-figure.tsx'
import { nest } from './nest-layout.ts'
import type { NestedEnclosure, NestRow } from './nest-layout.ts'
import { Power, SvgPower } from './power.tsx'
import { CERTAIN, INK, REFUSED, SOFT } from './theme.ts'

const ROW = 74
const BAR = 13

/** The enclosures of one constant one below the other, each row magnified by a power of ten against the row above. */
export function Nest({ enclosures }: { enclosures: NestedEnclosure[] }) {
  const rows = nest(enclosures)
  return (
    <ChartFigure
      caption="Each row shows the enclosure in a window that is a power of ten wide; the slanting lines show where that window lies in the row above."
      chart={<NestDrawing rows={rows} />}
      table={
        <Table
          caption="Enclosures, widest first"
          rows={rows}
          rowKey={(row) => `${row.label} ${row.lo} ${row.hi}`}
          columns={[
            { key: 'label', header: 'Enclosure', cell: (row) => row.label },
            { key: 'window', header: 'Window', cell: (row) => <Power exponent={row.exponent} /> },
            { key: 'value', header: 'Value', cell: (row) => <DigitLine lo={row.lo} hi={row.hi} limit={40} /> },
            { key: 'meets', header: 'Row above', cell: (row) => (row.inRowAbove === null ? '' : row.conflict ? 'does not meet' : 'meets') },
          ]}
        />
      }
    />
  )
}

function NestDrawing({ rows }: { rows: NestRow[] }) {
  const [frame, width] = useWidth(640)
  const height = rows.length * ROW + 6
  const at = (share: number) => 1 + share * (width - 2)
  return (
    <div ref={frame}>
      <svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} aria-hidden="true" className="h-auto max-w-full">
        {rows.map((row, index) => {
          const ground = index * ROW + 44
          const colour = row.conflict ? REFUSED : CERTAIN
          return (
            <g key={index}>
              {row.inRowAbove && (
                <path d={`M${at(row.inRowAbove.start)} ${ground - ROW} L${at(0)} ${ground - 22} M${at(row.inRowAbove.end)} ${ground - ROW} L${at(1)} ${ground - 22}`} stroke={SOFT} strokeOpacity={0.7} strokeDasharray="2 4" fill="none" />
              )}
              <line x1={at(0)} x2={at(1)} y1={ground} y2={ground} stroke={INK} />
              {row.above && row.conflict && (
                <rect x={at(row.above.start)} y={ground - BAR} width={Math.max(2, at(row.above.end) - at(row.above.start))} height={BAR} fill="none" stroke={SOFT} strokeDasharray="3 2" />
              )}
              <rect x={at(row.start)} y={ground - BAR} width={Math.max(2, at(row.end) - at(row.start))} height={BAR} fill={colour} fillOpacity={0.35} stroke={colour} />
              {[row.start, row.end].map((end, side) => (
                <line key={side} x1={at(end)} x2={at(end)} y1={ground - BAR - 5} y2={ground + 4} stroke={colour} strokeWidth={1.6} />
              ))}
              <text x={at(0)} y={ground + 17} fontSize={13} fill={INK}>
                {row.label}
              </text>
              <text x={at(1)} y={ground + 17} fontSize={13} textAnchor="end" fill={row.conflict ? REFUSED : SOFT}>
                {row.conflict ? 'does not meet the row above' : <WindowWords row={row} />}
              </text>
            </g>
          )
        })}
      </svg>
    </div>
  )
}

function WindowWords({ row }: { row: NestRow }) {
  return (
    <>
      <SvgPower exponent={row.exponent} />
      <tspan dy="0.36em"> wide</tspan>
      {row.magnification > 0 && (
        <>
          <tspan>, </tspan>
          <SvgPower prefix="×" exponent={row.magnification} />
        </>
      )}
    </>
  )
}

/** Width of an element as it is laid out, so that the drawing's type keeps its size on narrow screens. */
function useWidth(initial: number) {
  const ref = useRef<HTMLDivElement>(null)
  const [width, setWidth] = useState(initial)
  useEffect(() => {
    const element = ref.current
    if (!element) return
    const observer = new ResizeObserver(([entry]) => setWidth(Math.max(240, Math.floor(entry?.contentRect.width ?? initial))))
    observer.observe(element)
    return () => observer.disconnect()
  }, [initial])
  return [ref, width] as const
}
