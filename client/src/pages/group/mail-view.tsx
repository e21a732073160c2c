import { pageHead } from '../../../../shared/page-head.ts'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { Field, Options, Select } from '../../components/ui/field.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { MarginNote, Page } from '../../components/ui/page.tsx'
import { Pagination } from '../../components/ui/pagination.tsx'
import type { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { GroupHead } from '../../features/group/components/group-head.tsx'
import { OutboxTable } from '../../features/outbox/components/outbox-table.tsx'
import { MAIL_STATES } from '../../features/outbox/mail-words.ts'
import type { OutboxPageData } from '../../features/outbox/queries.ts'
import type { Group } from '../../../../shared/schemas/group.ts'
import type { Member } from '../../../../shared/schemas/member.ts'

interface MailViewProps {
  group: Group | undefined
  list: OutboxPageData | undefined
  error: unknown
  refetching: boolean
  onRetry: () => void
  /** Fate that is filtered by; empty: all. */
  state: string
  onState: (state: string) => void
  members: Member[]
  onResend: (id: string) => Promise<unknown>
  pages: ReturnType<typeof useCursorPages>
}

/** Mails that went out, or could not. */
export function MailView({ group, list, error, refetching, onRetry, state, onState, members, onResend, pages }: MailViewProps) {
  const bounced = members.filter((member) => member.state === 'active' && member.mailBouncedAt !== null)
  return (
    <Page
      about={pageHead('groupMail')}
      head={<GroupHead group={group} />}
      margin={
        <>
          <MarginNote title="How mail goes out">
            <p>A mail is written together with the change it tells of: if the change was not made, there is no mail. A mail that the server does not take is tried again, at growing intervals.</p>
          </MarginNote>
          <MarginNote title="One-time links">
            <p>A mail with a link in it can’t be sent again. Send the invitation again, or have the person ask for a new link.</p>
          </MarginNote>
        </>
      }
    >
      {bounced.length > 0 && (
        <Notice tone="refused" title={bounced.length === 1 ? 'One address sends mail back.' : `${bounced.length} addresses send mail back.`} className="mb-6">
          {bounced.map(({ name, email }) => `${name} (${email})`).join(', ')}. They are not told what waits for them: reach them otherwise, and if the address is wrong, invite them anew at the right one.
        </Notice>
      )}
      <Field label="Fate" className="mb-5 w-44 print:hidden">
        {(control) => (
          <Select {...control} value={state} onChange={(event) => onState(event.target.value)}>
            <option value="">all</option>
            <Options of={MAIL_STATES} />
          </Select>
        )}
      </Field>
      {error && !list ? (
        <ErrorView title="The mails could not be read" error={error} onRetry={onRetry} />
      ) : !list ? (
        <Loading what="Reading the mails" />
      ) : list.items.length === 0 ? (
        <Empty title={state ? 'No mail has this fate.' : 'No mail has been written yet.'}>
          {!state && <p>Invitations, requests to referee, to answer and to sign, and reminders are listed here with what became of them.</p>}
        </Empty>
      ) : (
        <>
          <OutboxTable items={list.items} onResend={onResend} onTurn={pages.turn} busy={refetching} />
          <Pagination shown={list.items.length} total={list.total} unit={list.items.length === 1 ? 'mail' : 'mails'} previous={pages.previous} next={pages.next} />
        </>
      )}
    </Page>
  )
}
