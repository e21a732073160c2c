import { useDeferredValue, useId, useState } from 'react'
import type { PrintedAs } from '../../../../../shared/digit-check.ts'
import { latexNumber } from '../../../../../shared/digits.ts'
import { CopyText } from '../../../components/ui/copy-text.tsx'
import { Choice, Field, FieldSet, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import type { NoticeTone } from '../../../components/ui/notice.tsx'
import { checkText } from '../check.ts'
import type { Checked } from '../check.ts'
import { VerdictLine } from './verdict-line.tsx'

/** What is pasted and how it is to be read. */
export interface DigitCheckValue {
  text: string
  reading: PrintedAs
}

interface DigitCheckFormProps extends DigitCheckValue {
  /** The enclosure that the digits are held against, as exact decimal text. */
  lo: string
  hi: string
  onChange: (value: DigitCheckValue) => void
}

/** A digit check that keeps what is pasted by itself, for a page about something else. */
export function DigitCheck({ lo, hi }: { lo: string; hi: string }) {
  const [value, setValue] = useState<DigitCheckValue>({ text: '', reading: 'truncated' })
  return <DigitCheckForm {...value} lo={lo} hi={hi} onChange={setValue} />
}

/** Digits pasted from a manuscript held against an enclosure, digit by digit, while they are typed. */
export function DigitCheckForm({ text, reading, lo, hi, onChange }: DigitCheckFormProps) {
  const name = useId()
  // Long pastes are checked after the field has taken them, so that typing never waits.
  const deferred = useDeferredValue(text)
  const checked = checkText(deferred, reading, lo, hi)
  return (
    <div className="grid gap-6">
      <Field
        label="Digits of the manuscript"
        hint="Paste them as they stand: spaces, groups, line breaks, LaTeX, a decimal comma, dots at the end and an uncertainty in brackets are understood."
        error={checked.kind === 'unreadable' ? checked.reason : null}
      >
        {(control) => (
          <TextArea
            {...control}
            value={text}
            rows={2}
            spellCheck={false}
            autoComplete="off"
            className="min-h-16 break-all"
            onChange={(event) => onChange({ text: event.target.value, reading })}
          />
        )}
      </Field>
      <FieldSet legend="The digits are printed as" className="sm:grid-cols-[auto_auto_1fr] sm:gap-x-8">
        {(['truncated', 'rounded'] as const).map((option) => (
          <Choice
            key={option}
            type="radio"
            name={name}
            checked={reading === option}
            onChange={() => onChange({ text, reading: option })}
            label={option}
            hint={option === 'truncated' ? 'cut off after the last digit' : 'the last digit rounded to nearest'}
          />
        ))}
      </FieldSet>
      <Outcome checked={checked} reading={reading} />
    </div>
  )
}

function toneOf(checked: Extract<Checked, { kind: 'checked' }>): NoticeTone {
  if (checked.result.whole === 'refuted' || checked.result.firstWrong !== null || checked.result.uncertainty === 'refuted') return 'refused'
  return checked.result.whole === 'confirmed' ? 'done' : 'undecided'
}

const TITLES: Partial<Record<NoticeTone, string>> = { done: 'Confirmed.', undecided: 'Undecided in part.', refused: 'Refuted.' }

function Outcome({ checked, reading }: { checked: Checked; reading: PrintedAs }) {
  const tone = checked.kind === 'checked' ? toneOf(checked) : 'plain'
  return (
    <div className="grid gap-5">
      <div role="status">
        {checked.kind === 'checked' && (
          <Notice tone={tone} title={TITLES[tone] ?? ''}>
            {checked.summary}
          </Notice>
        )}
      </div>
      {checked.kind === 'checked' && (
        <>
          <VerdictLine negative={checked.negative} result={checked.result} />
          {checked.correct && (
            <p className="flex flex-wrap items-baseline gap-x-5">
              <span>
                {reading === 'truncated' ? 'Truncated' : 'Rounded'} to {checked.correct.places} {checked.correct.places === 1 ? 'place' : 'places'} it
                reads <span className="break-all">{checked.correct.text}</span>.
              </span>
              <CopyText text={checked.correct.text} label="Copy" what="Digits" />
              <CopyText text={latexNumber(checked.correct.text)} label="Copy as LaTeX" what="LaTeX" />
            </p>
          )}
        </>
      )}
    </div>
  )
}
