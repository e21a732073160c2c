import type { ReactNode } from 'react'
import { ErrorView, Loading } from './feedback.tsx'

/** What a query has so far: its data, or why there is none, or neither while it is asked for. */
export interface Fetched<Data> {
  data: Data | undefined
  error: unknown
  onRetry: () => void
}

interface QueryLike<Data> {
  data: Data | undefined
  error: unknown
  refetch: () => unknown
}

/** A query as a view takes it. */
export function fetched<Data>({ data, error, refetch }: QueryLike<Data>): Fetched<Data> {
  return { data, error, onRetry: () => void refetch() }
}

interface PartProps<Data> {
  of: Fetched<Data>
  /** What is read, in the middle of a sentence: "your sessions". */
  what: string
  children: (data: Data) => ReactNode
}

/** A part of a page that shows what was fetched, or that it is being fetched, or why it could not be. Data stay when a refetch fails. */
export function Part<Data>({ of: { data, error, onRetry }, what, children }: PartProps<Data>) {
  if (data !== undefined) return children(data)
  if (error) return <ErrorView title={`${what.charAt(0).toUpperCase()}${what.slice(1)} could not be read`} error={error} onRetry={onRetry} />
  return <Loading what={`Reading ${what}`} />
}
