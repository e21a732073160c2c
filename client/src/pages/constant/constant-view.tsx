import { constantHead, pageHead } from '../../../../shared/page-head.ts'
import type { Constant } from '../../../../shared/schemas/constant.ts'
import { CONFLICT_UNSEEN, METHOD_WORDS } from '../../../../shared/words.ts'
import { paths } from '../../app/paths.ts'
import { Narrowing } from '../../components/charts/narrowing.tsx'
import { Nest } from '../../components/charts/nest.tsx'
import { DigitLine } from '../../components/digit-line/digit-line.tsx'
import { EndsOnPaper } from '../../components/digit-line/ends-on-paper.tsx'
import { Formula } from '../../components/formula/formula.tsx'
import { Printed } from '../../components/formula/printed.tsx'
import { StateMark } from '../../components/state-mark/state-mark.tsx'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { ButtonLink, TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page, Section } from '../../components/ui/page.tsx'
import { ClaimTable } from '../../features/claims/components/claim-table.tsx'
import { ConstantMargin } from '../../features/constants/components/constant-margin.tsx'
import { RUN_STATE_WORDS } from '../../features/runs/run-words.ts'

export interface ConstantViewProps {
  number: string
  constant: Constant | undefined
  error: unknown
  onRetry: () => void
  mayStart: boolean
}

export function ConstantView({ number, constant, error, onRetry, mayStart }: ConstantViewProps) {
  if (!constant)
    return (
      <Page about={pageHead('constant', number)} head={<h1>{number}</h1>}>
        {error ? <ErrorView title="This constant could not be read" error={error} onRetry={onRetry} /> : <Loading what={`Reading ${number}`} />}
      </Page>
    )
  const drawn = constant.claims.filter((claim) => claim.enclosure && claim.number && claim.state !== 'withdrawn')
  const open = constant.conflicts.filter((conflict) => conflict.closedAt === null)
  return (
    <Page
      about={constantHead(constant)}
      head={
        <>
          <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-2">
            <h1>{constant.number}</h1>
            <StateMark state={constant.state} size="large" />
          </div>
        </>
      }
      margin={<ConstantMargin constant={constant} />}
    >
      <div className="entry">
        <Formula display latex={constant.definition.latex} text={constant.definition.text} />
        {constant.best ? (
          <div className="mt-3">
            <DigitLine lo={constant.best.lo} hi={constant.best.hi} size="large" copy />
            <EndsOnPaper lo={constant.best.lo} hi={constant.best.hi} />
          </div>
        ) : (
          <p className="mt-3 text-soft italic">No signed enclosure of it is in force.</p>
        )}
      </div>
      {open.map((conflict) => (
        <Notice key={conflict.claims.join()} tone="refused" title="In conflict." className="mt-5">
          The enclosures of <TextLink to={paths.claim(conflict.claims[0])}>{conflict.claims[0]}</TextLink> and{' '}
          <TextLink to={paths.claim(conflict.claims[1])}>{conflict.claims[1]}</TextLink> have no number in common. At least one is wrong; both are shown until one is withdrawn.
        </Notice>
      ))}
      {constant.inConflict && open.length === 0 && <Notice tone="refused" title="In conflict." className="mt-5">{CONFLICT_UNSEEN}</Notice>}
      {mayStart && (
        <div className="mt-5 flex flex-wrap gap-3 print:hidden">
          <ButtonLink to={paths.newRun({ constant: constant.number })}>New run of this constant</ButtonLink>
          <ButtonLink to={paths.newClaim({ constant: constant.number })}>Claim a value from elsewhere</ButtonLink>
          <ButtonLink to={paths.newClaim({ constant: constant.number, kind: 'order' })}>Claim an order</ButtonLink>
        </div>
      )}
      <Section title="Claims" className="mt-9">
        {constant.claims.length > 0 ? (
          <ClaimTable claims={constant.claims} />
        ) : (
          <Empty title="Nothing is claimed of it yet.">
            <p>A claim asserts an enclosure of this constant. It is drafted from a run, refereed, and signed by a lead.</p>
          </Empty>
        )}
      </Section>
      {constant.narrowing.length > 1 && (
        <Section title="How it narrowed">
          <Narrowing steps={constant.narrowing} />
        </Section>
      )}
      {drawn.length > 1 && (
        <Section title="The enclosures, each within the last">
          <Nest enclosures={drawn.flatMap((claim) => (claim.enclosure ? [{ label: claim.number ?? '', ...claim.enclosure }] : []))} />
        </Section>
      )}
      <Section title="Convergence and members">
        <p className="max-w-prose"><Printed text={constant.convergence} /></p>
        {constant.firstMembers.length > 0 && (
          <p className="mt-2 max-w-prose">
            The set begins with {constant.firstMembers.join(', ')}, …
          </p>
        )}
      </Section>
      {constant.runs.length > 0 && (
        <Section title="Runs">
          <ul className="grid gap-1">
            {constant.runs.map((run) => (
              <li key={run.id}>
                <TextLink to={paths.run(run.id)}>
                  {METHOD_WORDS[run.method]}, {run.arithmetic}
                </TextLink>
                : {RUN_STATE_WORDS[run.state]}
              </li>
            ))}
          </ul>
        </Section>
      )}
    </Page>
  )
}
