import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { REASONED_ACTS } from '../act-words.ts'
import type { ReasonedAct } from '../act-words.ts'
import { claimName } from '../claim-words.ts'
import type { DoAct } from '../queries.ts'
import { AssignForm } from './assign-form.tsx'
import { ReasonedButton } from './reason-dialog.tsx'
import { SignButton } from './sign-dialog.tsx'

/** What a lead does with the claim. */
export function LeadWork({ claim, onAct }: { claim: Claim; onAct: DoAct }) {
  const reasoned = (Object.keys(REASONED_ACTS) as ReasonedAct[]).filter((name) => claim.abilities[REASONED_ACTS[name].ability])
  return (
    <div className="grid gap-6">
      {(claim.abilities.sign || reasoned.length > 0) && (
        <div className="flex flex-wrap gap-4">
          {claim.abilities.sign && <SignButton claim={claim} onAct={onAct} />}
          {reasoned.map((name) => (
            <ReasonedButton
              key={name}
              act={REASONED_ACTS[name].button}
              object={claimName(claim)}
              tells={REASONED_ACTS[name].tells}
              tone={name === 'withdraw' || name === 'suspend' ? 'grave' : 'plain'}
              onAct={(reason) => onAct(name, { reason })}
            />
          ))}
        </div>
      )}
      {claim.abilities.assign && (
        <div>
          <h3 className="mb-2">Ask a referee</h3>
          <AssignForm claim={claim} onAct={onAct} />
        </div>
      )}
    </div>
  )
}
