import { useState } from 'react'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { problemOf } from '../../../lib/errors.ts'
import { claimName } from '../claim-words.ts'
import type { DoAct } from '../queries.ts'
import { ReasonedButton } from './reason-dialog.tsx'
import { RecheckForm } from './recheck-form.tsx'
import { VerdictForm } from './verdict-form.tsx'

interface RefereeWorkProps {
  claim: Claim
  onAct: DoAct
  onKeepDraft: (text: string) => Promise<unknown>
}

/** What a referee does with the claim: take it or decline it, recheck it, and give a verdict. */
export function RefereeWork({ claim, onAct, onKeepDraft }: RefereeWorkProps) {
  const { accept, decline, recheck, confirm, object } = claim.abilities
  return (
    <div className="grid gap-8">
      {(accept || decline) && (
        <div className="flex flex-wrap items-start gap-4">
          {accept && <AcceptButton claim={claim} onAct={onAct} />}
          {decline && (
            <ReasonedButton act="Decline" object={claimName(claim)} tells="The lead is told your reason and can ask somebody else." onAct={(reason) => onAct('decline', { reason })} />
          )}
        </div>
      )}
      {recheck && <RecheckForm claim={claim} onAct={onAct} />}
      {(confirm || object) && <VerdictForm claim={claim} onAct={onAct} onKeepDraft={onKeepDraft} />}
    </div>
  )
}

function AcceptButton({ claim, onAct }: Pick<RefereeWorkProps, 'claim' | 'onAct'>) {
  const [state, setState] = useState<{ busy: boolean; failure: unknown }>({ busy: false, failure: null })
  const accept = () => {
    setState({ busy: true, failure: null })
    onAct('accept', {}).catch((failure: unknown) => setState({ busy: false, failure }))
  }
  return (
    <div>
      <Button tone="act" onClick={accept} busy={state.busy && 'Accepting …'}>
        Accept to referee {claimName(claim)}
      </Button>
      {state.failure ? (
        <Notice tone="refused" title="Not accepted." live className="mt-3">
          {problemOf(state.failure).detail}
        </Notice>
      ) : null}
    </div>
  )
}
