import { pageHead } from '../../../../shared/page-head.ts'
import type { Role } from '../../../../shared/permissions.ts'
import type { Group } from '../../../../shared/schemas/group.ts'
import type { Invitation, InvitationInput, Member } from '../../../../shared/schemas/member.ts'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { GroupHead } from '../../features/group/components/group-head.tsx'
import { RulesFacts, RulesForm } from '../../features/group/components/rules-form.tsx'
import type { GroupPatch } from '../../features/group/queries.ts'
import { InvitationTable } from '../../features/invitations/components/invitation-table.tsx'
import { InviteForm } from '../../features/invitations/components/invite-form.tsx'
import { LeaveGroup } from '../../features/members/components/leave-group.tsx'
import { MemberTable } from '../../features/members/components/member-table.tsx'
import { ROLE_WORDS } from '../../features/members/role-words.ts'

interface GroupViewProps {
  group: Fetched<Group>
  members: Fetched<Member[]>
  /** Null for a reader who may not invite. */
  invitations: Fetched<Invitation[]> | null
  ownId: string | null
  onChangeRoles: (id: string, roles: Role[]) => Promise<unknown>
  onEndMembership: (id: string) => Promise<unknown>
  onInvite: (input: InvitationInput) => Promise<Invitation>
  onResend: (id: string) => Promise<unknown>
  onRevoke: (id: string) => Promise<unknown>
  onRules: (patch: GroupPatch) => Promise<unknown>
  onLeave: (input: { password: string }) => Promise<unknown>
}

/** Members, invitations, rules, and the way out. */
export function GroupView(props: GroupViewProps) {
  const { group, members, invitations, ownId } = props
  return (
    <Page about={pageHead('group')} head={<GroupHead group={group.data} />} margin={<RoleNotes />}>
      <Section title="Members">
        <Part of={members} what="the members">
          {(list) => <MemberTable members={list} ownId={ownId} onChangeRoles={props.onChangeRoles} onEnd={props.onEndMembership} />}
        </Part>
      </Section>
      {invitations && (
        <>
          <Section title="Invitations" id="invitations">
            <Part of={invitations} what="the invitations">
              {(list) => <InvitationTable invitations={list} onResend={props.onResend} onRevoke={props.onRevoke} />}
            </Part>
          </Section>
          <Section title="Invite somebody" id="invite">
            <InviteForm onInvite={props.onInvite} />
          </Section>
        </>
      )}
      <Part of={group} what="the group">
        {(data) => (
          <>
            <Section title="Rules" id="rules">
              {data.abilities.setRules ? <RulesForm group={data} onSave={props.onRules} /> : <RulesFacts group={data} />}
            </Section>
            {data.abilities.leave && (
              <Section title="Leaving" id="leaving">
                <LeaveGroup group={data.name} onLeave={props.onLeave} />
              </Section>
            )}
          </>
        )}
      </Part>
    </Page>
  )
}

function RoleNotes() {
  return (
    <>
      {Object.entries(ROLE_WORDS).map(([role, words]) => (
        <MarginNote key={role} title={`A ${role}`}>
          <p>{words}.</p>
        </MarginNote>
      ))}
      <MarginNote title="Nobody alone">
        <p>An author neither referees nor signs their own claim, and a referee of a claim can’t sign it, whatever their roles.</p>
      </MarginNote>
    </>
  )
}
