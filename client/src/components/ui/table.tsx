import type { KeyboardEvent, ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { classNames } from '../../lib/class-names.ts'

export interface Column<Row> {
  key: string
  header: string
  cell: (row: Row) => ReactNode
  /** Set where the list can be sorted by this column. */
  sortable?: boolean
  align?: 'right'
  className?: string
  /** Leave the label away where a narrow screen stacks the cells and the content speaks for itself. */
  plain?: boolean
}

export interface Sorting {
  key: string
  order: 'asc' | 'desc'
  /** Address of this list sorted otherwise. */
  to: (key: string, order: 'asc' | 'desc') => string
}

interface TableProps<Row> {
  /** Read before the table; shown only to screen readers where a heading says it already. */
  caption: string
  columns: Column<Row>[]
  rows: Row[]
  rowKey: (row: Row) => string
  sorting?: Sorting
  /** Page Up and Page Down turn the pages while the focus is in the table. */
  onTurn?: (direction: 'previous' | 'next') => void
  /** Newer rows are being fetched: the old ones stay, marked as busy. */
  busy?: boolean
}

/** A table ruled as in print: thick above and below, thin under the heads, the heads kept in view. Arrow keys go from row to row. */
export function Table<Row>({ caption, columns, rows, rowKey, sorting, onTurn, busy }: TableProps<Row>) {
  const onKeyDown = (event: KeyboardEvent<HTMLTableElement>) => {
    if (event.target instanceof HTMLElement && event.target.closest('input, select, textarea, [role="menu"]')) return
    if (event.key === 'PageDown' || event.key === 'PageUp') {
      if (!onTurn) return
      event.preventDefault()
      onTurn(event.key === 'PageDown' ? 'next' : 'previous')
    } else if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      const links = [...event.currentTarget.querySelectorAll<HTMLElement>('tbody tr')].flatMap((row) => row.querySelector<HTMLElement>('a, button') ?? [])
      const row = (document.activeElement as HTMLElement | null)?.closest('tbody tr')
      const at = links.findIndex((link) => row?.contains(link))
      const target = links[at === -1 ? 0 : at + (event.key === 'ArrowDown' ? 1 : -1)]
      if (!target) return
      event.preventDefault()
      target.focus()
    }
  }
  return (
    <table role="table" aria-busy={busy || undefined} onKeyDown={onKeyDown} className="ruled-table">
      <caption className="sr-only">{caption}</caption>
      <thead role="rowgroup">
        <tr role="row">
          {columns.map((column) => {
            const sorted = sorting?.key === column.key ? sorting.order : undefined
            return (
              <th
                key={column.key}
                role="columnheader"
                scope="col"
                aria-sort={sorted ? (sorted === 'asc' ? 'ascending' : 'descending') : undefined}
                className={classNames(column.align === 'right' && 'text-right', column.className)}
              >
                {column.sortable && sorting ? (
                  <Link to={sorting.to(column.key, sorted === 'asc' ? 'desc' : 'asc')} className="whitespace-nowrap no-underline hover:underline">
                    {column.header}
                    <span aria-hidden="true" className="ml-1 inline-block w-[0.7em] text-[0.75em] not-italic">
                      {sorted === 'asc' ? '▲' : sorted === 'desc' ? '▼' : ''}
                    </span>
                  </Link>
                ) : (
                  column.header
                )}
              </th>
            )
          })}
        </tr>
      </thead>
      <tbody role="rowgroup" className={busy ? 'opacity-60 transition-opacity delay-300' : undefined}>
        {rows.map((row) => (
          <tr key={rowKey(row)} role="row">
            {columns.map((column) => (
              <td key={column.key} role="cell" data-label={column.plain ? undefined : column.header} className={classNames(column.align === 'right' && 'md:text-right print:text-right', column.className)}>
                <div className="min-w-0">{column.cell(row)}</div>
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  )
}
