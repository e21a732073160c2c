import type { UseFormRegisterReturn } from 'react-hook-form'
import { ROLES } from '../../../../../shared/permissions.ts'
import { Choice, FieldError, FieldSet } from '../../../components/ui/field.tsx'
import { ROLE_WORDS } from '../role-words.ts'

interface RolesFieldProps {
  legend: string
  field: UseFormRegisterReturn
  error: string | undefined
}

/** The roles as choices, each with what it lets a member do. */
export function RolesField({ legend, field, error }: RolesFieldProps) {
  return (
    <FieldSet legend={legend}>
      {ROLES.map((role) => (
        <Choice key={role} {...field} value={role} label={role} hint={ROLE_WORDS[role]} />
      ))}
      <FieldError error={error} />
    </FieldSet>
  )
}
