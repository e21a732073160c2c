import { useQuery } from '@tanstack/react-query'
import { useNavigate, useParams } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { fetched } from '../../components/ui/fetched.tsx'
import { invitationOfferQuery, useAcceptInvitation } from '../../features/joining/queries.ts'
import { useSession } from '../../features/session/queries.ts'
import { InvitationView } from './invitation-view.tsx'

export function InvitationPage() {
  const { token = '' } = useParams()
  const navigate = useNavigate()
  const offer = useQuery(invitationOfferQuery(token))
  const accept = useAcceptInvitation(token)
  const { member } = useSession()
  return (
    <InvitationView
      offer={fetched(offer)}
      signedInAs={accept.isIdle ? (member?.name ?? null) : null}
      onAccept={async (input) => {
        await accept.mutateAsync(input)
        await navigate(paths.home(), { replace: true })
      }}
    />
  )
}
