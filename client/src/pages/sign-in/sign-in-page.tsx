import { Navigate, useNavigate, useSearchParams } from 'react-router-dom'
import { signInInput } from '../../../../shared/schemas/session.ts'
import { paths } from '../../app/paths.ts'
import { useSession, useSignIn } from '../../features/session/queries.ts'
import { useApiForm } from '../../lib/use-api-form.ts'
import { SignInView } from './sign-in-view.tsx'

/** Where to go after signing in: only a page of this product, never an address given from outside. */
function safeReturn(to: string | null): string {
  return to?.startsWith('/') && !to.startsWith('//') && !to.startsWith('/\\') ? to : paths.home()
}

export function SignInPage() {
  const [search] = useSearchParams()
  const navigate = useNavigate()
  const signIn = useSignIn()
  const { member } = useSession()
  const target = safeReturn(search.get('to'))
  const form = useApiForm(signInInput, { email: '', password: '' }, async (values) => {
    await signIn.mutateAsync(values)
    await navigate(target, { replace: true })
  })
  if (member && !form.sending) return <Navigate to={target} replace />
  return <SignInView form={form} asked={search.has('to')} />
}
