import { useEffect, useRef, useState } from 'react'
import { z } from 'zod'
import { longText } from '../../../../../shared/schemas/common.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { Printed } from '../../../components/formula/printed.tsx'
import { Button } from '../../../components/ui/button.tsx'
import { Choice, Field, FieldSet, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { claimName } from '../claim-words.ts'
import type { DoAct } from '../queries.ts'

const verdictForm = z.object({ text: longText, checked: z.array(z.boolean()), verdict: z.enum(['confirm', 'object']) })

/** Typing pauses this long before the private draft is kept on the server. */
const KEEP_AFTER = 1_200

interface VerdictFormProps {
  claim: Claim
  onAct: DoAct
  onKeepDraft: (text: string) => Promise<unknown>
}

/** The referee's verdict with the checklist made from the certificate. What is typed is kept as a private draft. */
export function VerdictForm({ claim, onAct, onKeepDraft }: VerdictFormProps) {
  const { checklist, abilities } = claim
  const { form, submit, errorAt, rootError, sending } = useApiForm(
    verdictForm,
    { text: claim.draftVerdict ?? '', checked: checklist.map(() => false), verdict: 'confirm' },
    ({ text, checked, verdict }) =>
      verdict === 'object'
        ? onAct('object', { text })
        : onAct('confirm', { version: claim.version, remark: text, checklist: checklist.map(({ item }, index) => ({ item, checked: checked[index] ?? false })) }),
  )
  const kept = useKeptDraft(onKeepDraft)
  const text = form.register('text', { onChange: (event: { target: { value: string } }) => kept.keep(event.target.value) })
  const deciding = (verdict: 'confirm' | 'object') => ({ type: 'submit' as const, onClick: () => form.setValue('verdict', verdict) })
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-4">
      <h3>Your verdict</h3>
      {checklist.length > 0 && (
        <FieldSet legend="What I have checked">
          {checklist.map(({ item, detail }, index) => (
            <Choice key={item} label={<Printed text={item} />} hint={<Printed text={detail} />} {...form.register(`checked.${index}`)} />
          ))}
        </FieldSet>
      )}
      <Field label="Remark, or the reason of your objection" hint="Nobody but you sees it until you confirm or object." error={errorAt('text')} className="max-w-prose">
        {(control) => <TextArea {...control} {...text} rows={5} />}
      </Field>
      <p role="status" className="-mt-2 text-[0.88rem] text-soft empty:hidden">
        {kept.said}
      </p>
      {rootError && (
        <Notice tone="refused" title="Your verdict was not taken." live>
          {rootError}
        </Notice>
      )}
      <p className="max-w-prose text-soft">Confirming counts towards the endorsement of the claim as it stands. Objecting returns it to its author, who answers.</p>
      <div className="flex flex-wrap gap-4">
        {abilities.confirm && (
          <Button {...deciding('confirm')} tone="act" disabled={sending}>
            Confirm {claimName(claim)}
          </Button>
        )}
        {abilities.object && (
          <Button {...deciding('object')} disabled={sending}>
            Object to {claimName(claim)}
          </Button>
        )}
      </div>
    </form>
  )
}

/** Keeps a draft on the server once typing pauses; a draft that could not be kept is said, and tried again with the next letter. */
function useKeptDraft(onKeep: (text: string) => Promise<unknown>): { keep: (text: string) => void; said: string } {
  const [said, setSaid] = useState('')
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined)
  useEffect(() => () => clearTimeout(timer.current), [])
  const keep = (text: string) => {
    clearTimeout(timer.current)
    timer.current = setTimeout(() => {
      onKeep(text).then(
        () => setSaid('Draft kept.'),
        () => setSaid('The draft could not be kept on the server just now; it is still in this page.'),
      )
    }, KEEP_AFTER)
  }
  return { keep, said }
}
