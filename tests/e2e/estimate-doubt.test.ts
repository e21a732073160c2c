import type { Page } from 'playwright-core'
import { beforeAll, describe, expect, it } from 'vitest'
import '../support/test-database.ts'
import { draftClaim } from '../../server/commands/claim.ts'
import type { Claim } from '../../server/models/claim.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import { acting, claimIn, makeCast, numberOf, takeTo, type Cast } from '../support/claims.ts'
import { makeConstant, series } from '../support/register.ts'
import { eventually, type Installation, openWindow, signIn, startInstallation } from './installation.ts'

const ID = 'theta-johnston-2022'

describe('an estimate falls into doubt, from what it brings down to what comes back', () => {
  const troubles: string[] = []
  let product: Installation
  let cast: Cast
  let lead: Page
  let claims: Claim[]

  beforeAll(async () => {
    product = await startInstallation()
    cast = await makeCast({ recheck_needed: false })
    const [primes, pairs] = [await makeConstant(cast.author, series({ kind: 'primes' })), await makeConstant(cast.author, series({ kind: 'almost-primes', k: 2 }))]
    const [greater, lesser] = [await claimIn('signed', cast, { lo: '1.6366', hi: '1.6367', constant: primes, estimates: [ID] }), await claimIn('signed', cast, { lo: '1.144', hi: '1.145', constant: pairs, estimates: [ID] })]
    const order = await draftClaim(acting(cast.author), { kind: 'order', lesser: constantNumberText(pairs.number), greater: constantNumberText(primes.number), remark: '' })
    claims = [greater, lesser, await takeTo('signed', order, cast)]
    lead = await openWindow(product, troubles)
    await signIn(lead, cast.lead.email)
  })

  it('the lead sees all that falls, and marks it with a reason', async () => {
    await lead.goto(`/estimates/${ID}`)
    for (const claim of claims) await lead.getByRole('table', { name: 'In force: they fall' }).getByRole('link', { name: await numberOf(claim) }).waitFor()
    await lead.getByRole('button', { name: 'Mark in doubt …' }).click()
    await lead.getByLabel('Reason').fill('Lemma 4 has a gap.')
    await lead.getByRole('button', { name: 'Mark in doubt and suspend 3 claims' }).click()
    await lead.getByText('3 claims are suspended').waitFor()
    await lead.getByText(/^In doubt at/).waitFor()
  })

  it('the author hears of it in one mail, and a reader finds it on the claim', async () => {
    const toAuthor = async () => (await product.mails()).filter(({ to, subject }) => to.includes(cast.author.email) && subject.includes('in doubt'))
    await eventually(async () => ((await toAuthor()).length > 0 ? true : undefined), 'the mail on the doubt')
    const [mail, ...more] = await toAuthor()
    expect(more).toEqual([])
    for (const claim of claims) expect(mail!.text).toContain(await numberOf(claim))
    const reader = await openWindow(product, troubles)
    await reader.goto(`/claims/${(await numberOf(claims[0]!)).replace('/', '-')}`)
    await reader.getByText('It rests on an estimate in doubt.').waitFor()
    await reader.goto('/estimates?state=in-doubt')
    await reader.getByText('1 of').waitFor()
  })

  it('its constants are run again without it', async () => {
    await lead.getByRole('button', { name: 'Run all 2 again without it' }).click()
    await eventually(async () => ((await lead.getByRole('link', { name: 'done' }).count()) === 2 ? true : undefined), 'both runs', 60)
    await lead.getByRole('link', { name: 'done' }).first().click()
    await lead.getByRole('heading', { name: 'Error budget' }).waitFor()
    await lead.getByText('Without', { exact: true }).waitFor()
  })

  it('the doubt is lifted and what was chosen comes back', async () => {
    await lead.goto(`/estimates/${ID}`)
    await lead.getByRole('button', { name: 'Lift the doubt …' }).click()
    await lead.getByLabel('Reason').fill('A corrigendum closes the gap.')
    await lead.getByRole('button', { name: 'Lift the doubt and reinstate 3 claims' }).click()
    await lead.getByText('The doubt is lifted.').waitFor()
    await lead.getByRole('heading', { name: 'Doubts that were lifted' }).waitFor()
    expect(troubles).toEqual([])
  })
})
