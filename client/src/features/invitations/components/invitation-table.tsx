import { useState } from 'react'
import type { Invitation } from '../../../../../shared/schemas/member.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Confirm } from '../../../components/ui/confirm.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { problemOf } from '../../../lib/errors.ts'

const STATES: Record<Invitation['state'], string> = { open: 'open', accepted: 'accepted', expired: 'expired', revoked: 'taken back' }

interface InvitationTableProps {
  invitations: Invitation[]
  onResend: (id: string) => Promise<unknown>
  onRevoke: (id: string) => Promise<unknown>
}

/** Invitations that wait to be accepted, and below them how the earlier ones ended. */
export function InvitationTable({ invitations, onResend, onRevoke }: InvitationTableProps) {
  const [asked, setAsked] = useState<Invitation | null>(null)
  const [working, setWorking] = useState<string | null>(null)
  const [error, setError] = useState<unknown>(null)
  const [done, setDone] = useState<string | null>(null)
  const pending = invitations.filter(({ state }) => state === 'open' || state === 'expired')
  const ended = invitations.filter(({ state }) => state === 'accepted' || state === 'revoked')

  const act = async (id: string, send: (id: string) => Promise<unknown>, said: string) => {
    setWorking(id)
    setError(null)
    setDone(null)
    try {
      await send(id)
      setDone(said)
      setAsked(null)
    } catch (refusal) {
      setError(refusal)
    } finally {
      setWorking(null)
    }
  }

  return (
    <div className="grid gap-4">
      {done && <Notice tone="done" title="Done." live>{done}</Notice>}
      {error !== null && asked === null && <Notice tone="refused" title="Refused." live>{problemOf(error).detail}</Notice>}
      {pending.length === 0 ? (
        <p className="text-soft">No invitation is waiting to be accepted.</p>
      ) : (
        <Table
          caption="Invitations waiting"
          rows={pending}
          rowKey={({ id }) => id}
          columns={[
            { key: 'who', header: 'Invited', plain: true, cell: ({ name, email }) => <><span className="font-semibold">{name}</span> <span className="break-words text-soft">{email}</span></> },
            { key: 'roles', header: 'As', cell: ({ roles }) => roles.join(', ') },
            { key: 'by', header: 'By', cell: ({ invitedBy, createdAt }) => <>{invitedBy?.name ?? 'a former member'}, <Time at={createdAt} /></> },
            { key: 'until', header: 'Until', cell: ({ expiresAt, state }) => (state === 'expired' ? <span className="text-undecided">expired <Time at={expiresAt} /></span> : <Time at={expiresAt} />) },
            {
              key: 'acts', header: 'Change', plain: true,
              cell: (invitation) => (
                <span className="flex flex-wrap gap-x-5">
                  {invitation.abilities.resend && (
                    <Button
                      tone="quiet"
                      className="whitespace-nowrap"
                      aria-label={`Send the invitation of ${invitation.name} again`}
                      busy={working === invitation.id && asked === null && 'Sending …'}
                      onClick={() => void act(invitation.id, onResend, `A new link goes to ${invitation.email}; the link sent before works no more.`)}
                    >
                      Send again
                    </Button>
                  )}
                  {invitation.abilities.revoke && (
                    <Button tone="quiet" className="whitespace-nowrap" aria-label={`Take back the invitation of ${invitation.name}`} onClick={() => { setError(null); setAsked(invitation) }}>
                      Take back
                    </Button>
                  )}
                </span>
              ),
            },
          ]}
        />
      )}
      {ended.length > 0 && (
        <details>
          <summary className="text-soft">Earlier invitations ({ended.length})</summary>
          <ul className="mt-2 text-[0.92rem]">
            {ended.map(({ id, name, email, state, createdAt }) => (
              <li key={id}>{name}, {email}: sent <Time at={createdAt} />, {STATES[state]}.</li>
            ))}
          </ul>
        </details>
      )}
      <Confirm
        open={asked !== null}
        title={`Take back the invitation of ${asked?.name ?? ''}`}
        act="Take back the invitation"
        busy={working !== null && 'Taking back …'}
        error={error}
        onConfirm={() => asked && void act(asked.id, onRevoke, `The link sent to ${asked.email} works no more.`)}
        onClose={() => setAsked(null)}
      >
        <p>The link that was mailed to {asked?.email} stops working at once. You can invite the person anew.</p>
      </Confirm>
    </div>
  )
}
