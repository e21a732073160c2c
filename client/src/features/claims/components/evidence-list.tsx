import { useRef, useState } from 'react'
import { LIMITS } from '../../../../../shared/limits.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { files } from '../../../app/paths.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field } from '../../../components/ui/field.tsx'
import { FileLink } from '../../../components/ui/link.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { ApiError, problemOf } from '../../../lib/errors.ts'

interface EvidenceListProps {
  claim: Claim
  onUpload: (file: File) => Promise<unknown>
  onRemove: (evidenceId: string) => Promise<unknown>
}

const MEGABYTES = Math.floor(LIMITS.evidenceBytes / 1024 / 1024)

/** Files in support of a claim. */
export function EvidenceList({ claim, onUpload, onRemove }: EvidenceListProps) {
  const [failure, setFailure] = useState<string | null>(null)
  const act = (promise: Promise<unknown>) => promise.then(() => setFailure(null), (error: unknown) => setFailure(reasonOf(error)))
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-5">
      {claim.evidence.length === 0 ? (
        <p className="max-w-prose text-soft">No evidence{claim.abilities.attach ? ' yet. A manuscript page, a program, its log, a table of digits: whatever a referee should see.' : ' was given beside the certificate.'}</p>
      ) : (
        <Table
          caption="Evidence"
          rows={claim.evidence}
          rowKey={(item) => item.id}
          columns={[
            { key: 'name', header: 'File', plain: true, cell: (item) => <FileLink href={files.evidence(item.id)} download={item.name} className="break-all">{item.name}</FileLink> },
            { key: 'type', header: 'Kind', cell: (item) => item.mediaType },
            { key: 'bytes', header: 'Size', align: 'right', cell: (item) => <span className="whitespace-nowrap">{sizeInWords(item.bytes)}</span> },
            { key: 'digest', header: 'SHA-256', cell: (item) => <code title={item.digest}>{item.digest.slice(0, 12)}…</code> },
            { key: 'by', header: 'Given', cell: (item) => <>{item.uploadedBy.name}, <Time at={item.uploadedAt} /></> },
            ...(claim.abilities.detach ? [{ key: 'remove', header: '', plain: true, cell: (item: Claim['evidence'][number]) => <Button tone="quiet" onClick={() => void act(onRemove(item.id))}>Remove<span className="sr-only"> {item.name}</span></Button> }] : []),
          ]}
        />
      )}
      {claim.abilities.attach ? <Upload failure={failure} onUpload={(file) => act(onUpload(file))} onTooLarge={() => setFailure(`The file is larger than ${MEGABYTES} MB.`)} /> : failure && <p role="alert" className="text-refused">{failure}</p>}
    </div>
  )
}

function Upload({ failure, onUpload, onTooLarge }: { failure: string | null; onUpload: (file: File) => Promise<unknown>; onTooLarge: () => void }) {
  const input = useRef<HTMLInputElement>(null)
  const [sending, setSending] = useState('')
  const choose = async (file: File | undefined) => {
    if (!file) return
    if (file.size > LIMITS.evidenceBytes) return onTooLarge()
    setSending(file.name)
    await onUpload(file)
    setSending('')
    if (input.current) input.current.value = ''
  }
  return (
    <Field label="Add evidence" hint={`PDF, text, CSV, an image or an archive, at most ${MEGABYTES} MB. Once the claim is submitted it stays.`} error={failure} className="max-w-prose">
      {(control) => (
        <div className="flex flex-wrap items-center gap-4">
          <input
            {...control}
            ref={input}
            type="file"
            disabled={sending !== ''}
            onChange={(event) => void choose(event.target.files?.[0])}
            className="max-w-full file:mr-3 file:min-h-9 file:rounded-slight file:border file:border-edge file:bg-leaf file:px-3.5 file:text-ink"
          />
          <span role="status" className="text-soft">
            {sending && `Sending ${sending} …`}
          </span>
        </div>
      )}
    </Field>
  )
}

function reasonOf(error: unknown): string {
  return (error instanceof ApiError && error.fields[0]?.message) || problemOf(error).detail
}

function sizeInWords(bytes: number): string {
  if (bytes < 1_000) return `${bytes} B`
  return bytes < 1_000_000 ? `${Math.round(bytes / 1_000)} kB` : `${(bytes / 1_000_000).toFixed(1)} MB`
}
