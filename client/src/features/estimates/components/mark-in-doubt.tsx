import { useState } from 'react'
import { z } from 'zod'
import { longText } from '../../../../../shared/schemas/common.ts'
import type { EstimateDoubt } from '../../../../../shared/schemas/estimate.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Actions } from '../../../components/ui/dialog.tsx'
import { Field, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { claimCount, markTells, ofFate } from '../doubt-words.ts'
import { RestingClaims } from './resting-claims.tsx'

const reasonForm = z.object({ reason: longText })

interface MarkInDoubtProps {
  doubt: EstimateDoubt
  onMark: (reason: string) => Promise<unknown>
}

/** All that would fall, and the act that brings it down. */
export function MarkInDoubt({ doubt, onMark }: MarkInDoubtProps) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <p className="mb-5 max-w-prose">{markTells(doubt)}</p>
      <RestingClaims doubt={doubt} />
      {open ? (
        <MarkForm doubt={doubt} onMark={onMark} onCancel={() => setOpen(false)} />
      ) : (
        <div className="mt-6">
          <Button onClick={() => setOpen(true)}>Mark in doubt …</Button>
        </div>
      )}
    </>
  )
}

function MarkForm({ doubt, onMark, onCancel }: MarkInDoubtProps & { onCancel: () => void }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(reasonForm, { reason: '' }, ({ reason }) => onMark(reason))
  const falls = ofFate(doubt, 'falls').length
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="mt-6 grid max-w-prose gap-4">
      <Field label="Reason" hint="It is told to authors and referees by mail, kept in the audit trail, and shown to every reader of the estimate." error={errorAt('reason')} required>
        {(control) => <TextArea {...control} {...form.register('reason')} autoFocus />}
      </Field>
      {rootError && (
        <Notice tone="refused" title="Nothing was changed." live>
          {rootError}
        </Notice>
      )}
      <Actions>
        <Button type="submit" tone="grave" busy={sending && (falls > 0 ? `Suspending ${claimCount(falls)} …` : 'Marking …')}>
          {falls > 0 ? `Mark in doubt and suspend ${claimCount(falls)}` : 'Mark in doubt'}
        </Button>
        <Button onClick={onCancel}>Not now</Button>
      </Actions>
    </form>
  )
}
