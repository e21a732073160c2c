import { memberPatch } from '../../../../../shared/schemas/member.ts'
import type { Member } from '../../../../../shared/schemas/member.ts'
import type { Role } from '../../../../../shared/permissions.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Actions, Dialog } from '../../../components/ui/dialog.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { RolesField } from './roles-field.tsx'

interface RolesDialogProps {
  /** Whose roles are asked for; null: nobody's, and nothing is shown. */
  member: Member | null
  self: boolean
  onSave: (roles: Role[]) => Promise<unknown>
  onClose: () => void
}

/** Adds and takes roles of a member. */
export function RolesDialog({ member, self, onSave, onClose }: RolesDialogProps) {
  return (
    <Dialog open={member !== null} title={self ? 'Change your own roles' : `Change the roles of ${member?.name ?? ''}`} onClose={onClose}>
      {member && <RolesForm key={member.id} member={member} self={self} onSave={onSave} onClose={onClose} />}
    </Dialog>
  )
}

function RolesForm({ member, self, onSave, onClose }: RolesDialogProps & { member: Member }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(memberPatch, { roles: member.roles }, ({ roles }) => onSave(roles))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-4">
      {rootError && (
        <Notice tone="refused" title="Not changed." live>
          {rootError}
        </Notice>
      )}
      <RolesField legend={self ? 'You are' : `${member.name} is`} field={form.register('roles')} error={errorAt('roles')} />
      <p className="text-soft">
        It holds at once. {self ? 'If you stop being a lead, another lead has to give the role back.' : 'What was signed or confirmed before stays as it is.'}
      </p>
      <Actions>
        <Button type="submit" tone="act" busy={sending && 'Changing …'}>
          Change the roles
        </Button>
        <Button onClick={onClose}>Leave them as they are</Button>
      </Actions>
    </form>
  )
}
