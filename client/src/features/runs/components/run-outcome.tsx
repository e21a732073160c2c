import { parseRational } from '../../../../../shared/engine/arithmetic/rational.ts'
import { goalText, serves } from '../../../../../shared/engine/methods/goal.ts'
import type { OutcomeView, Run } from '../../../../../shared/schemas/run.ts'
import { paths } from '../../../app/paths.ts'
import { Convergence } from '../../../components/charts/convergence.tsx'
import { ErrorBudget, Magnitude } from '../../../components/charts/error-budget.tsx'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { Printed } from '../../../components/formula/printed.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Section } from '../../../components/ui/page.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { convergenceUnit } from '../run-words.ts'
import { DraftClaimForm } from './draft-claim-form.tsx'

interface RunOutcomeProps {
  run: Run
  outcome: OutcomeView
  onDraft: (remark: string) => Promise<unknown>
}

/** What came out of a run: error budget with its bounds, estimates, convergence, parameters, and the claim to make of it. */
export function RunOutcome({ run, outcome, onDraft }: RunOutcomeProps) {
  return (
    <>
      {run.abilities.registerClaim && run.purpose === 'run' && (
        <Section title="Register a claim from this run" className="mt-9">
          <DraftClaimForm onDraft={onDraft} />
        </Section>
      )}
      <Section title="Error budget" className="mt-10">
        <ErrorBudget items={outcome.budget} radius={outcome.radius} />
      </Section>
      <Section title="Estimates used">
        <EstimateUses uses={outcome.estimates} />
      </Section>
      {outcome.convergence.length > 1 && (
        <Section title="Convergence">
          <Convergence points={outcome.convergence} unit={convergenceUnit(run.method)} />
        </Section>
      )}
      <Section title="Parameters">
        <Parameters parameters={outcome.parameters} />
      </Section>
    </>
  )
}

/** The enclosure that a run ended with, and whether it is as narrow as was asked. */
export function OutcomeEnclosure({ outcome, goal }: { outcome: OutcomeView; goal: Run['goal'] }) {
  const radius = parseRational(outcome.radius)
  return (
    <div className="mt-3">
      <DigitLine lo={outcome.enclosure.lo} hi={outcome.enclosure.hi} size="large" copy />
      <p className="mt-2 text-[0.92rem] text-soft">
        {outcome.digits.truncated} digits after the point certified when truncated, {outcome.digits.rounded} when rounded; radius at most <Magnitude text={outcome.radius} />.
        {radius && !serves(goal, radius) && <> That is wider than asked for (<Printed text={goalText(goal)} />): run it again for a little more.</>}
      </p>
    </div>
  )
}

/** The published inequalities that an enclosure rests on, with where each was used and where it holds. */
export function EstimateUses({ uses, doubted = [] }: { uses: OutcomeView['estimates']; doubted?: readonly string[] }) {
  if (uses.length === 0) return <p className="max-w-prose">No published estimate was used: every bound is proven with the engine, and the budget above names each.</p>
  return (
    <Table
      caption="Estimates used"
      rows={uses}
      rowKey={(use) => `${use.id} ${use.usedAt}`}
      columns={[
        { key: 'title', header: 'Estimate', plain: true, cell: (use) => <EstimateTitle use={use} inDoubt={doubted.includes(use.id)} /> },
        { key: 'usedAt', header: 'Used at', cell: (use) => <Printed text={use.usedAt} /> },
        { key: 'validFor', header: 'Holds for', cell: (use) => <Printed text={use.validFor} /> },
        { key: 'conditional', header: 'Rests on a conjecture', cell: (use) => (use.conditional ? <span className="text-undecided">conditional</span> : 'no') },
      ]}
    />
  )
}

function EstimateTitle({ use, inDoubt }: { use: OutcomeView['estimates'][number]; inDoubt: boolean }) {
  return (
    <>
      <TextLink to={paths.estimate(use.id)}><Printed text={use.title} /></TextLink>
      {inDoubt && <strong className="block font-semibold text-refused">in doubt</strong>}
    </>
  )
}

/** Everything that fixes the computation, as the certificate records it. */
export function Parameters({ parameters }: { parameters: OutcomeView['parameters'] }) {
  return (
    <dl className="columns-[14rem] gap-x-8 text-[0.92rem]">
      {Object.entries(parameters).map(([name, value]) => (
        <div key={name} className="flex break-inside-avoid justify-between gap-3 border-b border-rule py-0.5">
          <dt className="text-soft">{name}</dt>
          <dd className="min-w-0 text-right [overflow-wrap:anywhere]"><Printed text={String(value).replaceAll(',', ', ')} /></dd>
        </div>
      ))}
    </dl>
  )
}
