import type { RouteObject } from 'react-router-dom'
import { describe, expect, it } from 'vitest'
import { createQueryClient } from '../../client/src/app/query-client.ts'
import { createRouter } from '../../client/src/app/router.tsx'
import { claimHead, constantHead, headTags, pageHead } from '../../shared/page-head.ts'
import { PAGES } from '../../shared/pages.ts'
import { claimSigned, constantSummaries } from './fixtures.ts'

const pathsOf = (routes: readonly RouteObject[]): string[] => routes.flatMap(({ path, index, children }) => [...(index ? ['/'] : []), ...(path && path !== '/' ? [path] : []), ...pathsOf(children ?? [])])

describe('the list of pages', () => {
  it('is what the router knows, no more and no less', () => {
    const known = pathsOf(createRouter(createQueryClient()).routes).filter((path) => path !== '*')
    expect(known.sort()).toEqual(Object.values(PAGES).map(({ path }) => path).sort())
  })

  it('gives every public page words of its own', () => {
    const listed = Object.values(PAGES).filter(({ path, access }) => access === 'public' && !path.includes(':') && path !== '/')
    expect(new Set(listed.map((page) => ('description' in page ? page.description : undefined))).size).toBe(listed.length)
  })
})

describe('the head of a page', () => {
  it('names a constant only where it is in the register', () => {
    const signed = constantSummaries[0]!
    expect(constantHead(signed).canonical).toBe(`/constants/${signed.number}`)
    expect(constantHead({ ...signed, state: 'in-review' }).canonical).toBeNull()
  })

  it('shows no digit that is not certified, and cuts none of an interval short inward', () => {
    const summary = { ...constantSummaries[0]!, best: { lo: '1.63661632335126086856965800392186367118159707613129', hi: '1.63661632335126086856965800392186367118159707613131', digits: { truncated: 48, rounded: 48 } } }
    expect(constantHead(summary).description).toContain('1.636616323351260868569658003921…, certified to 48 digits after the point.')
    const wide = { lo: `0.99${'9'.repeat(40)}1`, hi: `1.00${'0'.repeat(40)}1` }
    const { description } = constantHead({ ...summary, best: { ...wide, digits: { truncated: 0, rounded: 0 } } })
    expect(description).toContain(`In [0.${'9'.repeat(30)}, 1.${'0'.repeat(29)}1].`)
  })

  it('tells drafts from what was signed', () => {
    const signed = { ...claimSigned, signedAt: '2026-05-02T10:00:00Z' }
    expect(claimHead(signed)).toMatchObject({ canonical: `/claims/${signed.number!.replace('/', '-')}` })
    expect(claimHead({ ...signed, number: null, signedAt: null, state: 'draft' })).toMatchObject({ canonical: null, title: expect.stringMatching(/^Draft for MST-/) })
  })

  it('asks not to be listed where it has no address to be listed by', () => {
    const tags = (name: 'desk' | 'register') => headTags(pageHead(name), 'https://merestone.example').map(({ attributes }) => attributes)
    expect(tags('desk')).toContainEqual({ name: 'robots', content: 'noindex' })
    expect(tags('register')).toContainEqual({ rel: 'canonical', href: 'https://merestone.example/register' })
    expect(tags('register')).not.toContainEqual({ name: 'robots', content: 'noindex' })
  })
})
