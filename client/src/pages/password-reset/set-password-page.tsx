import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router-dom'
import { fetched } from '../../components/ui/fetched.tsx'
import { passwordResetOfferQuery, useCompletePasswordReset } from '../../features/joining/queries.ts'
import { SetPasswordView } from './set-password-view.tsx'

export function SetPasswordPage() {
  const { token = '' } = useParams()
  const offer = useQuery(passwordResetOfferQuery(token))
  const complete = useCompletePasswordReset(token)
  return <SetPasswordView offer={fetched(offer)} onSet={complete.mutateAsync} />
}
