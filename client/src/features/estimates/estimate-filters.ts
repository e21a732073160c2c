import type { Estimate } from '../../../../shared/schemas/estimate.ts'

/** Filters of the library as they stand in the address; empty: not filtered. */
export interface EstimateFilters {
  text: string
  conditional: '' | 'yes' | 'no'
  state: '' | Estimate['state']
  use: '' | 'used'
}

const oneOf = <Value extends string>(value: string | null, ...allowed: Value[]): Value | '' => allowed.find((each) => each === value) ?? ''

export function estimateFiltersOf(search: URLSearchParams): EstimateFilters {
  return {
    text: search.get('text')?.trim() ?? '',
    conditional: oneOf(search.get('conditional'), 'yes', 'no'),
    state: oneOf(search.get('state'), 'in-force', 'in-doubt'),
    use: oneOf(search.get('use'), 'used'),
  }
}

/** Estimates that pass: every word of the text occurs somewhere in the title, statement, source or id. */
export function filterEstimates(estimates: Estimate[], { text, conditional, state, use }: EstimateFilters): Estimate[] {
  const words = text.toLowerCase().split(/\s+/).filter((word) => word !== '')
  return estimates.filter((estimate) => {
    if (conditional !== '' && estimate.conditional !== (conditional === 'yes')) return false
    if (state !== '' && estimate.state !== state) return false
    if (use !== '' && estimate.uses === 0) return false
    const haystack = [estimate.id, estimate.title, estimate.statement, estimate.source, estimate.condition ?? '', estimate.validFor].join(' ').toLowerCase()
    return words.every((word) => haystack.includes(word))
  })
}

/** A title without the range, for a table that has the range in a column of its own. */
export function shortTitle(title: string): string {
  return title.replace(/, (?:log )?x >=? .*$/, '')
}
