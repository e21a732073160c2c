import { useNavigate, useSearchParams } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { BLANK_CLAIM, claimForm } from '../../features/claims/claim-form.ts'
import type { ClaimFormValues } from '../../features/claims/claim-form.ts'
import { useDraftClaim } from '../../features/claims/queries.ts'
import { useApiForm } from '../../lib/use-api-form.ts'
import { NewClaimView } from './new-claim-view.tsx'

/** A claim that no run of ours made: a value from elsewhere, or an order between two constants. */
export function NewClaimPage() {
  const [search] = useSearchParams()
  const navigate = useNavigate()
  const draft = useDraftClaim()
  const constant = search.get('constant') ?? ''
  const initial: ClaimFormValues = { ...BLANK_CLAIM, kind: search.get('kind') === 'order' ? 'order' : 'stated', constant, lesser: constant }
  const form = useApiForm(claimForm, initial, async (input) => {
    const claim = await draft.mutateAsync(input)
    await navigate(paths.claim(claim))
  })
  return <NewClaimView form={form} />
}
