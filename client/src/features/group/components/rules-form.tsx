import { useState } from 'react'
import { groupPatch } from '../../../../../shared/schemas/group.ts'
import type { Group } from '../../../../../shared/schemas/group.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Choice, Field, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Facts } from '../../../components/ui/page.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import type { GroupPatch } from '../queries.ts'

/** The group's rules, for a member who may only read them. */
export function RulesFacts({ group }: { group: Group }) {
  return (
    <Facts
      facts={[
        ['Confirmations', `${group.confirmationsNeeded} by referees before a claim is endorsed`],
        ['Recheck', group.recheckNeeded ? 'a computed enclosure needs one by other arithmetic or another method' : 'is not asked for'],
        ['Reminder', `after ${group.reminderDays} ${group.reminderDays === 1 ? 'day' : 'days'}`],
        ['Signed claims', group.public ? 'are read without an account' : 'are read by members only'],
      ]}
    />
  )
}

/** The group's rules, for a lead. */
export function RulesForm({ group, onSave }: { group: Group; onSave: (patch: GroupPatch) => Promise<unknown> }) {
  const { confirmationsNeeded, recheckNeeded, reminderDays, public: isPublic } = group
  const [saved, setSaved] = useState(false)
  const { form, submit, errorAt, rootError, sending } = useApiForm(groupPatch, { confirmationsNeeded, recheckNeeded, reminderDays, public: isPublic }, async (values) => {
    setSaved(false)
    await onSave(values)
    setSaved(true)
  })
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl gap-5">
      {rootError && (
        <Notice tone="refused" title="Not saved." live>
          {rootError}
        </Notice>
      )}
      {saved && (
        <Notice tone="done" title="Saved." live>
          The rules hold from now on, for claims under review too. What is endorsed or signed stays so.
        </Notice>
      )}
      <Field label="Confirmations needed" hint="By referees without an open objection, before a claim is endorsed." narrow error={errorAt('confirmationsNeeded')}>
        {(control) => <TextInput {...control} {...form.register('confirmationsNeeded', { valueAsNumber: true })} type="number" min={1} max={9} />}
      </Field>
      <Choice
        {...form.register('recheckNeeded')}
        label="A computed enclosure needs a recheck"
        hint="At least one run by other arithmetic or another method whose enclosure meets the claimed one."
      />
      <Field label="Days before a reminder" hint="Whoever is to act is reminded by mail after so many days." narrow error={errorAt('reminderDays')}>
        {(control) => <TextInput {...control} {...form.register('reminderDays', { valueAsNumber: true })} type="number" min={1} max={365} />}
      </Field>
      <Choice
        {...form.register('public')}
        label="Signed claims are public"
        hint="Anybody reads them, their certificates and their definitions without an account. Drafts and reviews never are."
      />
      <div>
        <Button type="submit" busy={sending && 'Saving …'}>
          Save the rules
        </Button>
      </div>
    </form>
  )
}
