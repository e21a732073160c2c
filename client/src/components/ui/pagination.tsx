import { Link } from 'react-router-dom'
import { buttonClass } from './button.tsx'
import type { PageTurn } from './use-cursor-pages.ts'

interface PaginationProps {
  /** How many are shown here, and of how many in all if that is known. */
  shown: number
  total?: number | undefined
  /** What is counted: "constants". */
  unit: string
  previous: PageTurn | null
  next: PageTurn | null
}

/** Turns the pages of a list that is read by cursors; the addresses are shareable. */
export function Pagination({ shown, total, unit, previous, next }: PaginationProps) {
  return (
    <nav aria-label={`Pages of ${unit}`} className="mt-4 flex flex-wrap items-center justify-between gap-3 print:hidden">
      <p className="text-[0.92rem] text-soft">
        {total === undefined || total === shown ? `${shown} ${unit}` : `${shown} of ${total} ${unit}`}
      </p>
      {(previous !== null || next !== null) && (
        <p className="flex gap-3">
          {previous !== null && (
            <Link to={previous.to} state={previous.state} rel="prev" className={buttonClass('plain')}>
              Previous
            </Link>
          )}
          {next !== null && (
            <Link to={next.to} state={next.state} rel="next" className={buttonClass('plain')}>
              Next
            </Link>
          )}
        </p>
      )}
    </nav>
  )
}
