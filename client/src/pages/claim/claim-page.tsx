import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useNavigate, useParams } from 'react-router-dom'
import type { Claim } from '../../../../shared/schemas/claim.ts'
import { paths } from '../../app/paths.ts'
import { DONE_WORDS } from '../../features/claims/act-words.ts'
import { claimQuery, useActs, useDeleteClaim, useEditClaim, useKeepVerdictDraft, useRemoveEvidence, useUploadEvidence } from '../../features/claims/queries.ts'
import type { DoAct } from '../../features/claims/queries.ts'
import { ClaimRepetition } from '../../features/repeat/components/claim-repetition.tsx'
import { useSession } from '../../features/session/queries.ts'
import { ClaimView } from './claim-view.tsx'

export function ClaimPage() {
  const { id = '' } = useParams()
  const claim = useQuery(claimQuery(id))
  if (!claim.data) return <ClaimView claim={undefined} error={claim.error} onRetry={() => void claim.refetch()} />
  return <Loaded key={claim.data.id} claim={claim.data} />
}

function Loaded({ claim }: { claim: Claim }) {
  const navigate = useNavigate()
  const { may } = useSession()
  const [done, setDone] = useState('')
  const act = useActs(claim.id)
  const edit = useEditClaim(claim.id)
  const remove = useDeleteClaim(claim.id)
  const upload = useUploadEvidence(claim.id)
  const removeEvidence = useRemoveEvidence()
  const keepDraft = useKeepVerdictDraft(claim.id)

  const tell = (words: string) => {
    setDone(words)
    window.scrollTo({ top: 0 })
  }
  const onAct: DoAct = async (name, input) => {
    await act(name, input)
    tell(DONE_WORDS[name])
  }
  return (
    <ClaimView
      claim={claim}
      done={done}
      mayReadRuns={may('group-work.read')}
      onAct={onAct}
      onEdit={(patch) => edit.mutateAsync(patch).then(() => tell('Remark saved.'))}
      onDelete={() => remove.mutateAsync().then(() => navigate(paths.constant(claim.constant)))}
      onUpload={(file) => upload.mutateAsync(file)}
      onRemoveEvidence={(evidenceId) => removeEvidence.mutateAsync(evidenceId)}
      onKeepDraft={(text) => keepDraft.mutateAsync(text)}
      repetition={claim.outcome && claim.certificate && <ClaimRepetition claimId={claim.id} />}
    />
  )
}
