import type { ReactNode } from 'react'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { KIND_WORDS, METHOD_WORDS, pastWords } from '../../../../../shared/words.ts'
import { files, paths } from '../../../app/paths.ts'
import { FileLink, TextLink } from '../../../components/ui/link.tsx'
import { Facts, MarginNote } from '../../../components/ui/page.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { publicAddress } from '../../../lib/public-address.ts'
import { CiteNote } from '../../constants/components/constant-margin.tsx'

/** Who says so, by what certificate, how to cite it, and how it came to stand where it stands. */
export function ClaimMargin({ claim, mayReadRuns }: { claim: Claim; mayReadRuns: boolean }) {
  const facts: [ReactNode, ReactNode][] = [
    ['Author', claim.author.name],
    ['Group', claim.group.name],
    ['Kind', KIND_WORDS[claim.kind]],
    ['Constant', <TextLink key="constant" to={paths.constant(claim.constant)}>{claim.constant}</TextLink>],
  ]
  if (claim.run) {
    facts.push(['Method', METHOD_WORDS[claim.run.method]], ['Arithmetic', claim.run.arithmetic])
    if (mayReadRuns) facts.push(['Run', <TextLink key="run" to={paths.run(claim.run.id)}>see the run</TextLink>])
  }
  if (claim.source) facts.push(['Source', claim.source])
  if (claim.supersedes) facts.push(['Supersedes', <TextLink key="supersedes" to={paths.claim(claim.supersedes)}>{claim.supersedes}</TextLink>])
  if (claim.signature) facts.push(['Signed by', claim.signature.by], ['Signed', <Time key="signed" at={claim.signature.at} />])
  return (
    <>
      <MarginNote title="Provenance">
        <Facts facts={facts} />
      </MarginNote>
      {claim.certificate && (
        <MarginNote title="Certificate">
          <p className="print:hidden">
            <FileLink href={files.claimCertificate(claim.id)} download={`${claim.number?.replace('/', '-') ?? claim.constant}.json`}>
              Download the certificate
            </FileLink>
          </p>
          <p className="hidden break-all print:block">{publicAddress() + files.claimCertificate(claim.number?.replace('/', '-') ?? claim.id)}</p>
          <p className="mt-1 text-soft">{claim.certificate.signed ? `Signed with the key ${claim.certificate.keyId ?? ''} of this installation.` : 'Not signed yet.'}</p>
          <p className="mt-1 text-soft">
            SHA-256 <code className="break-all">{claim.certificate.digest}</code>
          </p>
        </MarginNote>
      )}
      {claim.cite && <CiteNote cite={claim.cite} />}
      <MarginNote title="History">
        <ol className="grid gap-2">
          {claim.history.map((entry, index) => (
            <li key={index}>
              <Time at={entry.at} precise />
              <br />
              {entry.actor} {pastWords(entry.act)}
              {entry.reason && <span className="block whitespace-pre-wrap break-words text-soft italic">{entry.reason}</span>}
            </li>
          ))}
        </ol>
      </MarginNote>
    </>
  )
}
