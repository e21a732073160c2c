import { useId } from 'react'
import type { InputHTMLAttributes, ReactNode, Ref, SelectHTMLAttributes, TextareaHTMLAttributes } from 'react'
import { classNames } from '../../lib/class-names.ts'
import { sentence } from '../../lib/sentence.ts'

const CONTROL =
  'w-full min-h-[2.45rem] rounded-slight border border-edge bg-leaf px-2.5 py-1.5 leading-snug text-ink placeholder:text-soft aria-invalid:border-refused aria-invalid:outline-refused disabled:bg-shade disabled:text-soft'

/** What a control needs to belong to its label, hint and error. */
export interface ControlProps {
  id: string
  'aria-describedby': string | undefined
  'aria-invalid': true | undefined
  'aria-required': true | undefined
}

interface FieldProps {
  label: ReactNode
  /** One line on what to write, shown before there is anything wrong. */
  hint?: ReactNode
  /** What is wrong and what to write instead; read out when it appears. */
  error?: string | null
  required?: boolean
  /** Short controls such as k or a number of digits. */
  narrow?: boolean
  className?: string
  children: (control: ControlProps) => ReactNode
}

/** A labelled control with its hint and its error at the field. */
export function Field({ label, hint, error, required, narrow, className, children }: FieldProps) {
  const id = useId()
  const describedBy = [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ')
  return (
    <div className={classNames('grid grid-cols-[minmax(0,1fr)] content-start gap-1', narrow && '[&>input]:max-w-44 [&>select]:max-w-44', className)}>
      <label htmlFor={id} className="font-semibold leading-tight">
        {label}
      </label>
      {hint && (
        <div id={`${id}-hint`} className="text-[0.88rem] leading-snug text-soft">
          {hint}
        </div>
      )}
      {children({ id, 'aria-describedby': describedBy || undefined, 'aria-invalid': error ? true : undefined, 'aria-required': required || undefined })}
      <FieldError id={`${id}-error`} error={error} />
    </div>
  )
}

/** The word on what is wrong with a field; an empty live region while nothing is. */
export function FieldError({ id, error }: { id?: string; error: string | null | undefined }) {
  return (
    <div id={id} role={error ? 'alert' : undefined} className="text-[0.92rem] leading-snug text-refused empty:hidden">
      {error ? sentence(error) : null}
    </div>
  )
}

export function TextInput({ className, ref, ...rest }: InputHTMLAttributes<HTMLInputElement> & { ref?: Ref<HTMLInputElement> }) {
  return <input type="text" {...rest} ref={ref} className={classNames(CONTROL, className)} />
}

export function TextArea({ className, ref, ...rest }: TextareaHTMLAttributes<HTMLTextAreaElement> & { ref?: Ref<HTMLTextAreaElement> }) {
  return <textarea rows={4} {...rest} ref={ref} className={classNames(CONTROL, 'field-sizing-content min-h-24', className)} />
}

export function Select({ className, ref, ...rest }: SelectHTMLAttributes<HTMLSelectElement> & { ref?: Ref<HTMLSelectElement> }) {
  return <select {...rest} ref={ref} className={classNames(CONTROL, 'h-[2.45rem] py-0', className)} />
}

/** The options of a list to choose from: each value with its words. */
export function Options({ of }: { of: Readonly<Record<string, string>> | readonly (readonly [value: string, words: string])[] }) {
  return (Array.isArray(of) ? (of as readonly (readonly [string, string])[]) : Object.entries(of)).map(([value, words]) => (
    <option key={value} value={value}>
      {words}
    </option>
  ))
}

interface ChoiceProps extends InputHTMLAttributes<HTMLInputElement> {
  label: ReactNode
  hint?: ReactNode
  ref?: Ref<HTMLInputElement>
}

/** A checkbox, or with `type="radio"` one of several, with its label beside it. */
export function Choice({ label, hint, type = 'checkbox', className, ref, ...rest }: ChoiceProps) {
  const id = useId()
  return (
    <div className={classNames('grid grid-cols-[auto_1fr] items-baseline gap-x-2.5', className)}>
      <input {...rest} ref={ref} id={id} type={type} aria-describedby={hint ? `${id}-hint` : undefined} className="relative top-px size-4 accent-certain" />
      <label htmlFor={id}>{label}</label>
      {hint && (
        <div id={`${id}-hint`} className="col-start-2 text-[0.88rem] leading-snug text-soft">
          {hint}
        </div>
      )}
    </div>
  )
}

/** Several choices under one question. */
export function FieldSet({ legend, children, className }: { legend: ReactNode; children: ReactNode; className?: string }) {
  return (
    <fieldset className={classNames('grid gap-2', className)}>
      <legend className="mb-1 font-semibold leading-tight">{legend}</legend>
      {children}
    </fieldset>
  )
}
