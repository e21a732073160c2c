import type { BrowserContext, Page } from 'playwright-core'
import { beforeAll, describe, expect, it } from 'vitest'
import '../support/test-database.ts'
import { claimSlug } from '../../shared/constant-number.ts'
import { claimIn, freshConstant, makeCast } from '../support/claims.ts'
import { type Installation, openWindow, startInstallation } from './installation.ts'

/** Widths of a telephone and of a desk. */
const WIDTHS = [390, 1280]
/** Two hundred digits after the point, and one more that the ends do not share; any will do. */
const DIGITS = '14159265358979323846'.repeat(10)

let product: Installation
let constant: string
let claim: string

beforeAll(async () => {
  product = await startInstallation()
  const cast = await makeCast({ public: true, name: 'Institute for Constants of Multiplicative Number Theory' })
  const stated = await freshConstant(cast.author)
  const signed = await claimIn('signed', cast, { constant: stated, lo: `3.${DIGITS}1`, hi: `3.${DIGITS}2` })
  claim = `/claims/${claimSlug(stated.number, signed.ordinal ?? 0)}`
  constant = claim.replace('claims', 'constants').replace(/-1$/, '')
})

/** Whether the page is wider than the window. */
const overflow = async (page: Page): Promise<boolean> => {
  const box = await page.locator('body').evaluate((body) => [body.scrollWidth, body.ownerDocument.documentElement.clientWidth])
  return box[0]! > box[1]!
}

describe('without JavaScript', () => {
  let context: BrowserContext
  let page: Page
  beforeAll(async () => {
    context = await product.browser.newContext({ baseURL: product.address, javaScriptEnabled: false, viewport: { width: WIDTHS[0]!, height: 800 }, acceptDownloads: true })
    page = await context.newPage()
  })

  it('a reader finds a constant in the register, its claim, and the certificate', async () => {
    await page.goto('/register')
    await page.getByLabel('Words, a definition, or leading digits').fill('3.14159')
    await page.getByRole('button', { name: 'Find' }).click()
    await page.getByRole('link', { name: constant.split('/').pop()! }).click()
    await page.getByRole('heading', { name: 'Convergence and members' }).waitFor()
    await page.locator(`a[href="${claim}"]`).first().click()
    expect(await page.locator('.entry').innerText()).toContain(`3.${DIGITS}2`)
    expect(await page.locator('math').isVisible()).toBe(true)
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'Download the certificate' }).click()])
    expect(download.suggestedFilename()).toBe(`${claim.split('/').pop()}.json`)
  })

  it('and reads every one of these pages on a telephone and at a desk', async () => {
    for (const width of WIDTHS) {
      await page.setViewportSize({ width, height: 800 })
      for (const path of ['/register', constant, claim, '/estimates']) {
        await page.goto(path)
        expect(await page.getByRole('heading', { level: 1 }).isVisible()).toBe(true)
        expect([path, width, await overflow(page)]).toEqual([path, width, false])
      }
    }
  })
})

describe('with JavaScript', () => {
  const troubles: string[] = []
  let page: Page
  beforeAll(async () => {
    page = await openWindow(product, troubles)
  })

  /** What the head says of the page. */
  const head = () => page.locator('head').evaluate((element) => ({ title: element.ownerDocument.title, tags: [...element.querySelectorAll('[data-page]')].map((tag) => tag.outerHTML) }))

  it('the client says of each page what the server says of it', async () => {
    for (const path of ['/register', '/estimates', constant, claim, '/verify', '/look-up', '/keys', '/sign-in', '/nowhere']) {
      await page.goto(path)
      await page.getByRole('heading', { level: 1 }).first().waitFor()
      const served = await (await page.request.get(path, { headers: { Accept: 'text/html' } })).text()
      const title = /<title>(.*?)<\/title>/.exec(served)![1]!.replaceAll('&gt;', '>').replaceAll('&lt;', '<').replaceAll('&amp;', '&')
      await expect.poll(async () => (await head()).title).toBe(title)
      const { tags } = await head()
      expect(tags.map((tag) => tag.replace('data-page=""', 'data-page'))).toEqual([...served.matchAll(/<(?:meta|link)[^>]*data-page \/>/g)].map(([tag]) => tag.replace(' data-page />', ' data-page>').replaceAll('&#39;', "'").replaceAll('&lt;', '<').replaceAll('&gt;', '>')))
    }
  })

  it('and says it anew on the way from page to page', async () => {
    await page.goto('/register')
    await page.getByRole('link', { name: 'Estimates' }).click()
    await expect.poll(async () => (await head()).tags.find((tag) => tag.includes('canonical'))).toContain(`${product.address}/estimates`)
    await page.goBack()
    await expect.poll(async () => (await head()).tags.find((tag) => tag.includes('canonical'))).toContain(`${product.address}/register`)
    await expect.poll(async () => (await head()).title).toBe('Register of constants · Merestone')
  })

  it('a claim of 200 digits takes two sheets of A4 at most, with nothing beyond their edge', async () => {
    await page.goto(claim)
    await page.getByRole('heading', { name: 'To cite it' }).waitFor()
    await page.locator('.katex').first().waitFor()
    const pdf = (await page.pdf({ preferCSSPageSize: true })).toString('latin1')
    expect(pdf.match(/\/MediaBox \[0 0 (594|595|596)[.\d]* (841|842)[.\d]*\]/g)!.length).toBeGreaterThan(0)
    expect(pdf.match(/\/Type \/Page\b(?!s)/g)!.length).toBeLessThanOrEqual(2)
    await page.emulateMedia({ media: 'print' })
    // A4 less its margins, at 96 to the inch.
    await page.setViewportSize({ width: 658, height: 990 })
    expect(await overflow(page)).toBe(false)
    await page.emulateMedia({ media: 'screen' })
  })

  it('and nothing broke on the way', () => {
    expect(troubles).toEqual([])
  })
})
