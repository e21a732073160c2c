import { useQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router-dom'
import { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { groupQuery } from '../../features/group/queries.ts'
import { membersQuery } from '../../features/members/queries.ts'
import { MAIL_STATES } from '../../features/outbox/mail-words.ts'
import { outboxListQuery, useResendMail } from '../../features/outbox/queries.ts'
import { MailView } from './mail-view.tsx'

/** The fate asked for, where it is one. */
const stateOf = (search: URLSearchParams) => (Object.keys(MAIL_STATES).includes(search.get('state') ?? '') ? (search.get('state') ?? '') : '')

export function MailPage() {
  const [search, setSearch] = useSearchParams()
  const state = stateOf(search)
  const group = useQuery(groupQuery())
  const members = useQuery(membersQuery())
  const list = useQuery(outboxListQuery({ state: state || undefined, cursor: search.get('cursor') ?? undefined }))
  const resend = useResendMail()
  const pages = useCursorPages(list.data?.next)
  return (
    <MailView
      group={group.data}
      list={list.data}
      error={list.error}
      refetching={list.isPlaceholderData}
      onRetry={() => void list.refetch()}
      state={state}
      onState={(next) => setSearch(next ? { state: next } : {})}
      members={members.data ?? []}
      onResend={resend.mutateAsync}
      pages={pages}
    />
  )
}
