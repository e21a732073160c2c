import type { ReactNode } from 'react'
import { claimHead, pageHead } from '../../../../shared/page-head.ts'
import { METHOD_WORDS } from '../../../../shared/words.ts'
import type { Claim } from '../../../../shared/schemas/claim.ts'
import { paths } from '../../app/paths.ts'
import { ErrorBudget } from '../../components/charts/error-budget.tsx'
import { Convergence } from '../../components/charts/convergence.tsx'
import { Nest } from '../../components/charts/nest.tsx'
import { StateMark } from '../../components/state-mark/state-mark.tsx'
import { ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page, Section } from '../../components/ui/page.tsx'
import { isSettled } from '../../features/claims/act-words.ts'
import { claimName } from '../../features/claims/claim-words.ts'
import { AuthorWork } from '../../features/claims/components/author-work.tsx'
import { ClaimDoubts } from '../../features/claims/components/claim-doubts.tsx'
import { ClaimMargin } from '../../features/claims/components/claim-margin.tsx'
import { Caution, ClaimSubject } from '../../features/claims/components/claim-subject.tsx'
import { EvidenceList } from '../../features/claims/components/evidence-list.tsx'
import { LeadWork } from '../../features/claims/components/lead-work.tsx'
import { ObjectionThreads } from '../../features/claims/components/objection-threads.tsx'
import { RecheckTable } from '../../features/claims/components/recheck-table.tsx'
import { RefereeWork } from '../../features/claims/components/referee-work.tsx'
import { ReviewState } from '../../features/claims/components/review-state.tsx'
import type { DoAct } from '../../features/claims/queries.ts'
import { DigitCheck } from '../../features/digit-check/components/digit-check.tsx'
import { EstimateUses } from '../../features/runs/components/run-outcome.tsx'
import { convergenceUnit } from '../../features/runs/run-words.ts'

interface LoadedProps {
  claim: Claim
  /** What the last act did. */
  done: string
  mayReadRuns: boolean
  onAct: DoAct
  onEdit: (patch: { version: number; remark: string }) => Promise<unknown>
  onDelete: () => Promise<unknown>
  onUpload: (file: File) => Promise<unknown>
  onRemoveEvidence: (evidenceId: string) => Promise<unknown>
  onKeepDraft: (text: string) => Promise<unknown>
  /** The certificate checked and repeated on the reader's own machine, where there is one. */
  repetition?: ReactNode
}

export type ClaimViewProps = LoadedProps | { claim: undefined; error: unknown; onRetry: () => void }

/** Abilities that make a part of the page worth showing. */
const AUTHOR = ['edit', 'submit', 'delete', 'resubmit']
const REFEREE = ['accept', 'decline', 'recheck', 'confirm', 'object']
const LEAD = ['assign', 'return', 'sign', 'suspend', 'reinstate', 'withdraw']

export function ClaimView(props: ClaimViewProps) {
  if (props.claim) return <Loaded {...props} />
  return (
    <Page about={pageHead('claim')} head={<h1>Claim</h1>}>
      {props.error ? <ErrorView title="This claim could not be read" error={props.error} onRetry={props.onRetry} /> : <Loading what="Reading the claim" />}
    </Page>
  )
}

function Loaded({ claim, done, mayReadRuns, onAct, onEdit, onDelete, onUpload, onRemoveEvidence, onKeepDraft, repetition }: LoadedProps) {
  const may = (acts: string[]) => acts.some((act) => claim.abilities[act])
  return (
    <Page
      about={claimHead(claim)}
      head={
        <>
          <p className="text-soft">
            <TextLink to={paths.constant(claim.constant)}>{claim.constant}</TextLink>, {claim.definition.text}
          </p>
          <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-2">
            <h1>{claim.number ?? `Draft for ${claim.constant}`}</h1>
            <StateMark state={claim.state} size="large" />
          </div>
        </>
      }
      margin={<ClaimMargin claim={claim} mayReadRuns={mayReadRuns} />}
    >
      <div role="status">
        {done && (
          <Notice tone="done" title={done} className="mb-5 print:hidden">
            {claim.next && `Next: ${claim.next}.`.replace(/\.\.$/, '.')}
          </Notice>
        )}
      </div>
      <ClaimSubject claim={claim} />
      <ClaimDoubts doubts={claim.doubts} />
      {!done && claim.next && !isSettled(claim.state) && (
        <p className="mt-5 print:hidden">
          <span className="text-soft italic">Next:</span> {claim.next}
        </p>
      )}
      {may(AUTHOR) && (
        <Section title="Yours to finish" className="mt-9 print:hidden">
          <AuthorWork claim={claim} onAct={onAct} onEdit={onEdit} onDelete={onDelete} />
        </Section>
      )}
      {may(LEAD) && (
        <Section title="For the lead" className="mt-9 print:hidden">
          <LeadWork claim={claim} onAct={onAct} />
        </Section>
      )}
      {may(REFEREE) && (
        <Section title="For the referee" className="mt-9 print:hidden">
          <RefereeWork claim={claim} onAct={onAct} onKeepDraft={onKeepDraft} />
        </Section>
      )}
      {!claim.abilities.edit && claim.remark && (
        <Section title="Remark of the author" className="mt-9">
          <p className="max-w-prose whitespace-pre-wrap break-words">{claim.remark}</p>
        </Section>
      )}
      {claim.objections.length > 0 && (
        <Section title="Objections" className="mt-9">
          <ObjectionThreads objections={claim.objections} onAct={onAct} />
        </Section>
      )}
      <ClaimMatter claim={claim} mayReadRuns={mayReadRuns} onAct={onAct} onUpload={onUpload} onRemoveEvidence={onRemoveEvidence} repetition={repetition} />
      <Caution claim={claim} />
    </Page>
  )
}

/** What the claim rests on, part by part. */
function ClaimMatter({ claim, mayReadRuns, onAct, onUpload, onRemoveEvidence, repetition }: Pick<LoadedProps, 'claim' | 'mayReadRuns' | 'onAct' | 'onUpload' | 'onRemoveEvidence' | 'repetition'>) {
  const { outcome, enclosure } = claim
  const meeting = claim.rechecks.flatMap((recheck) => (recheck.enclosure ? [{ label: `recheck, ${METHOD_WORDS[recheck.method]}, ${recheck.arithmetic}`, ...recheck.enclosure }] : []))
  return (
    <>
      {claim.state !== 'draft' && (
        <Section title="Review" className="mt-9">
          <ReviewState claim={claim} onAct={onAct} />
        </Section>
      )}
      {claim.rechecks.length > 0 && (
        <Section title="Rechecks">
          <RecheckTable claim={claim} mayReadRuns={mayReadRuns} />
          {enclosure && meeting.length > 0 && (
            <div className="print:hidden">
              <Nest enclosures={[{ label: claimName(claim), ...enclosure }, ...meeting]} />
            </div>
          )}
        </Section>
      )}
      {enclosure && (
        <Section title="Check digits of a manuscript" className="mt-10 print:hidden">
          <DigitCheck lo={enclosure.lo} hi={enclosure.hi} />
        </Section>
      )}
      {repetition && (
        <Section title="Repeat it yourself" id="repeat" className="mt-10 print:hidden">
          {repetition}
        </Section>
      )}
      <Section title="Evidence" className={claim.evidence.length === 0 ? 'print:hidden' : undefined}>
        <EvidenceList claim={claim} onUpload={onUpload} onRemove={onRemoveEvidence} />
      </Section>
      {outcome && (
        <>
          <Section title="Error budget">
            <ErrorBudget items={outcome.budget} radius={outcome.radius} />
          </Section>
          <Section title="Estimates used">
            <EstimateUses uses={outcome.estimates} doubted={claim.doubts.map(({ estimate }) => estimate)} />
          </Section>
          {claim.run && outcome.convergence.length > 1 && (
            <Section title="Convergence" className="mt-10 print:hidden">
              <Convergence points={outcome.convergence} unit={convergenceUnit(claim.run.method)} />
            </Section>
          )}
        </>
      )}
    </>
  )
}
