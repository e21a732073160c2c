import { buttonClass } from './button.tsx'
import { Link } from 'react-router-dom'

interface PaginationProps {
  /** How many are shown here, and of how many in all if that is known. */
  shown: number
  total?: number | undefined
  /** What is counted: "constants". */
  unit: string
  previous: string | null
  next: string | null
}

/** Turns the pages of a list that is read by cursors; the addresses are shareable. */
export function Pagination({ shown, total, unit, previous, next }: PaginationProps) {
  return (
    <nav aria-label={`Pages of ${unit}`} className="mt-4 flex flex-wrap items-center justify-between gap-3 print:hidden">
      <p className="text-[0.92rem] text-soft">
        {total === undefined || total === shown ? `${shown} ${unit}` : `${shown} of ${total} ${unit} on this page`}
      </p>
      {(previous !== null || next !== null) && (
        <p className="flex gap-3">
          {previous !== null && (
            <Link to={previous} rel="prev" className={buttonClass('plain')}>
              Previous
            </Link>
          )}
          {next !== null && (
            <Link to={next} rel="next" className={buttonClass('plain')}>
              Next
            </Link>
          )}
        </p>
      )}
    </nav>
  )
}
