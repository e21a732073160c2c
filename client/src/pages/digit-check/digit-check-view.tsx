import type { FormEvent } from 'react'
import { pageHead } from '../../../../shared/page-head.ts'
import { paths } from '../../app/paths.ts'
import { DigitLine } from '../../components/digit-line/digit-line.tsx'
import { Formula } from '../../components/formula/formula.tsx'
import { Button } from '../../components/ui/button.tsx'
import { ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { Field, TextInput } from '../../components/ui/field.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { StateMark } from '../../components/state-mark/state-mark.tsx'
import type { MarkedState } from '../../components/state-mark/state-mark.tsx'
import { DigitCheckForm } from '../../features/digit-check/components/digit-check.tsx'
import type { DigitCheckValue } from '../../features/digit-check/components/digit-check.tsx'
import type { DefinitionView } from '../../../../shared/schemas/definition.ts'

/** The enclosure that digits are held against, with what it encloses where that is known. */
export type Against =
  | { status: 'none' }
  | { status: 'unreadable'; reason: string }
  | { status: 'loading'; number: string }
  | { status: 'refused'; number: string; error: unknown; onRetry: () => void }
  /** A constant of which nothing is signed yet, with claims that can be named in its place. */
  | { status: 'without-enclosure'; number: string; claims: string[] }
  | { status: 'ready'; lo: string; hi: string; of: { number: string; to: string; definition: DefinitionView; state: MarkedState } | null }

interface DigitCheckViewProps {
  subject: string
  against: Against
  value: DigitCheckValue
  onSubject: (text: string) => void
  onChange: (value: DigitCheckValue) => void
}

/** The digit check by itself: say what the digits are of, paste them. */
export function DigitCheckView({ subject, against, value, onSubject, onChange }: DigitCheckViewProps) {
  const choose = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const text = new FormData(event.currentTarget).get('against')
    onSubject(typeof text === 'string' ? text.trim() : '')
  }
  return (
    <Page
      about={pageHead('digitCheck')}
      head={<h1>Digit check</h1>}
      margin={
        <>
          <MarginNote title="What the words mean">
            <dl className="grid gap-1.5">
              <div><dt className="inline font-semibold">confirmed:</dt> <dd className="inline">every number of the enclosure has this digit here;</dd></div>
              <div><dt className="inline font-semibold">refuted:</dt> <dd className="inline">none has;</dd></div>
              <div><dt className="inline font-semibold">undecided:</dt> <dd className="inline">some have, so that a narrower enclosure is needed to tell.</dd></div>
            </dl>
          </MarginNote>
          <MarginNote title="Which constant is it?">
            <p>If you have digits and don’t know of what, <TextLink to={paths.lookUp({ digits: value.text.length <= 200 ? value.text : undefined })}>look them up</TextLink>.</p>
          </MarginNote>
        </>
      }
    >
      <form onSubmit={choose} className="flex flex-wrap items-end gap-x-4 gap-y-2">
        <Field
          label="Against"
          hint="A constant (MST-0042), a claim (MST-0042/1), or an interval [lo, hi]."
          error={against.status === 'unreadable' ? against.reason : null}
          className="w-full max-w-xl"
        >
          {(control) => <TextInput {...control} key={subject} name="against" defaultValue={subject} spellCheck={false} autoComplete="off" autoCapitalize="characters" />}
        </Field>
        <Button type="submit" className="min-h-[2.45rem]">
          Take it
        </Button>
      </form>
      <AgainstShown against={against} />
      {against.status === 'ready' && (
        <Section title="Digits to check" className="mt-8">
          <DigitCheckForm {...value} lo={against.lo} hi={against.hi} onChange={onChange} />
        </Section>
      )}
    </Page>
  )
}

function AgainstShown({ against }: { against: Against }) {
  switch (against.status) {
    case 'none':
    case 'unreadable':
      return <p className="mt-8 max-w-prose text-soft">Name the constant whose digits a manuscript prints. Then paste them, and each digit is told apart.</p>
    case 'loading':
      return <Loading what={`Reading ${against.number}`} />
    case 'refused':
      return (
        <div className="mt-8">
          <ErrorView title={`${against.number} could not be read`} error={against.error} onRetry={against.onRetry} />
        </div>
      )
    case 'without-enclosure':
      return (
        <Notice tone="undecided" title={`No signed enclosure of ${against.number} is in force.`} className="mt-8">
          {against.claims.length === 0
            ? 'Nothing is claimed of it so far, so there is nothing to hold digits against.'
            : <>Hold the digits against one of its claims: {against.claims.map((number, index) => <span key={number}>{index > 0 && ', '}<TextLink to={paths.digitCheck({ against: number })}>{number}</TextLink></span>)}.</>}
        </Notice>
      )
    case 'ready':
      return (
        <div className="mt-8">
          {against.of && (
            <>
              <p className="flex flex-wrap items-baseline gap-x-5">
                <TextLink to={against.of.to}>{against.of.number}</TextLink>
                <StateMark state={against.of.state} />
              </p>
              <Formula display latex={against.of.definition.latex} text={against.of.definition.text} />
            </>
          )}
          <DigitLine lo={against.lo} hi={against.hi} size="large" />
        </div>
      )
  }
}
