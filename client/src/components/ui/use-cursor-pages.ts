import { useLocation, useNavigate } from 'react-router-dom'

/** One turn of a page: the address and the cursors that lead back. */
export interface PageTurn {
  to: string
  state: { trail: string[] }
}

/**
 * Turning the pages of a list that the server reads by cursor. The cursor is in the address; the way back is kept with the
 * history entry, and a shared address without it goes back to the first page.
 */
export function useCursorPages(next: string | null | undefined): { previous: PageTurn | null; next: PageTurn | null; turn: (direction: 'previous' | 'next') => void } {
  const { pathname, search, state } = useLocation() as { pathname: string; search: string; state: PageTurn['state'] | null }
  const navigate = useNavigate()
  const current = new URLSearchParams(search).get('cursor')
  const trail = state?.trail ?? []

  const at = (cursor: string | null, back: string[]): PageTurn => {
    const params = new URLSearchParams(search)
    if (cursor) params.set('cursor', cursor)
    else params.delete('cursor')
    const text = params.toString()
    return { to: text === '' ? pathname : `${pathname}?${text}`, state: { trail: back } }
  }
  const forward = next ? at(next, [...trail, current ?? '']) : null
  const back = current === null ? null : at(trail.at(-1) || null, trail.slice(0, -1))
  return {
    previous: back,
    next: forward,
    turn: (direction) => {
      const target = direction === 'next' ? forward : back
      if (target) void navigate(target.to, { state: target.state })
    },
  }
}
