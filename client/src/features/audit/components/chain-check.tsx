import type { AuditCheck } from '../../../../../shared/schemas/group.ts'
import { Button } from '../../../components/ui/button.tsx'
import { CopyText } from '../../../components/ui/copy-text.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { problemOf } from '../../../lib/errors.ts'

interface ChainCheckProps {
  result: AuditCheck | undefined
  error: unknown
  checking: boolean
  onCheck: () => void
}

/** Has the whole chain recomputed, and says what came out. */
export function ChainCheck({ result, error, checking, onCheck }: ChainCheckProps) {
  return (
    <div className="grid justify-items-start gap-3">
      <p>Each entry carries the hash of the one before it, and the database refuses to change or delete any. The check recomputes all of them, from the first entry of this installation on.</p>
      <Button busy={checking && 'Recomputing …'} onClick={onCheck}>
        Check the chain
      </Button>
      {error !== null && !checking && (
        <Notice tone="refused" title="Not checked." live>
          {problemOf(error).detail}
        </Notice>
      )}
      {result && !checking && (result.broken ? <Broken {...result.broken} /> : <Whole {...result} />)}
    </div>
  )
}

function Whole({ entries, head }: AuditCheck) {
  return (
    <Notice tone="done" title="The chain holds." live>
      {entries.toLocaleString('en')} {entries === 1 ? 'entry' : 'entries'}, each linked to the one before. Write down the last hash elsewhere: it also shows whether entries were cut off the end.
      <span className="mt-2 block">
        <code className="break-all">{head}</code>
      </span>
      <CopyText text={head} label="Copy the hash" what="Hash" />
    </Notice>
  )
}

function Broken({ seq, reason }: { seq: number; reason: string }) {
  return (
    <Notice tone="refused" title={`The chain breaks at entry ${seq}.`} live>
      The reason: {reason}. Everything before it holds. Keep the database as it is, export the trail, and tell whoever runs this installation.
    </Notice>
  )
}
