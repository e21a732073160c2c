import { useState } from 'react'
import type { OwnSession } from '../../../../../shared/schemas/session.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Confirm } from '../../../components/ui/confirm.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { deviceInWords } from '../device.ts'

interface SessionListProps {
  sessions: OwnSession[]
  onEnd: (ids: string[]) => Promise<unknown>
}

/** Where one is signed in, each with the way to end it. */
export function SessionList({ sessions, onEnd }: SessionListProps) {
  const [ended, setEnded] = useState<string | null>(null)
  const [ending, setEnding] = useState<string | null>(null)
  const [refused, setRefused] = useState(false)
  const [askingAll, setAskingAll] = useState(false)
  const others = sessions.filter(({ current }) => !current)

  const end = async (ids: string[], what: string) => {
    setEnded(null)
    setRefused(false)
    setEnding(ids.length === 1 ? (ids[0] ?? null) : 'all')
    try {
      await onEnd(ids)
      setEnded(what)
      setAskingAll(false)
    } catch {
      setRefused(true)
    } finally {
      setEnding(null)
    }
  }

  return (
    <div className="grid gap-4">
      {ended && <Notice tone="done" title="Ended." live>{ended} Whoever used it has to sign in again.</Notice>}
      {refused && <Notice tone="refused" title="Not ended." live>The server did not take it. The list is read again; try once more.</Notice>}
      <Table
        caption="Where you are signed in"
        rows={sessions}
        rowKey={({ id }) => id}
        columns={[
          { key: 'device', header: 'With', cell: ({ userAgent, current }) => <span title={userAgent}>{deviceInWords(userAgent)}{current && <strong className="font-semibold"> (this one)</strong>}</span> },
          { key: 'address', header: 'From', cell: ({ address }) => address },
          { key: 'since', header: 'Signed in', cell: ({ createdAt }) => <Time at={createdAt} precise /> },
          { key: 'seen', header: 'Last used', cell: ({ lastSeenAt }) => <Time at={lastSeenAt} precise /> },
          {
            key: 'end', header: 'End it', plain: true,
            cell: ({ id, current, userAgent, address }) =>
              current ? (
                <span className="text-soft">by signing out</span>
              ) : (
                <Button tone="quiet" className="whitespace-nowrap" busy={ending === id && 'Ending …'} aria-label={`End the session with ${deviceInWords(userAgent)} from ${address}`} onClick={() => void end([id], `The session with ${deviceInWords(userAgent)} from ${address} is over.`)}>
                  End
                </Button>
              ),
          },
        ]}
      />
      {others.length > 1 && (
        <p>
          <Button onClick={() => setAskingAll(true)}>End the {others.length} others</Button>
        </p>
      )}
      <Confirm
        open={askingAll}
        title={`End ${others.length} sessions`}
        act={`End ${others.length} sessions`}
        busy={ending === 'all' && 'Ending …'}
        onConfirm={() => void end(others.map(({ id }) => id), `${others.length} sessions are over.`)}
        onClose={() => setAskingAll(false)}
      >
        <p>Every session but this one ends at once. Forms that are open there can’t be sent any more without signing in again.</p>
      </Confirm>
    </div>
  )
}
