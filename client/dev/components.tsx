import { useState } from 'react'
import { UNKNOWN_PAGE } from '../../shared/page-head.ts'
import { STATE_WORDS } from '../../shared/words.ts'
import { Convergence } from '../src/components/charts/convergence.tsx'
import { ErrorBudget } from '../src/components/charts/error-budget.tsx'
import { Narrowing } from '../src/components/charts/narrowing.tsx'
import { Nest } from '../src/components/charts/nest.tsx'
import { DigitLine } from '../src/components/digit-line/digit-line.tsx'
import { Formula } from '../src/components/formula/formula.tsx'
import { StateMark } from '../src/components/state-mark/state-mark.tsx'
import type { MarkedState } from '../src/components/state-mark/state-mark.tsx'
import { Button } from '../src/components/ui/button.tsx'
import { Actions, Dialog } from '../src/components/ui/dialog.tsx'
import { Empty, ErrorView, Loading, Progress } from '../src/components/ui/feedback.tsx'
import { Choice, Field, FieldSet, Select, TextArea, TextInput } from '../src/components/ui/field.tsx'
import { TextLink } from '../src/components/ui/link.tsx'
import { Notice } from '../src/components/ui/notice.tsx'
import { Facts, MarginNote, Page, Section } from '../src/components/ui/page.tsx'
import { Pagination } from '../src/components/ui/pagination.tsx'
import { Table } from '../src/components/ui/table.tsx'
import { Time } from '../src/components/ui/time.tsx'

const PRIMES = { lo: '1.6366163233512608685696580039218636711815970761312', hi: '1.6366163233512608685696580039218636711815970761381' }
const budget = [
  { source: 'discretisation' as const, bound: 'T-2', statement: 'The trapezoid with step h misses at most F κ, κ = 2 (cos a)^-b / (e^(2πa/h) − 1).', magnitude: '8.2e-46' },
  { source: 'truncation-below' as const, bound: 'T-3', statement: 'Nodes below the first are majorised by a geometric series.', magnitude: '3.1e-47' },
  { source: 'truncation-above' as const, bound: 'T-4', statement: 'Nodes above the last are majorised by a geometric series.', magnitude: '6.0e-52' },
  { source: 'series' as const, bound: 'T-6', statement: 'Terms left out of the series over μ(m)/m log ζ.', magnitude: '1.4e-46' },
  { source: 'rounding' as const, bound: 'A-1', statement: 'Roundings of all operations, each counted as a unit in the last place.', magnitude: '2.2e-49' },
]
const steps = [
  { at: '2026-01-12T10:00:00Z', lo: '1.63661', hi: '1.63664', digits: 4, claim: 'MST-0001/1', author: 'Ilse Varga' },
  { at: '2026-03-02T10:00:00Z', lo: '1.63661632335', hi: '1.63661632336', digits: 10, claim: 'MST-0001/2', author: 'Tomas Brandt' },
  { at: '2026-06-20T10:00:00Z', lo: PRIMES.lo, hi: PRIMES.hi, digits: 47, claim: 'MST-0001/3', author: 'Ilse Varga' },
]
const points = [
  { at: '80', lo: '1.52', hi: '1.71' }, { at: '160', lo: '1.63612', hi: '1.63701' }, { at: '320', lo: '1.6366162', hi: '1.6366164' },
  { at: '640', lo: '1.63661632335126', hi: '1.63661632335127' }, { at: '1280', lo: '1.636616323351260868569657', hi: '1.636616323351260868569659' }, { at: '2100', lo: PRIMES.lo, hi: PRIMES.hi },
]

export function ComponentsPage() {
  const [open, setOpen] = useState(false)
  return (
    <Page
      about={{ ...UNKNOWN_PAGE, title: 'Components' }}
      head={
        <>
          <p className="text-soft">
            <TextLink to="/register">Register</TextLink>
          </p>
          <h1>MST-0001/3</h1>
        </>
      }
      margin={
        <>
          <MarginNote title="Provenance">
            <Facts facts={[['Author', 'Ilse Varga'], ['Method', 'transform'], ['Arithmetic', 'ball'], ['Signed', <Time key="t" at="2026-06-20T10:00:00Z" />], ['Digest', <code key="d">9c1f…e07a</code>]]} />
          </MarginNote>
          <MarginNote title="Estimates">No published estimate was needed: the tail is bounded by T-4.</MarginNote>
        </>
      }
    >
      <Section title="Digit line" beside={<StateMark state="signed" />}>
        <DigitLine {...PRIMES} size="large" copy />
        <div className="mt-4 grid gap-2">
          <p><DigitLine lo="1.1448165734059179915244" hi="1.1448165734059179915301" /></p>
          <p><DigitLine lo="-1.33258227" hi="-1.33258221" /> negative</p>
          <p><DigitLine lo="0.9991" hi="1.0002" /> nothing certain</p>
          <p><DigitLine lo="0.99" hi="0.99" /> exact</p>
          <p><DigitLine lo={`0.${'1234567890'.repeat(12)}1`} hi={`0.${'1234567890'.repeat(12)}4`} limit={50} /></p>
        </div>
        <div className="mt-4"><DigitLine lo={`1.${'1234567890'.repeat(12)}1`} hi={`1.${'1234567890'.repeat(12)}4`} size="large" /></div>
      </Section>
      <Section title="Definition">
        <Formula display latex={'\\sum_{\\substack{n\\ge 2\\\\ \\Omega(n)=3,\\ 2\\nmid n}} \\frac{1}{n\\log n}'} text="sum over odd n with 3 prime factors of 1/(n log n)" />
      </Section>
      <Section title="States">
        <p className="flex flex-wrap gap-x-6 gap-y-2">{(Object.keys(STATE_WORDS) as MarkedState[]).map((state) => <StateMark key={state} state={state} />)}</p>
        <p className="mt-3 flex flex-wrap gap-x-6 gap-y-2">{(Object.keys(STATE_WORDS) as MarkedState[]).map((state) => <StateMark key={state} state={state} size="large" />)}</p>
      </Section>
      <Section title="Error budget"><ErrorBudget items={budget} radius="9.9e-46" /></Section>
      <Section title="Convergence"><Convergence points={points} unit="nodes" /></Section>
      <Section title="Narrowing"><Narrowing steps={steps} /></Section>
      <Section title="Nest"><Nest enclosures={[...steps.map((step) => ({ label: step.claim, lo: step.lo, hi: step.hi })), { label: 'MST-0001/4', lo: '1.63661632338', hi: '1.63661632339' }]} /></Section>
      <Section title="Form">
        <form className="grid max-w-xl gap-5">
          <Field label="Digits" hint="Certified digits after the point, at most 1000." error="Write a whole number from 1 to 1000." narrow required>{(control) => <TextInput {...control} defaultValue="4000" />}</Field>
          <Field label="Set">{(control) => <Select {...control}><option>Integers with exactly k prime factors</option></Select>}</Field>
          <Field label="Remark">{(control) => <TextArea {...control} />}</Field>
          <FieldSet legend="Arithmetic"><Choice type="radio" name="a" label="ball" hint="Midpoint and radius on whole numbers." defaultChecked /><Choice type="radio" name="a" label="mpfr" hint="End points by MPFR." /></FieldSet>
          <div className="flex flex-wrap gap-4"><Button tone="act">Start the run</Button><Button>Stop</Button><Button tone="grave">Withdraw MST-0001/3</Button><Button disabled>Sign</Button><Button tone="act" busy="Signing …">Sign</Button><Button tone="quiet" onClick={() => setOpen(true)}>open the dialog</Button></div>
        </form>
        <Dialog open={open} title="Sign MST-0001/3" onClose={() => setOpen(false)}><p>Signing enters this enclosure in the register. It can’t be edited afterwards.</p><Actions><Button tone="act">Sign MST-0001/3</Button><Button onClick={() => setOpen(false)}>Not now</Button></Actions></Dialog>
      </Section>
      <Section title="Words">
        <div className="grid gap-4">
          <Notice tone="done" title="Signed.">MST-0001/3 is in the register. Its author was told by e-mail.</Notice>
          <Notice tone="undecided" title="In conflict.">MST-0001/4 does not meet it. Both are shown until one is withdrawn.</Notice>
          <Notice tone="refused" title="Not signed.">The password is wrong. Nothing was changed.</Notice>
          <Progress share={0.43} label="Share done" />
          <Loading what="Reading the register" />
          <Empty title="No run yet."><p>A run encloses a constant in interval arithmetic.</p><Button tone="act">New run</Button></Empty>
          <ErrorView error={new Error('x')} title="The register could not be read" onRetry={() => undefined} />
        </div>
      </Section>
      <Section title="Table">
        <Table caption="Register" rows={steps} rowKey={(row) => row.claim} sorting={{ key: 'number', order: 'asc', to: () => '/register' }} columns={[
          { key: 'number', header: 'Number', sortable: true, cell: (row) => <TextLink to="/x">{row.claim.slice(0, 8)}</TextLink> },
          { key: 'definition', header: 'Definition', cell: () => <Formula latex={'\\sum_{p} \\frac{1}{p\\log p}'} text="sum over primes" /> },
          { key: 'best', header: 'Best enclosure', cell: (row) => <DigitLine lo={row.lo} hi={row.hi} limit={50} /> },
          { key: 'digits', header: 'Digits', sortable: true, align: 'right', cell: (row) => row.digits },
          { key: 'state', header: 'State', cell: () => <StateMark state="signed" /> },
          { key: 'changed', header: 'Changed', sortable: true, cell: (row) => <Time at={row.at} /> },
        ]} />
        <Pagination shown={3} total={40} unit="constants" previous={{ to: '/x', state: { trail: [] } }} next={{ to: '/y', state: { trail: [] } }} />
      </Section>
    </Page>
  )
}
