import { useWatch } from 'react-hook-form'
import { pageHead } from '../../../../shared/page-head.ts'
import type { ClaimInput } from '../../../../shared/schemas/claim.ts'
import { Button } from '../../components/ui/button.tsx'
import { Choice, Field, FieldSet, TextArea, TextInput } from '../../components/ui/field.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'
import type { ClaimFormValues } from '../../features/claims/claim-form.ts'
import type { ApiForm } from '../../lib/use-api-form.ts'

type Form = ApiForm<ClaimFormValues, ClaimInput>

export function NewClaimView({ form: api }: { form: Form }) {
  const { form, submit, errorAt, rootError, sending } = api
  const kind = useWatch({ control: form.control, name: 'kind' })
  return (
    <Page about={pageHead('newClaim')} head={<h1>New claim</h1>}>
      <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl justify-items-start gap-6">
        <FieldSet legend="What is claimed">
          <Choice type="radio" value="stated" label="a value from elsewhere" hint="Digits or an interval from a paper or a program, with the source. It is shown as not repeated here until a run of ours meets it." {...form.register('kind')} />
          <Choice type="radio" value="order" label="an order between two constants" hint="Certified by their best signed enclosures, which must have no number in common." {...form.register('kind')} />
        </FieldSet>
        {kind === 'stated' ? <StatedFields api={api} /> : <OrderFields api={api} />}
        <Field label="Remark" hint="What a referee should know; you can change it until you submit the claim." error={errorAt('remark')} className="w-full">
          {(control) => <TextArea {...control} {...form.register('remark')} />}
        </Field>
        {rootError && (
          <Notice tone="refused" title="No draft was made." live>
            {rootError}
          </Notice>
        )}
        <div>
          <Button type="submit" tone="act" busy={sending && 'Drafting …'}>
            Draft the claim
          </Button>
          <p className="mt-2 text-soft">A draft can be changed and deleted. Evidence is added to it before it is submitted.</p>
        </div>
      </form>
    </Page>
  )
}

function StatedFields({ api: { form, errorAt } }: { api: Form }) {
  const reading = useWatch({ control: form.control, name: 'form' })
  const decimal = { spellCheck: false, autoComplete: 'off', inputMode: 'decimal' } as const
  return (
    <>
      <NumberField label="Constant" name="constant" form={form} error={errorAt('constant')} />
      <FieldSet legend="It is given as">
        <Choice type="radio" value="truncated" label="digits, truncated" {...form.register('form')} />
        <Choice type="radio" value="rounded" label="digits, rounded" {...form.register('form')} />
        <Choice type="radio" value="interval" label="an interval" {...form.register('form')} />
      </FieldSet>
      {reading === 'interval' ? (
        <div className="grid w-full gap-5">
          <Field label="Lower end" error={errorAt('lo')}>{(control) => <TextInput {...control} {...form.register('lo')} {...decimal} />}</Field>
          <Field label="Upper end" error={errorAt('hi')}>{(control) => <TextInput {...control} {...form.register('hi')} {...decimal} />}</Field>
        </div>
      ) : (
        <Field label="Digits" hint="As printed; spaces, groups, line breaks and LaTeX are understood." error={errorAt('digits')} className="w-full">
          {(control) => <TextArea {...control} {...form.register('digits')} rows={2} spellCheck={false} className="min-h-16 break-all" />}
        </Field>
      )}
      <Field label="Source" hint="Journal or arXiv number with page, theorem or table; or the program with its version." error={errorAt('source')} className="w-full">
        {(control) => <TextArea {...control} {...form.register('source')} rows={2} className="min-h-16" />}
      </Field>
    </>
  )
}

function OrderFields({ api: { form, errorAt } }: { api: Form }) {
  return (
    <div className="flex flex-wrap gap-x-6 gap-y-5">
      <NumberField label="The lesser constant" name="lesser" form={form} error={errorAt('lesser')} />
      <NumberField label="The greater constant" name="greater" form={form} error={errorAt('greater')} />
    </div>
  )
}

function NumberField({ label, name, form, error }: { label: string; name: 'constant' | 'lesser' | 'greater'; form: Form['form']; error: string | undefined }) {
  return (
    <Field label={label} hint="Register number, such as MST-0042" error={error}>
      {(control) => <TextInput {...control} {...form.register(name)} autoComplete="off" className="max-w-44" />}
    </Field>
  )
}
