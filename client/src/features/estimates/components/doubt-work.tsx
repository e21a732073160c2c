import { useState } from 'react'
import type { EstimateDoubt, LiftResult } from '../../../../../shared/schemas/estimate.ts'
import { Notice } from '../../../components/ui/notice.tsx'
import type { NoticeTone } from '../../../components/ui/notice.tsx'
import { Section } from '../../../components/ui/page.tsx'
import { ApiError } from '../../../lib/errors.ts'
import { claimCount, ofFate } from '../doubt-words.ts'
import type { LiftInput } from '../queries.ts'
import { LiftDoubt } from './lift-doubt.tsx'
import { MarkInDoubt } from './mark-in-doubt.tsx'
import { RestingClaims } from './resting-claims.tsx'
import { RunAgain } from './run-again.tsx'

/** Refusals that say another lead was quicker. */
const TOO_LATE = new Set(['in_doubt_already', 'not_in_doubt'])

interface DoubtWorkProps {
  doubt: EstimateDoubt
  onMark: (reason: string) => Promise<EstimateDoubt>
  onLift: (input: LiftInput) => Promise<LiftResult>
  onRunAgain: (again: EstimateDoubt['again'][number]) => Promise<unknown>
}

/** What a lead does about an estimate: sees what rests on it, marks it, has its constants run again, and lifts the doubt. */
export function DoubtWork({ doubt, onMark, onLift, onRunAgain }: DoubtWorkProps) {
  const [said, setSaid] = useState<{ tone: NoticeTone; title: string; more: string[] } | null>(null)
  // The form goes away where another lead was quicker, so it is told here.
  const toldIfLate = (error: unknown): never => {
    if (error instanceof ApiError && TOO_LATE.has(error.code)) setSaid({ tone: 'undecided', title: 'Nothing was changed.', more: [error.message] })
    throw error
  }
  const mark = async (reason: string) => {
    const after = await onMark(reason).catch(toldIfLate)
    const fallen = ofFate(after, 'fallen').length
    setSaid({ tone: 'done', title: 'Marked in doubt.', more: [fallen > 0 ? `${claimCount(fallen)} ${fallen === 1 ? 'is' : 'are'} suspended, and those concerned are told by mail.` : 'No claim rested on it.'] })
  }
  const lift = async (input: LiftInput) => {
    const { reinstated, kept } = await onLift(input).catch(toldIfLate)
    setSaid({
      tone: 'done',
      title: 'The doubt is lifted.',
      more: [...(reinstated.length > 0 ? [`In force again: ${reinstated.join(', ')}.`] : []), ...kept.map(({ claimNumber, reason }) => `${claimNumber} stays suspended: ${reason}`)],
    })
  }
  return (
    <>
      <div role="status">
        {said && (
          <Notice tone={said.tone} title={said.title} className="mt-8">
            {said.more.join(' ')}
          </Notice>
        )}
      </div>
      {doubt.doubt === null ? (
        <Section title="What falls with it" beside="in your group" className="print:hidden">
          <MarkInDoubt doubt={doubt} onMark={mark} />
        </Section>
      ) : (
        <>
          <Section title="What has fallen with it" beside="in your group">
            {doubt.claims.length > 0 ? <RestingClaims doubt={doubt} /> : <p>No claim of your group rests on it.</p>}
          </Section>
          {doubt.again.length > 0 && (
            <Section title="Run again without it" className="print:hidden">
              <p className="mb-3 max-w-prose">Each run aims at what the enclosure on the estimate had, by the quickest method that gets there without the estimate.</p>
              <RunAgain again={doubt.again} onStart={onRunAgain} />
            </Section>
          )}
          <Section title="Lift the doubt" className="print:hidden">
            <LiftDoubt doubt={doubt} onLift={lift} />
          </Section>
        </>
      )}
    </>
  )
}
