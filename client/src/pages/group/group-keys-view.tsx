import { pageHead } from '../../../../shared/page-head.ts'
import type { Group, PublicKey } from '../../../../shared/schemas/group.ts'
import { paths } from '../../app/paths.ts'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Page } from '../../components/ui/page.tsx'
import { GroupHead } from '../../features/group/components/group-head.tsx'
import { KeyList } from '../../features/keys/components/key-list.tsx'
import { KeyNotes } from '../../features/keys/components/key-notes.tsx'

/** The keys that the group's claims are signed with. */
export function GroupKeysView({ group, keys }: { group: Group | undefined; keys: Fetched<PublicKey[]> }) {
  return (
    <Page about={pageHead('groupKeys')} head={<GroupHead group={group} />} margin={<KeyNotes />}>
      <p className="mb-6 max-w-prose">
        All groups of this installation sign with its keys. Readers find the public halves at <TextLink to={paths.keys()}>an address of their own</TextLink>.
      </p>
      <Part of={keys} what="the keys">{(list) => <KeyList keys={list} />}</Part>
    </Page>
  )
}
