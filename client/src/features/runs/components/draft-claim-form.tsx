import { z } from 'zod'
import { Button } from '../../../components/ui/button.tsx'
import { Field, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'

const draftForm = z.object({ remark: z.string().trim().max(20_000, 'at most 20,000 characters') })

/** Makes a draft of a claim from a finished run. */
export function DraftClaimForm({ onDraft }: { onDraft: (remark: string) => Promise<unknown> }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(draftForm, { remark: '' }, ({ remark }) => onDraft(remark))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose justify-items-start gap-4">
      <Field label="Remark" hint="What a referee should know; you can change it until you submit the claim." error={errorAt('remark')} className="w-full">
        {(control) => <TextArea {...control} {...form.register('remark')} />}
      </Field>
      {rootError && (
        <Notice tone="refused" title="No draft was made." live>
          {rootError}
        </Notice>
      )}
      <Button type="submit" tone="act" busy={sending && 'Drafting …'}>
        Draft a claim from this run
      </Button>
    </form>
  )
}
