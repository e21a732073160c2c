import type { ReactNode } from 'react'
import { problemOf } from '../../lib/errors.ts'
import { Button } from './button.tsx'

/** Says what is being fetched, once it has taken long enough to be noticed. */
export function Loading({ what }: { what: string }) {
  return (
    <p role="status" className="appear-late py-6 text-soft italic">
      {what} …
    </p>
  )
}

/** An empty list: what belongs there and how to begin. */
export function Empty({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="max-w-prose py-8">
      <p className="text-[1.2rem] leading-snug">{title}</p>
      {children && <div className="mt-2 grid justify-items-start gap-3 text-soft">{children}</div>}
    </div>
  )
}

interface ErrorViewProps {
  error: unknown
  /** What could not be done: "The register could not be read". */
  title: string
  onRetry?: () => void
}

/** A refusal or failure in place of what was asked for: what is wrong, and what to do next. */
export function ErrorView({ error, title, onRetry }: ErrorViewProps) {
  const problem = problemOf(error)
  return (
    <div role="alert" className="max-w-prose border-y border-refused py-4">
      <p className="text-[1.2rem] leading-snug text-refused">{title}</p>
      <p className="mt-1">{problem.detail}</p>
      {problem.fields.length > 0 && (
        <ul className="mt-1">
          {problem.fields.map(({ path, message }) => (
            <li key={path}>
              <i>{path}</i> {message}
            </li>
          ))}
        </ul>
      )}
      {problem.requestId && (
        <p className="mt-1 text-[0.88rem] text-soft">
          Quote <code>{problem.requestId}</code> if you report it.
        </p>
      )}
      {onRetry && problem.passing && (
        <p className="mt-3">
          <Button onClick={onRetry}>Try again</Button>
        </p>
      )}
    </div>
  )
}

interface ProgressProps {
  /** Share done, 0 to 1; null while it isn't known. */
  share: number | null
  label: string
}

/** Progress along a ground line: the stone stands at how far the work has come. */
export function Progress({ share, label }: ProgressProps) {
  const percent = share === null ? 0 : Math.min(100, Math.max(0, share * 100))
  return (
    <div
      role="progressbar"
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={share === null ? undefined : Math.floor(percent)}
      className="relative h-7 border-b border-edge print:hidden"
    >
      <div className="absolute bottom-[-2px] left-0 h-[3px] bg-certain transition-[width] duration-500" style={{ width: `${percent}%` }} />
      <svg
        viewBox="0 0 12 24"
        aria-hidden="true"
        className="absolute bottom-0 h-6 w-3 -translate-x-1/2 fill-certain transition-[left] duration-500"
        style={{ left: `${percent}%` }}
      >
        <path d="M2.5 24 3.2 7C3.4 3.6 4.6 2 6.4 2.1 8.4 2.2 9.2 4 9.3 7L9.9 24z" />
      </svg>
    </div>
  )
}
