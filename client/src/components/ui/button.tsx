import type { ButtonHTMLAttributes, ReactNode } from 'react'
import { classNames } from '../../lib/class-names.ts'

/** `act` carries out what the page is for, `grave` what can't be undone, `plain` anything else, `quiet` sits inside a line. */
export type ButtonTone = 'plain' | 'act' | 'grave' | 'quiet'

const TONES: Record<ButtonTone, string> = {
  plain: 'border border-edge bg-leaf px-3.5 py-1 text-ink hover:border-ink',
  act: 'border border-certain bg-certain px-3.5 py-1 text-paper hover:border-ink hover:bg-ink',
  grave: 'border border-refused bg-refused px-3.5 py-1 text-paper hover:border-ink hover:bg-ink',
  quiet: 'text-certain underline decoration-1 underline-offset-[0.2em] hover:text-ink',
}

/** Looks of a button, for links that act as one. */
export function buttonClass(tone: ButtonTone): string {
  return classNames(TONES[tone], tone !== 'quiet' && 'inline-flex min-h-9 items-center justify-center gap-2 rounded-slight leading-tight no-underline')
}

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  tone?: ButtonTone
  /** What is happening while the act is carried out ("Signing …"): the button says it and can't be pressed again. */
  busy?: ReactNode
}

export function Button({ tone = 'plain', busy, disabled, children, className, type = 'button', ...rest }: ButtonProps) {
  const working = busy !== undefined && busy !== null && busy !== false
  return (
    <button
      {...rest}
      type={type}
      disabled={disabled || working}
      aria-busy={working || undefined}
      className={classNames(buttonClass(tone), 'disabled:cursor-not-allowed', disabled && !working && 'disabled:border-dashed disabled:border-edge disabled:bg-shade disabled:text-soft', className)}
    >
      {working ? busy : children}
    </button>
  )
}
