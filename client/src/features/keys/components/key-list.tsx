import type { ReactNode } from 'react'
import type { PublicKey } from '../../../../../shared/schemas/group.ts'
import { files } from '../../../app/paths.ts'
import { CopyText } from '../../../components/ui/copy-text.tsx'
import { FileLink } from '../../../components/ui/link.tsx'
import { Facts } from '../../../components/ui/page.tsx'
import { Time } from '../../../components/ui/time.tsx'

/** Public keys of the installation in full, the one in use first. */
export function KeyList({ keys }: { keys: PublicKey[] }) {
  return (
    <ul className="grid gap-8">
      {keys.map(({ id, algorithm, pem, createdAt, retiredAt }) => (
        <li key={id} className="min-w-0">
          <h3>
            Key <code className="text-[0.9em]">{id}</code> <span className="font-normal text-soft">({retiredAt ? 'retired' : 'in use'})</span>
          </h3>
          <div className="mt-1">
            <Facts
              facts={[
                ['Algorithm', algorithm],
                ['Signs since', <Time key="since" at={createdAt} />],
                ...(retiredAt ? [['Until', <Time key="until" at={retiredAt} />] as [string, ReactNode]] : []),
              ]}
            />
          </div>
          <pre className="mt-2 overflow-x-auto border border-rule bg-leaf px-3 py-2 leading-normal">{pem.trim()}</pre>
          <p className="mt-1 flex flex-wrap gap-x-6">
            <CopyText text={pem} label="Copy the key" what="Key" />
            <FileLink href={files.key(id)} download={`${id}.pem`}>
              Take it as a PEM file
            </FileLink>
          </p>
        </li>
      ))}
    </ul>
  )
}
