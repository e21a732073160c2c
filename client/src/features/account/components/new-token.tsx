import { Button } from '../../../components/ui/button.tsx'
import { CopyText } from '../../../components/ui/copy-text.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import type { AccessTokenCreated } from '../queries.ts'

interface NewTokenProps {
  token: AccessTokenCreated
  /** Where this installation is reached. */
  origin: string
  onPutAway: () => void
}

/** A token that was just made: the only time that it is shown. */
export function NewToken({ token, origin, onPutAway }: NewTokenProps) {
  return (
    <Notice tone="done" title={`“${token.name}” is made.`} live>
      Copy it now: it is shown this once, and only its hash is kept here.
      <p className="mt-3 break-all">
        <code>{token.token}</code>
      </p>
      <p className="mt-2 flex flex-wrap gap-x-6 gap-y-1">
        <CopyText text={token.token} label="Copy the token" what="Token" />
        <CopyText text={`curl -H 'Authorization: Bearer ${token.token}' ${origin}/api/v1/constants`} label="Copy as a curl command" what="Command" />
        <Button tone="quiet" className="text-[0.92rem]" onClick={onPutAway}>
          I have kept it; hide it
        </Button>
      </p>
    </Notice>
  )
}
