import { useState } from 'react'
import { z } from 'zod'
import { act } from '../../../../../shared/schemas/claim.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Actions, Dialog } from '../../../components/ui/dialog.tsx'
import { Field, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { problemOf } from '../../../lib/errors.ts'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { claimName } from '../claim-words.ts'
import type { DoAct } from '../queries.ts'

export interface AuthorWorkProps {
  claim: Claim
  onAct: DoAct
  onEdit: (patch: { version: number; remark: string }) => Promise<unknown>
  onDelete: () => Promise<unknown>
}

/** What the author does with a draft or a returned claim. */
export function AuthorWork({ claim, onAct, onEdit, onDelete }: AuthorWorkProps) {
  return (
    <div className="grid gap-6">
      {claim.abilities.edit && <RemarkForm key={claim.version} claim={claim} onEdit={onEdit} />}
      <div className="flex flex-wrap items-start gap-4">
        {claim.abilities.submit && <SubmitButton claim={claim} onAct={onAct} />}
        {claim.abilities.delete && <DeleteButton claim={claim} onDelete={onDelete} />}
      </div>
      {claim.abilities.resubmit && <ResubmitForm claim={claim} onAct={onAct} />}
    </div>
  )
}

const remarkForm = z.object({ remark: z.string().trim().max(20_000, 'at most 20,000 characters') })

function RemarkForm({ claim, onEdit }: Pick<AuthorWorkProps, 'claim' | 'onEdit'>) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(remarkForm, { remark: claim.remark }, ({ remark }) => onEdit({ version: claim.version, remark }))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose justify-items-start gap-3">
      <Field label="Remark" hint="What a referee should know. It becomes part of what is signed." error={errorAt('remark') ?? rootError} className="w-full">
        {(control) => <TextArea {...control} {...form.register('remark')} />}
      </Field>
      <Button type="submit" disabled={!form.formState.isDirty} busy={sending && 'Saving …'}>
        Save the remark
      </Button>
    </form>
  )
}

function SubmitButton({ claim, onAct }: Pick<AuthorWorkProps, 'claim' | 'onAct'>) {
  // The version is the one on the page when the button is pressed: editing the remark has raised it since the form was made.
  const { submit, rootError, sending } = useApiForm(z.object({}), {}, () => onAct('submit', { version: claim.version }))
  return (
    <form onSubmit={(event) => void submit(event)}>
      <Button type="submit" tone="act" busy={sending && 'Submitting …'}>
        Submit for review
      </Button>
      {rootError && (
        <Notice tone="refused" title="Not submitted." live className="mt-3">
          {rootError}
        </Notice>
      )}
    </form>
  )
}

function DeleteButton({ claim, onDelete }: Pick<AuthorWorkProps, 'claim' | 'onDelete'>) {
  const [open, setOpen] = useState(false)
  const [failure, setFailure] = useState<unknown>(null)
  return (
    <>
      <Button onClick={() => setOpen(true)}>Delete the draft …</Button>
      <Dialog open={open} title={`Delete the ${claimName(claim)}`} onClose={() => setOpen(false)}>
        <p>The draft, its remark and its evidence are gone for good. The run it was made from stays.</p>
        {failure ? (
          <Notice tone="refused" title="Not deleted." live className="mt-3">
            {problemOf(failure).detail}
          </Notice>
        ) : null}
        <Actions>
          <Button tone="grave" onClick={() => void onDelete().catch(setFailure)}>
            Delete the {claimName(claim)}
          </Button>
          <Button onClick={() => setOpen(false)}>Not now</Button>
        </Actions>
      </Dialog>
    </>
  )
}

const resubmitForm = act.resubmit.pick({ remark: true })

function ResubmitForm({ claim, onAct }: Pick<AuthorWorkProps, 'claim' | 'onAct'>) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(resubmitForm, { remark: '' }, ({ remark }) => onAct('resubmit', { version: claim.version, remark }))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose justify-items-start gap-3">
      <Field label="What has changed" hint="For the referees, who look at the claim again." error={errorAt('remark')} className="w-full">
        {(control) => <TextArea {...control} {...form.register('remark')} />}
      </Field>
      {rootError && (
        <Notice tone="refused" title="Not resubmitted." live>
          {rootError}
        </Notice>
      )}
      <Button type="submit" tone="act" busy={sending && 'Resubmitting …'}>
        Resubmit {claimName(claim)}
      </Button>
    </form>
  )
}
