import { pageHead } from '../../../../shared/page-head.ts'
import type { PublicKey } from '../../../../shared/schemas/group.ts'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { Page } from '../../components/ui/page.tsx'
import { KeyList } from '../../features/keys/components/key-list.tsx'
import { KeyNotes } from '../../features/keys/components/key-notes.tsx'

/** The installation's public keys, for whoever verifies a certificate. */
export function KeysView({ keys }: { keys: Fetched<PublicKey[]> }) {
  return (
    <Page about={pageHead('keys')} head={<h1>Public keys</h1>} margin={<KeyNotes />}>
      <p className="mb-6 max-w-prose">
        With these, anybody can tell whether a certificate was signed by this register. A program reads them at <code>/api/v1/keys</code>.
      </p>
      <Part of={keys} what="the keys">{(list) => <KeyList keys={list} />}</Part>
    </Page>
  )
}
