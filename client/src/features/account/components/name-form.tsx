import { useState } from 'react'
import { z } from 'zod'
import { shortText } from '../../../../../shared/schemas/common.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'

const schema = z.object({ name: shortText })

interface NameFormProps {
  name: string
  onSave: (name: string) => Promise<unknown>
}

/** The name under which one's claims, reviews and signatures are shown. */
export function NameForm({ name, onSave }: NameFormProps) {
  const [saved, setSaved] = useState<string | null>(null)
  const { form, submit, errorAt, rootError, sending } = useApiForm(schema, { name }, async (values) => {
    setSaved(null)
    await onSave(values.name)
    setSaved(values.name)
  })
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl gap-4">
      {rootError && <Notice tone="refused" title="Not saved." live>{rootError}</Notice>}
      {saved && <Notice tone="done" title="Saved." live>From now on you appear as {saved}. What you signed keeps the name you had then.</Notice>}
      <Field label="Name" hint="As it is to stand on claims, reviews and signatures." error={errorAt('name')}>
        {(control) => <TextInput {...control} {...form.register('name')} autoComplete="name" />}
      </Field>
      <div>
        <Button type="submit" busy={sending && 'Saving …'}>
          Save name
        </Button>
      </div>
    </form>
  )
}
