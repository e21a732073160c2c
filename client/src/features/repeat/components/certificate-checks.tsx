import type { ReactNode } from 'react'
import type { Certificate } from '../../../../../shared/engine/certificate/certificate.ts'
import { paths } from '../../../app/paths.ts'
import { TextLink } from '../../../components/ui/link.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { ENGINE_RELEASE } from '../engine-release.ts'
import type { SignatureVerdict } from '../signature-check.ts'

/** A verdict in one or two words, and what it means for the certificate. */
interface Verdict {
  word: string
  tone: 'good' | 'bad' | 'open'
}

const HOLDS: Verdict = { word: 'holds', tone: 'good' }
const FAILS: Verdict = { word: 'fails', tone: 'bad' }
const UNCHECKED: Verdict = { word: 'not checked', tone: 'open' }
const SIGNATURES: Record<SignatureVerdict['status'], Verdict> = {
  valid: HOLDS,
  invalid: FAILS,
  unsigned: { word: 'none', tone: 'open' },
  'unknown-key': { word: 'another’s', tone: 'open' },
  unable: UNCHECKED,
}

interface CertificateChecksProps {
  certificate: Certificate
  /** True: the content has this digest. Null: this browser can't tell. Undefined: not known yet. */
  intact: boolean | null | undefined
  signature: SignatureVerdict | undefined
  /** The keys of the installation could not be read. */
  keysError: unknown
}

const LOOKS: Record<Verdict['tone'], string> = { good: 'text-certain', bad: 'text-refused font-semibold', open: 'text-undecided' }

/** What can be told of a certificate without repeating it: digest, signature, engine. */
export function CertificateChecks({ certificate, intact, signature, keysError }: CertificateChecksProps) {
  return (
    <dl className="grid gap-x-5 gap-y-2 sm:grid-cols-[auto_auto_1fr]">
      <Check name="Digest" verdict={intact === undefined ? null : intact === null ? UNCHECKED : intact ? HOLDS : FAILS}>
        {intact === null
          ? 'The browser computes digests only over https or on this machine.'
          : intact === false
            ? 'The content is not what the digest was made of: the file was changed after it was made.'
            : 'The content is what it was when the certificate was made.'}
      </Check>
      <Check name="Signature" verdict={signature ? SIGNATURES[signature.status] : keysError ? UNCHECKED : null}>
        {signatureWords(signature, keysError)}
      </Check>
      <Check name="Engine" verdict={certificate.engine.digest === ENGINE_RELEASE.digest ? { word: 'the same', tone: 'good' } : { word: 'another', tone: 'open' }}>
        {certificate.engine.digest === ENGINE_RELEASE.digest
          ? `Made by release ${certificate.engine.version}, the same to the byte as the one in this page.`
          : `Made by release ${certificate.engine.version}; in this page runs ${ENGINE_RELEASE.version}, which is not the same to the byte. It may still repeat.`}
      </Check>
    </dl>
  )
}

function Check({ name, verdict, children }: { name: string; verdict: Verdict | null; children: ReactNode }) {
  return (
    <div className="contents">
      <dt className="font-semibold">{name}</dt>
      <dd className={verdict ? LOOKS[verdict.tone] : 'text-soft'}>{verdict?.word ?? '…'}</dd>
      <dd className="mb-2 sm:mb-0">{verdict === null ? null : children}</dd>
    </div>
  )
}

function signatureWords(signature: SignatureVerdict | undefined, keysError: unknown): ReactNode {
  if (!signature) return keysError ? 'The public keys of this register could not be read.' : null
  switch (signature.status) {
    case 'unsigned':
      return 'The certificate carries none: it comes from a run or a claim that was not signed when it was taken.'
    case 'valid':
      return (
        <>
          Signed by this register with key <code>{signature.key.id}</code>
          {signature.key.retiredAt && <>, in use until <Time at={signature.key.retiredAt} /></>}. See the <TextLink to={paths.keys()}>public keys</TextLink>.
        </>
      )
    case 'invalid':
      return <>It is not the signature of key <code>{signature.keyId}</code> over this digest.</>
    case 'unknown-key':
      return <>It names key <code>{signature.keyId}</code>, which is none of this register’s: the certificate may come from another installation.</>
    case 'unable':
      return <>It names key <code>{signature.keyId}</code> of this register, but this browser can’t check Ed25519 signatures. A newer one, or the command line, can.</>
  }
}
