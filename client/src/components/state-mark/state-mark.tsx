import type { ReactElement } from 'react'
import type { ClaimState } from '../../../../shared/schemas/claim.ts'
import { STATE_WORDS } from '../../../../shared/words.ts'
import { classNames } from '../../lib/class-names.ts'

/** States of a claim, and `stated` for a constant of which nothing is claimed yet. */
export type MarkedState = ClaimState | 'stated'

/** The standing stone, 8 wide and 17 high on the ground at y = 20. */
const STONE = 'M8 20 8.5 8.2C8.7 4.8 10 3 12.1 3.1 14.4 3.2 15.3 5.2 15.4 8.4L16 20z'
const GROUND = <path d="M3 20.6H21" className="stroke-current" strokeWidth="1.3" strokeLinecap="round" />
const outline = <path d={STONE} fill="none" className="stroke-current" strokeWidth="1.3" strokeLinejoin="round" />
const filled = <path d={STONE} className="fill-current stroke-current" strokeWidth="1.3" strokeLinejoin="round" />

/** The stone filled from the ground up to `share` of its height. */
function filledTo(share: number): ReactElement {
  const top = 20 - 17 * share
  const id = `stone-to-${Math.round(share * 100)}`
  return (
    <>
      <clipPath id={id}>
        <rect x="0" y={top} width="24" height={24 - top} />
      </clipPath>
      <path d={STONE} clipPath={`url(#${id})`} className="fill-current" />
      {outline}
    </>
  )
}

const DRAWINGS: Record<MarkedState, ReactElement> = {
  stated: GROUND,
  draft: outline,
  submitted: <>{outline}{GROUND}</>,
  'in-review': <>{filledTo(1 / 3)}{GROUND}</>,
  returned: <><g transform="rotate(24 16 20)">{outline}</g>{GROUND}</>,
  endorsed: <>{filledTo(2 / 3)}{GROUND}</>,
  signed: <>{filled}{GROUND}</>,
  superseded: (
    <>
      <path d="M11.6 20 12 4.6C12.2 2.2 13.6 1 15.4 1.1 17.4 1.2 18.4 2.6 18.5 5L19.2 20z" fill="none" className="stroke-current" strokeWidth="1.3" />
      <g transform="translate(-2.6 5) scale(0.75)">{filled}</g>
      {GROUND}
    </>
  ),
  suspended: <><g transform="rotate(24 16 20)">{filled}</g>{GROUND}</>,
  withdrawn: <><path d="M20 20V12.6L9.2 12.4C6 12.5 4 13.8 4.1 16 4.2 18.4 6 19.5 9 19.7z" className="fill-current stroke-current" strokeWidth="1.3" strokeLinejoin="round" />{GROUND}</>,
}

const COLOURS: Partial<Record<MarkedState, string>> = {
  signed: 'text-certain',
  endorsed: 'text-certain',
  returned: 'text-undecided',
  suspended: 'text-refused',
  withdrawn: 'text-soft',
  superseded: 'text-soft',
  stated: 'text-soft',
}

interface StateMarkProps {
  state: MarkedState
  size?: 'large' | 'small'
}

/** The stone that shows a claim's state, its word always beside it. */
export function StateMark({ state, size = 'small' }: StateMarkProps) {
  return (
    <span className={classNames('inline-flex items-baseline gap-1.5 whitespace-nowrap', COLOURS[state], size === 'large' && 'text-[1.15rem]')}>
      <svg viewBox="0 0 24 24" aria-hidden="true" className="relative top-[0.22em] size-[1.3em] shrink-0">
        {DRAWINGS[state]}
      </svg>
      {STATE_WORDS[state]}
    </span>
  )
}
