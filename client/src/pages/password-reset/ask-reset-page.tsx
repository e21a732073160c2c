import { useAskPasswordReset } from '../../features/joining/queries.ts'
import { AskResetView } from './ask-reset-view.tsx'

export function AskResetPage() {
  const ask = useAskPasswordReset()
  return <AskResetView onAsk={ask.mutateAsync} />
}
