import { useState } from 'react'
import type { OutboxItem } from '../../../../../shared/schemas/group.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { problemOf } from '../../../lib/errors.ts'
import { MAIL_STATES } from '../mail-words.ts'

const COLOURS: Partial<Record<OutboxItem['state'], string>> = { bounced: 'text-refused', failed: 'text-refused', waiting: 'text-undecided' }

interface OutboxTableProps {
  items: OutboxItem[]
  onResend: (id: string) => Promise<unknown>
  onTurn: (direction: 'previous' | 'next') => void
  busy: boolean
}

/** Mails with their fate, each that may be sent again with the way to do so. */
export function OutboxTable({ items, onResend, onTurn, busy }: OutboxTableProps) {
  const [sending, setSending] = useState<string | null>(null)
  const [done, setDone] = useState<string | null>(null)
  const [error, setError] = useState<unknown>(null)
  const resend = async ({ id, subject, recipient }: OutboxItem) => {
    setSending(id)
    setDone(null)
    setError(null)
    try {
      await onResend(id)
      setDone(`“${subject}” goes to ${recipient.name} once more, as a mail of its own at the top of the list.`)
    } catch (refusal) {
      setError(refusal)
    } finally {
      setSending(null)
    }
  }
  return (
    <div className="grid gap-4">
      {done && <Notice tone="done" title="On its way." live>{done}</Notice>}
      {error !== null && <Notice tone="refused" title="Not sent." live>{problemOf(error).detail}</Notice>}
      <Table
        caption="Outgoing mail"
        rows={items}
        rowKey={({ id }) => id}
        onTurn={onTurn}
        busy={busy}
        columns={[
          { key: 'subject', header: 'Mail', plain: true, className: 'md:w-[30%]', cell: ({ subject }) => subject },
          { key: 'to', header: 'To', cell: ({ recipient }) => <>{recipient.name} <span className="block text-[0.92rem] wrap-anywhere text-soft">{recipient.email}</span></> },
          { key: 'written', header: 'Written', cell: ({ createdAt }) => <Time at={createdAt} precise /> },
          { key: 'fate', header: 'Fate', cell: (item) => <Fate item={item} /> },
          {
            key: 'again', header: 'Again', plain: true,
            cell: (item) =>
              item.abilities.resend && (
                <Button tone="quiet" className="whitespace-nowrap" busy={sending === item.id && 'Sending …'} aria-label={`Send “${item.subject}” to ${item.recipient.name} again`} onClick={() => void resend(item)}>
                  Send again
                </Button>
              ),
          },
        ]}
      />
    </div>
  )
}

/** A mail that goes out within this is told to have gone at once. */
const AT_ONCE_MS = 2 * 60_000

function Fate({ item: { state, attempts, createdAt, sentAt, nextAttemptAt, lastError } }: { item: OutboxItem }) {
  return (
    <span>
      <span className={COLOURS[state]}>{MAIL_STATES[state]}</span>
      {sentAt && (Date.parse(sentAt) - Date.parse(createdAt) < AT_ONCE_MS ? ' at once' : <> <Time at={sentAt} precise /></>)}
      {state === 'waiting' && attempts > 0 && nextAttemptAt && <>, tried again <Time at={nextAttemptAt} precise /></>}
      {attempts > 1 && <span className="text-soft">, {attempts} attempts</span>}
      {lastError && <span className="block text-[0.92rem] break-words text-soft">The mail server said: {lastError}</span>}
    </span>
  )
}
