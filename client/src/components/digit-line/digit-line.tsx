import type { CSSProperties } from 'react'
import { certifiedTruncated, groupDigits, splitEnclosure } from '../../../../shared/digits.ts'
import { classNames } from '../../lib/class-names.ts'
import { CopyDigits } from './copy-digits.tsx'

interface DigitLineProps {
  /** End points as exact decimal text. */
  lo: string
  hi: string
  size?: 'large' | 'small'
  /** How many digits after the mark are shown of each end. */
  following?: number
  /** Longest run of certified decimals shown; what is left out is counted in words. */
  limit?: number
  /** With the button and menu that copy. */
  copy?: boolean
}

/** A constant between its two boundaries: certified digits, the merestone, then what each end goes on with. */
export function DigitLine({ lo, hi, size = 'small', following = 3, limit = 1_000, copy = false }: DigitLineProps) {
  const { negative, integer, decimals, upperNext, lowerNext } = splitEnclosure(lo, hi, following)
  const exact = upperNext === '' && lowerNext === ''
  const leadText = integer === null ? '' : `${negative ? '−' : ''}${integer}${decimals === '' && exact ? '' : '.'}`
  // Nothing is left out for the sake of a group or two.
  const leftOut = decimals.length > limit + 10 ? decimals.length - limit : 0
  const groups = groupDigits(leftOut > 0 ? decimals.slice(0, limit) : decimals)
  const last = groups.pop() ?? ''
  // A full stop takes 0.571 of a figure's width in Source Serif.
  const lead = integer === null ? '0px' : `${(negative ? 1 : 0) + integer.length + 0.571}ch`

  return (
    <>
      <span className={classNames('digit-line', size === 'large' && 'digit-line-large')} style={{ '--lead': lead } as CSSProperties}>
        <span className="sr-only select-none">{spoken(lo, hi)}</span>
        <span aria-hidden="true">
          {leadText && <span className="digit-lead">{leadText}</span>}
          {groups.map((group, index) => (
            <span key={index}>
              <span className="digit-group">{group}</span>
              <wbr />
            </span>
          ))}
          <span className="digit-group">
            {last}
            {leftOut > 0 && <span className="text-soft select-none"> … {leftOut} more</span>}
            {leftOut === 0 && !exact && <Merestone />}
            {leftOut === 0 && !exact && (
              <span className={classNames('digit-following', integer === null && 'digit-following-whole')}>
                <span>{upperNext}</span>
                <span>{lowerNext}</span>
              </span>
            )}
            {exact && <span className="ml-[0.4em] text-[0.7em] text-soft italic select-none">exactly</span>}
          </span>
        </span>
      </span>
      {copy && <CopyDigits lo={lo} hi={hi} />}
    </>
  )
}

/** A thin upright mark on a short ground line. */
function Merestone() {
  return (
    <svg viewBox="0 0 9 24" className="digit-mark" preserveAspectRatio="none">
      <path d="M3.7 22 4 2.4C4 1.6 5 1.6 5 2.4L5.3 22z" stroke="none" />
      <line x1="0.6" y1="22" x2="8.4" y2="22" strokeWidth="1.5" strokeLinecap="round" />
    </svg>
  )
}

/** What a screen reader hears. */
export function spoken(lo: string, hi: string): string {
  const { text, decimals } = certifiedTruncated(lo, hi)
  const split = splitEnclosure(lo, hi, 3)
  const end = (next: string) => (split.integer === null ? next : `${split.negative ? '-' : ''}${split.integer}.${split.decimals}${next}`)
  if (split.upperNext === '' && split.lowerNext === '') return `exactly ${text}`
  const certified = text === null ? 'no certified digit' : `certified to ${decimals} digit${decimals === 1 ? '' : 's'}: ${text}…`
  return `${certified}, between ${end(split.lowerNext)} and ${end(split.upperNext)}`
}
