import { useEffect } from 'react'
import { documentTitle, headTags } from '../../../shared/page-head.ts'
import type { PageHead } from '../../../shared/page-head.ts'
import { publicAddress } from './public-address.ts'

/** Marks what belongs to the page at hand; the server marks the tags that it has written in the same way. */
const MARK = 'data-page'

/** Title, description, canonical address and what else the head says of a page: the same that the server writes when it is asked for the page. */
export function useDocumentHead({ title, description, canonical }: PageHead): void {
  useEffect(() => {
    const head = { title, description, canonical }
    document.title = documentTitle(head)
    const tags = headTags(head, publicAddress()).map(({ name, attributes }) => {
      const element = document.createElement(name)
      for (const [key, value] of Object.entries({ ...attributes, [MARK]: '' })) element.setAttribute(key, value)
      return element
    })
    for (const old of document.head.querySelectorAll(`[${MARK}]`)) old.remove()
    document.head.append(...tags)
  }, [title, description, canonical])
}
