import { z } from 'zod'
import { longText } from '../../../../../shared/schemas/common.ts'
import { act } from '../../../../../shared/schemas/claim.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, TextArea } from '../../../components/ui/field.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import type { DoAct } from '../queries.ts'

type Objection = Claim['objections'][number]

const STATE_WORDS: Record<Objection['state'], string> = { open: 'waits for an answer', answered: 'answered', settled: 'settled', upheld: 'upheld' }
const STATE_TONES: Record<Objection['state'], string> = { open: 'text-refused', answered: 'text-undecided', settled: 'text-certain', upheld: 'text-refused' }

/** Objections and what was said to them, the oldest first. */
export function ObjectionThreads({ objections, onAct }: { objections: Objection[]; onAct: DoAct }) {
  return (
    <ol className="grid gap-7">
      {objections.map((objection, index) => (
        <li key={objection.id}>
          <p className="mb-2">
            <strong className="font-semibold">Objection {index + 1}</strong> by {objection.referee.name}, <span className={STATE_TONES[objection.state]}>{STATE_WORDS[objection.state]}</span>
          </p>
          {objection.messages.map((message, at) => (
            <div key={at} className="mb-3 border-l-2 border-rule pl-4">
              <p className="text-[0.92rem] text-soft">
                {message.author.name}, <Time at={message.at} precise />
              </p>
              <p className="max-w-prose whitespace-pre-wrap break-words">{message.text}</p>
            </div>
          ))}
          {objection.abilities.answer && <AnswerForm objectionId={objection.id} onAct={onAct} />}
          {objection.abilities.settle && <SettleForm objectionId={objection.id} onAct={onAct} />}
        </li>
      ))}
    </ol>
  )
}

const answerForm = z.object({ text: longText })

function AnswerForm({ objectionId, onAct }: { objectionId: string; onAct: DoAct }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(answerForm, { text: '' }, async ({ text }, all) => {
    await onAct('answer', { objectionId, text })
    all.reset()
  })
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose justify-items-start gap-3 pl-4">
      <Field label="Your answer" error={errorAt('text') ?? rootError} className="w-full">
        {(control) => <TextArea {...control} {...form.register('text')} />}
      </Field>
      <Button type="submit" tone="act" busy={sending && 'Answering …'}>
        Answer the objection
      </Button>
    </form>
  )
}

function SettleForm({ objectionId, onAct }: { objectionId: string; onAct: DoAct }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(act.settle, { objectionId, outcome: 'settled', text: '' }, (input) => onAct('settle', input))
  // The pressed button decides, and does so before the form is sent.
  const deciding = (outcome: 'settled' | 'upheld') => ({ type: 'submit' as const, onClick: () => form.setValue('outcome', outcome) })
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose gap-3 pl-4">
      <Field label="Your word on the answer" hint="Settled closes the objection. Upheld keeps it, and the claim goes back to its author." error={errorAt('text') ?? rootError}>
        {(control) => <TextArea {...control} {...form.register('text')} rows={2} className="min-h-16" />}
      </Field>
      <div className="flex flex-wrap gap-4">
        <Button {...deciding('settled')} tone="act" disabled={sending}>
          Settled
        </Button>
        <Button {...deciding('upheld')} disabled={sending}>
          Upheld
        </Button>
      </div>
    </form>
  )
}
