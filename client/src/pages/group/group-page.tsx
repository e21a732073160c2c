import { useQuery } from '@tanstack/react-query'
import { useNavigate } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { fetched } from '../../components/ui/fetched.tsx'
import { groupQuery, useChangeRules } from '../../features/group/queries.ts'
import { invitationsQuery, useInvite, useResendInvitation, useRevokeInvitation } from '../../features/invitations/queries.ts'
import { membersQuery, useChangeRoles, useEndMembership, useLeaveGroup } from '../../features/members/queries.ts'
import { useSession } from '../../features/session/queries.ts'
import { GroupView } from './group-view.tsx'

export function GroupPage() {
  const navigate = useNavigate()
  const { member, may } = useSession()
  const mayInvite = may('members.manage')
  const group = useQuery(groupQuery())
  const members = useQuery(membersQuery())
  const invitations = useQuery({ ...invitationsQuery(), enabled: mayInvite })
  const rules = useChangeRules()
  const roles = useChangeRoles()
  const end = useEndMembership()
  const { leave, forget } = useLeaveGroup()
  const invite = useInvite()
  const resend = useResendInvitation()
  const revoke = useRevokeInvitation()

  return (
    <GroupView
      group={fetched(group)}
      members={fetched(members)}
      invitations={mayInvite ? fetched(invitations) : null}
      ownId={member?.id ?? null}
      onChangeRoles={(id, list) => roles.mutateAsync({ id, roles: list })}
      onEndMembership={end.mutateAsync}
      onInvite={invite.mutateAsync}
      onResend={resend.mutateAsync}
      onRevoke={revoke.mutateAsync}
      onRules={rules.mutateAsync}
      onLeave={async (input) => {
        await leave(input)
        await navigate(paths.groupLeft(), { replace: true, state: { group: group.data?.name } })
        await forget()
      }}
    />
  )
}
