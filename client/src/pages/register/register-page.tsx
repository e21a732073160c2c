import { useQuery } from '@tanstack/react-query'
import { useNavigate, useSearchParams } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { constantListQuery } from '../../features/constants/queries.ts'
import { isFiltered, registerQueryOf } from '../../features/constants/register-filters.ts'
import { useSession } from '../../features/session/queries.ts'
import { RegisterView } from './register-view.tsx'

export function RegisterPage() {
  const [search] = useSearchParams()
  const navigate = useNavigate()
  const { may } = useSession()
  const query = registerQueryOf(search)
  const { cursor: _cursor, ...filters } = query
  const list = useQuery(constantListQuery(query))
  const pages = useCursorPages(list.data?.next)
  return (
    <RegisterView
      list={list.data}
      error={list.error}
      refetching={list.isPlaceholderData}
      onRetry={() => void list.refetch()}
      filters={filters}
      filtered={isFiltered(query)}
      onFilter={(next) => void navigate(paths.register({ ...next, ...(filters.sort ? { sort: String(filters.sort), order: String(filters.order ?? 'asc') } : {}) }))}
      sorting={{ key: String(filters.sort ?? 'number'), order: filters.order === 'desc' ? 'desc' : 'asc', to: (key, order) => paths.register({ ...(filters as Record<string, string>), sort: key, order }) }}
      pages={pages}
      mayStart={may('research')}
    />
  )
}
