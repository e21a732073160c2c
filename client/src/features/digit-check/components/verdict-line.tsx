import type { DigitCheckResult, DigitVerdict } from '../../../../../shared/digit-check.ts'
import { classNames } from '../../../lib/class-names.ts'
import { printedGroups } from '../check.ts'
import type { DigitRun } from '../check.ts'

/** Each verdict has its word, its rule and its colour; the first two alone tell them apart. */
const LOOKS: Record<DigitVerdict, { rule: string; word: string }> = {
  confirmed: { rule: 'border-t-2 pt-px border-solid border-certain', word: 'text-certain' },
  undecided: { rule: 'border-t-2 pt-px border-dotted border-undecided', word: 'text-undecided' },
  refuted: { rule: 'border-t-3 border-double border-refused', word: 'text-refused font-semibold' },
}

interface VerdictLineProps {
  negative: boolean
  result: DigitCheckResult
}

/** Pasted digits in groups of five, glossed between the lines: under each run of digits a rule and its word, and an arrow at the first fault. */
export function VerdictLine({ negative, result }: VerdictLineProps) {
  const [whole = [], ...groups] = printedGroups(result)
  const faulty = result.firstWrong !== null
  return (
    <div className={classNames('flex flex-wrap gap-x-3 text-[1.35rem] leading-tight', faulty ? 'gap-y-6 pr-12 pb-6' : 'gap-y-3')}>
      <span className="inline-flex gap-x-1.5">
        {(negative || result.sign === 'refuted') && <Run digits={negative ? '−' : '+'} verdict={result.sign} firstWrong={result.sign === 'refuted'} />}
        <Group runs={whole} after={groups.length > 0 ? '.' : ''} />
      </span>
      {groups.map((runs, index) => (
        <Group key={index} runs={runs} />
      ))}
    </div>
  )
}

function Group({ runs, after = '' }: { runs: DigitRun[]; after?: string }) {
  return (
    <span className="inline-flex gap-x-1">
      {runs.map((run, index) => (
        <Run key={index} {...run} after={index === runs.length - 1 ? after : ''} />
      ))}
    </span>
  )
}

interface RunProps {
  digits: string
  verdict: DigitVerdict
  firstWrong: boolean
  after?: string
}

function Run({ digits, verdict, firstWrong, after = '' }: RunProps) {
  const looks = LOOKS[verdict]
  return (
    <span className="relative inline-grid content-start">
      <span>
        {firstWrong ? <mark className="bg-wash-refused text-refused outline-2 outline-refused">{digits.slice(0, 1)}</mark> : digits.slice(0, 1)}
        {digits.slice(1)}
        {after}
      </span>
      <span className={classNames('mt-0.5 text-[0.78rem] leading-tight', looks.rule, looks.word)}>
        <span className="sr-only">: </span>
        {verdict}
        <span className="sr-only">{firstWrong ? ', first wrong digit. ' : '. '}</span>
      </span>
      {firstWrong && (
        <span aria-hidden="true" className="absolute top-full left-0 text-[0.78rem] leading-tight font-semibold whitespace-nowrap text-refused">
          <span className="ml-[0.25em]">↑</span> first wrong
        </span>
      )}
    </span>
  )
}
