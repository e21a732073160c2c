import { useState } from 'react'
import type { Role } from '../../../../../shared/permissions.ts'
import { mailPreferences } from '../../../../../shared/schemas/member.ts'
import type { MailPreferences } from '../../../../../shared/schemas/member.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Choice, FieldSet } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { askingMails, OPTIONAL_MAILS } from '../mails.ts'

interface MailFormProps {
  preferences: MailPreferences
  roles: readonly Role[]
  email: string
  onSave: (preferences: MailPreferences) => Promise<unknown>
}

/** Which mails one wants. Those that ask for an act are shown, and can't be switched off. */
export function MailForm({ preferences, roles, email, onSave }: MailFormProps) {
  const [saved, setSaved] = useState(false)
  const { form, submit, rootError, sending } = useApiForm(mailPreferences, preferences, async (values) => {
    setSaved(false)
    await onSave(values)
    setSaved(true)
  })
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl gap-5">
      {rootError && <Notice tone="refused" title="Not saved." live>{rootError}</Notice>}
      {saved && <Notice tone="done" title="Saved." live>It holds for every mail written from now on.</Notice>}
      <FieldSet legend={<>Tell me at {email} when</>}>
        {Object.entries(OPTIONAL_MAILS).map(([key, words]) => (
          <Choice key={key} {...form.register(key as keyof MailPreferences)} label={words} />
        ))}
      </FieldSet>
      <div>
        <h3>Always sent, because they ask you to act</h3>
        <ul className="mt-1 list-['–__'] pl-4 text-soft">
          {askingMails(roles).map((words) => (
            <li key={words}>{words}</li>
          ))}
        </ul>
      </div>
      <div>
        <Button type="submit" busy={sending && 'Saving …'}>
          Save mail preferences
        </Button>
      </div>
    </form>
  )
}
