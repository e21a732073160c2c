import { useEffect } from 'react'
import { accessTokenInput, tokenScope } from '../../../../../shared/schemas/session.ts'
import type { AccessTokenInput } from '../../../../../shared/schemas/session.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Choice, Field, FieldError, FieldSet, Select, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { LIFETIMES, SCOPES } from '../token-words.ts'

/** Asks for a new access token. */
export function TokenForm({ onCreate }: { onCreate: (input: AccessTokenInput) => Promise<unknown> }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(accessTokenInput, { name: '', scopes: ['read'], days: 90 }, async (values) => {
    await onCreate(values)
  })
  // The library's own way: only once it has counted the submission as done does emptying the fields last.
  const { isSubmitSuccessful } = form.formState
  useEffect(() => {
    if (isSubmitSuccessful) form.reset()
  }, [form, isSubmitSuccessful])
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl gap-4">
      <h3 className="text-[1.1rem]">A new token</h3>
      {rootError && <Notice tone="refused" title="Not made." live>{rootError}</Notice>}
      <Field label="Name" hint="What it is for, so that you know it again: “table of k = 1 … 12”." error={errorAt('name')}>
        {(control) => <TextInput {...control} {...form.register('name')} autoComplete="off" />}
      </Field>
      <FieldSet legend="It may">
        {tokenScope.options.map((scope) => (
          <Choice key={scope} {...form.register('scopes')} value={scope} label={SCOPES[scope].label} hint={SCOPES[scope].hint} />
        ))}
        <FieldError error={errorAt('scopes')} />
      </FieldSet>
      <Field label="It expires after" narrow error={errorAt('days')}>
        {(control) => (
          <Select {...control} {...form.register('days', { valueAsNumber: true })}>
            {LIFETIMES.map(([days, words]) => (
              <option key={days} value={days}>
                {words}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <div>
        <Button type="submit" busy={sending && 'Making …'}>
          Make an access token
        </Button>
      </div>
    </form>
  )
}
