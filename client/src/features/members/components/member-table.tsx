import { useState } from 'react'
import type { Role } from '../../../../../shared/permissions.ts'
import type { Member } from '../../../../../shared/schemas/member.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Confirm } from '../../../components/ui/confirm.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Table } from '../../../components/ui/table.tsx'
import type { Column } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { RolesDialog } from './roles-dialog.tsx'

interface MemberTableProps {
  members: Member[]
  /** The reader, among the members. */
  ownId: string | null
  onChangeRoles: (id: string, roles: Role[]) => Promise<unknown>
  onEnd: (id: string) => Promise<unknown>
}

/** Members with their roles; a lead changes roles and ends memberships here. */
export function MemberTable({ members, ownId, onChangeRoles, onEnd }: MemberTableProps) {
  const [changing, setChanging] = useState<Member | null>(null)
  const [ending, setEnding] = useState<Member | null>(null)
  const [busy, setBusy] = useState(false)
  const [error, setError] = useState<unknown>(null)
  const [done, setDone] = useState<string | null>(null)
  const active = members.filter(({ state }) => state === 'active')
  const former = members.filter(({ state }) => state === 'left')
  const manages = active.some(({ abilities }) => abilities.changeRoles || abilities.endMembership)

  const end = async (member: Member) => {
    setBusy(true)
    setError(null)
    try {
      await onEnd(member.id)
      setDone(`${member.name} is no longer a member. Sessions and access tokens have ended; the name stays on what was signed.`)
      setEnding(null)
    } catch (refusal) {
      setError(refusal)
    } finally {
      setBusy(false)
    }
  }

  const columns: Column<Member>[] = [
    { key: 'name', header: 'Name', plain: true, cell: ({ id, name }) => <span className="font-semibold">{name}{id === ownId && <span className="font-normal text-soft"> (you)</span>}</span> },
    {
      key: 'email', header: 'Address',
      cell: ({ email, mailBouncedAt }) => (
        <span className="wrap-anywhere">
          {email}
          {mailBouncedAt && <span className="block text-[0.92rem] text-refused">mail comes back since <Time at={mailBouncedAt} /></span>}
        </span>
      ),
    },
    { key: 'roles', header: 'Roles', cell: ({ roles }) => roles.join(', ') },
    { key: 'since', header: 'Since', cell: ({ joinedAt }) => <Time at={joinedAt} /> },
  ]
  if (manages)
    columns.push({
      key: 'acts', header: 'Change', plain: true,
      cell: (member) => (
        <span className="flex flex-wrap gap-x-5">
          {member.abilities.changeRoles && <Button tone="quiet" className="whitespace-nowrap" aria-label={`Change the roles of ${member.name}`} onClick={() => setChanging(member)}>Roles</Button>}
          {member.abilities.endMembership && <Button tone="quiet" className="whitespace-nowrap" aria-label={`End the membership of ${member.name}`} onClick={() => { setError(null); setEnding(member) }}>End membership</Button>}
        </span>
      ),
    })

  return (
    <div className="grid gap-4">
      {done && <Notice tone="done" title="Done." live>{done}</Notice>}
      <Table caption="Members" columns={columns} rows={active} rowKey={({ id }) => id} />
      {former.length > 0 && (
        <p className="text-[0.92rem] text-soft">
          Former members: {former.map(({ id, name, leftAt }, index) => <span key={id}>{index > 0 && ', '}{name}{leftAt && <> (until <Time at={leftAt} />)</>}</span>)}.
        </p>
      )}
      <RolesDialog
        member={changing}
        self={changing?.id === ownId}
        onClose={() => setChanging(null)}
        onSave={async (roles) => {
          if (!changing) return
          await onChangeRoles(changing.id, roles)
          setDone(`${changing.name} is now ${roles.join(', ')}.`)
          setChanging(null)
        }}
      />
      <Confirm
        open={ending !== null}
        title={`End the membership of ${ending?.name ?? ''}`}
        act={`End the membership of ${ending?.name ?? ''}`}
        busy={busy && 'Ending …'}
        error={error}
        onConfirm={() => ending && void end(ending)}
        onClose={() => setEnding(null)}
      >
        <p>{ending?.name} is signed out everywhere and can’t sign in any more; access tokens stop working. What was claimed, confirmed and signed stays, with the name.</p>
        <p>It can’t be undone; you can invite the person anew.</p>
      </Confirm>
    </div>
  )
}
