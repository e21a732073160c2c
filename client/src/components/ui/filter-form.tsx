import type { FormEvent, ReactNode } from 'react'
import { Button } from './button.tsx'
import { TextLink } from './link.tsx'

interface FilterFormProps {
  /** What it filters, for those who don't see it: "Filter the register". */
  label: string
  /** What is filtered by now: when that changes, by a link or by going back, the fields are set anew. */
  filters: object
  /** Hears what stands in the fields, empty ones left out. */
  onFilter: (filters: Record<string, string>) => void
  className: string
  children: ReactNode
}

/** Filters of a list. Choosing from a list filters at once, typing does with Enter or the button. */
export function FilterForm({ label, filters, onFilter, className, children }: FilterFormProps) {
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const entries = [...new FormData(event.currentTarget)].map(([key, value]) => [key, String(value).trim()])
    onFilter(Object.fromEntries(entries.filter(([, value]) => value !== '')) as Record<string, string>)
  }
  const choose = (event: FormEvent<HTMLFormElement>) => {
    if (event.target instanceof HTMLSelectElement) event.currentTarget.requestSubmit()
  }
  return (
    <form key={JSON.stringify(filters)} role="search" aria-label={label} onSubmit={submit} onChange={choose} className={className}>
      {children}
    </form>
  )
}

/** The button that filters by what was typed, and the way back to the whole list where something is filtered. */
export function FilterButtons({ clearTo }: { clearTo: string | null }) {
  return (
    <div className="flex items-end gap-4">
      <Button type="submit" className="min-h-[2.45rem]">
        Find
      </Button>
      {clearTo && (
        <TextLink to={clearTo} className="pb-2">
          Clear
        </TextLink>
      )}
    </div>
  )
}
