import { useQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router-dom'
import { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { runListQuery } from '../../features/runs/queries.ts'
import { runListQueryOf } from '../../features/runs/run-filters.ts'
import { useSession } from '../../features/session/queries.ts'
import { RunsView } from './runs-view.tsx'

export function RunsPage() {
  const [search, setSearch] = useSearchParams()
  const { may } = useSession()
  const query = runListQueryOf(search)
  const list = useQuery({ ...runListQuery(query), refetchInterval: (latest) => (latest.state.data?.items.some((run) => run.state === 'queued' || run.state === 'running') ? 3_000 : false) })
  const pages = useCursorPages(list.data?.next)
  return (
    <RunsView
      list={list.data}
      error={list.error}
      refetching={list.isPlaceholderData}
      onRetry={() => void list.refetch()}
      state={search.get('state') ?? ''}
      mine={search.get('mine') === 'true'}
      onFilter={(state, mine) => setSearch({ ...(state && { state }), ...(mine && { mine: 'true' }) })}
      pages={pages}
      mayStart={may('research')}
    />
  )
}
