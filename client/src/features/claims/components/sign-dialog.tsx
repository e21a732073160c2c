import { useState } from 'react'
import type { ReactNode } from 'react'
import { act } from '../../../../../shared/schemas/claim.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { METHOD_WORDS } from '../../../../../shared/words.ts'
import { Formula } from '../../../components/formula/formula.tsx'
import { Printed } from '../../../components/formula/printed.tsx'
import { Button } from '../../../components/ui/button.tsx'
import { Actions, Dialog } from '../../../components/ui/dialog.tsx'
import { Field, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Facts } from '../../../components/ui/page.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { claimName } from '../claim-words.ts'
import type { DoAct } from '../queries.ts'

/** The lead's signature: what is signed shown in full, the password again, the button saying the act. */
export function SignButton({ claim, onAct }: { claim: Claim; onAct: DoAct }) {
  const [open, setOpen] = useState(false)
  const name = claimName(claim)
  return (
    <>
      <Button tone="act" onClick={() => setOpen(true)}>
        Sign {name} …
      </Button>
      <Dialog open={open} title={`Sign ${name}`} onClose={() => setOpen(false)}>
        <SignForm claim={claim} name={name} onCancel={() => setOpen(false)} onAct={onAct} />
      </Dialog>
    </>
  )
}

function SignForm({ claim, name, onAct, onCancel }: { claim: Claim; name: string; onAct: DoAct; onCancel: () => void }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(act.sign, { version: claim.version, password: '' }, (input) => onAct('sign', input))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-4">
      <p>Your signature enters this in the register under a number that never changes. It can’t be edited afterwards, only superseded, suspended or withdrawn.</p>
      <div className="border-y border-rule py-3">
        <Formula display latex={claim.definition.latex} text={claim.definition.text} />
        <Facts
          facts={[
            ...(claim.enclosure
              ? [
                  ['Upper end', <span key="hi" className="break-all">{claim.enclosure.hi}</span>] as [string, ReactNode],
                  ['Lower end', <span key="lo" className="break-all">{claim.enclosure.lo}</span>] as [string, ReactNode],
                ]
              : []),
            ...(claim.run ? [['Computed by', `${METHOD_WORDS[claim.run.method]}, ${claim.run.arithmetic}`] as [string, ReactNode]] : []),
            ...(claim.outcome ? [['Rests on', claim.outcome.estimates.length === 0 ? 'no published estimate' : <Printed key="estimates" text={claim.outcome.estimates.map(({ title }) => title).join('; ')} />] as [string, ReactNode]] : []),
            ['Author', claim.author.name],
            ...(claim.remark ? [['Remark', <span key="remark" className="whitespace-pre-line">{claim.remark}</span>] as [string, ReactNode]] : []),
            ['Confirmed by', claim.assignments.filter((assignment) => assignment.verdict === 'confirmed' && assignment.verdictCurrent).map((assignment) => assignment.referee.name).join(', ') || 'nobody'],
            ['Digest of the claim', <code key="digest" className="break-all">{claim.digest}</code>],
          ]}
        />
      </div>
      <Field label="Your password" error={errorAt('password')} className="max-w-sm">
        {(control) => <TextInput {...control} {...form.register('password')} type="password" autoComplete="current-password" />}
      </Field>
      {rootError && (
        <Notice tone="refused" title="Not signed." live>
          {rootError}
        </Notice>
      )}
      <Actions>
        <Button type="submit" tone="act" busy={sending && 'Signing …'}>
          Sign {name}
        </Button>
        <Button onClick={onCancel}>Not now</Button>
      </Actions>
    </form>
  )
}
