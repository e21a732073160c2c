import { useState } from 'react'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { isSettled } from '../act-words.ts'
import { problemOf } from '../../../lib/errors.ts'
import type { DoAct } from '../queries.ts'

type Assignment = Claim['assignments'][number]

/** Who referees the claim, what they said, and what its endorsement still needs. */
export function ReviewState({ claim, onAct }: { claim: Claim; onAct: DoAct }) {
  const { have, need, recheckNeeded, recheckDone } = claim.confirmations
  return (
    <>
      {claim.assignments.length === 0 ? (
        !isSettled(claim.state) && <p className="mb-3 text-soft">Nobody was asked to referee it yet.</p>
      ) : (
        <Table
          caption="Referees"
          rows={claim.assignments}
          rowKey={(assignment) => assignment.id}
          columns={[
            { key: 'referee', header: 'Referee', plain: true, cell: (assignment) => <>{assignment.referee.name}, <span className="text-soft">{assignment.refereeGroup}</span></> },
            { key: 'state', header: 'Answer', cell: (assignment) => <Answer assignment={assignment} /> },
            { key: 'verdict', header: 'Verdict', cell: (assignment) => <Verdict assignment={assignment} /> },
            { key: 'remark', header: 'Remark', cell: (assignment) => <span className="whitespace-pre-wrap">{assignment.remark ?? assignment.declineReason}</span> },
            ...(claim.abilities.remind ? [{ key: 'remind', header: '', plain: true, cell: (assignment: Assignment) => assignment.state !== 'declined' && !assignment.verdictCurrent && <RemindButton assignment={assignment} onAct={onAct} /> }] : []),
          ]}
        />
      )}
      <p className="mt-3 first:mt-0">
        Confirmations: {have} of {need} needed.
        {recheckNeeded && (recheckDone ? ' A recheck by other arithmetic or another method meets it.' : ' A recheck by other arithmetic or another method is still needed.')}
      </p>
    </>
  )
}

function Answer({ assignment }: { assignment: Assignment }) {
  const words = { asked: 'asked', accepted: 'accepted', declined: 'declined' }[assignment.state]
  return (
    <>
      {words}, <Time at={assignment.answeredAt ?? assignment.askedAt} />
    </>
  )
}

function Verdict({ assignment }: { assignment: Assignment }) {
  if (assignment.verdict === null) return null
  const words = assignment.verdict === 'confirmed' ? <span className="text-certain">confirmed</span> : <span className="text-refused">objected</span>
  return (
    <>
      {words}
      {!assignment.verdictCurrent && <span className="block text-[0.88rem] text-soft">of an earlier version</span>}
    </>
  )
}

function RemindButton({ assignment, onAct }: { assignment: Assignment; onAct: DoAct }) {
  const [said, setSaid] = useState('')
  const remind = () => onAct('remind', { assignmentId: assignment.id }).then(() => setSaid('Reminded.'), (error: unknown) => setSaid(problemOf(error).detail))
  return (
    <>
      <Button tone="quiet" onClick={() => void remind()}>
        Remind<span className="sr-only"> {assignment.referee.name}</span>
      </Button>{' '}
      <span role="status">{said}</span>
    </>
  )
}
