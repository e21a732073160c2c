import { useForm } from 'react-hook-form'
import type { ReactNode } from 'react'
import * as fixtures from '../../tests/client/fixtures.ts'
import { signInInput } from '../../shared/schemas/session.ts'
import type { Claim } from '../../shared/schemas/claim.ts'
import { BLANK_CLAIM, claimForm } from '../src/features/claims/claim-form.ts'
import { BLANK_RUN } from '../src/features/runs/run-form.ts'
import { useApiForm } from '../src/lib/use-api-form.ts'
import { ClaimView } from '../src/pages/claim/claim-view.tsx'
import { ConstantView } from '../src/pages/constant/constant-view.tsx'
import { DeskView } from '../src/pages/desk/desk-view.tsx'
import { NewRunView } from '../src/pages/new-run/new-run-view.tsx'
import type { NewRunViewProps } from '../src/pages/new-run/new-run-view.tsx'
import { RegisterView } from '../src/pages/register/register-view.tsx'
import { RunView } from '../src/pages/run/run-view.tsx'
import { RunsView } from '../src/pages/runs/runs-view.tsx'
import { NewClaimView } from '../src/pages/new-claim/new-claim-view.tsx'
import { SignInView } from '../src/pages/sign-in/sign-in-view.tsx'

const nothing = () => undefined
const later = () => new Promise<void>((resolve) => setTimeout(resolve, 800))
const noPages = { previous: null, next: null, turn: nothing }

function SignInExample() {
  return <SignInView asked form={useApiForm(signInInput, { email: '', password: '' }, later)} />
}

function NewRunExample(props: Partial<NewRunViewProps>) {
  const form = useForm({ defaultValues: BLANK_RUN })
  return (
    <NewRunView form={form} errors={{}} plan={fixtures.plan} planning={false} planError={null} chosen={{ method: 'transform', arithmetic: 'ball' }} onChoose={nothing} onStart={nothing} starting={false} startError={null} mayStart {...props} />
  )
}

function RunExample({ run }: { run: typeof fixtures.finishedRun }) {
  return <RunView run={run} error={null} onRetry={nothing} live={null} onSteer={nothing} steering={null} steerError={null} onDraft={later} />
}

function ClaimExample({ claim, done = '' }: { claim: Claim; done?: string }) {
  return <ClaimView claim={claim} done={done} mayReadRuns onAct={later} onEdit={later} onDelete={later} onUpload={later} onRemoveEvidence={later} onKeepDraft={later} />
}

function NewClaimExample() {
  return <NewClaimView form={useApiForm(claimForm, BLANK_CLAIM, later)} />
}

export const MAIN_PATH: Record<string, ReactNode> = {
  'sign-in': <SignInExample />,
  register: <RegisterView list={{ items: fixtures.constantSummaries, next: null, total: 4 }} error={null} refetching={false} onRetry={nothing} filters={{}} filtered={false} onFilter={nothing} sorting={{ key: 'number', order: 'asc', to: () => '/register' }} pages={noPages} mayStart />,
  constant: <ConstantView number="MST-0003" constant={fixtures.constant} error={null} onRetry={nothing} mayStart />,
  runs: <RunsView list={{ items: [fixtures.workingRun, fixtures.finishedRun], next: null }} error={null} refetching={false} onRetry={nothing} state="" mine={false} onFilter={nothing} pages={noPages} mayStart />,
  'new-run': <NewRunExample />,
  'new-run-refused': <NewRunExample errors={{ k: 'k = 0 has no members but 1: write 1 or more.', digits: 'At most 1000 digits.' }} />,
  'run-working': <RunExample run={fixtures.workingRun} />,
  'run-done': <RunExample run={fixtures.finishedRun} />,
  'run-failed': <RunExample run={fixtures.failedRun} />,
  'claim-draft': <ClaimExample claim={fixtures.claimForAuthor} />,
  'claim-referee': <ClaimExample claim={fixtures.claimForReferee} done="Accepted. The claim is yours to check." />,
  'claim-returned': <ClaimExample claim={fixtures.claimReturned} />,
  'claim-lead': <ClaimExample claim={fixtures.claimForLead} />,
  'claim-signed': <ClaimExample claim={fixtures.claimSigned} />,
  'new-claim': <NewClaimExample />,
  desk: <DeskView desk={fixtures.desk} error={null} onRetry={nothing} roles={['lead', 'referee', 'researcher']} />,
}
