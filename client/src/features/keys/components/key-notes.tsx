import { paths } from '../../../app/paths.ts'
import { TextLink } from '../../../components/ui/link.tsx'
import { MarginNote } from '../../../components/ui/page.tsx'

/** What the keys are for, for the margin. */
export function KeyNotes() {
  return (
    <>
      <MarginNote title="What they sign">
        <p>When a lead signs a claim, its certificate is signed with the key in use. The signature shows that the certificate left this register as it is, and nothing more: that it holds is shown by repeating it.</p>
      </MarginNote>
      <MarginNote title="When a key changes">
        <p>What a retired key signed stays verifiable with it, so its public half stays here.</p>
      </MarginNote>
      <MarginNote title="To verify a certificate">
        <p>
          <TextLink to={paths.verify()}>Drop its file here</TextLink>, or run <code>npm run -s verify -- certificate.json --key key.pem</code> from a copy of the program.
        </p>
      </MarginNote>
    </>
  )
}
