import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import pg from 'pg'
import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { draftClaim } from '../../server/commands/claim.ts'
import { projectRoot } from '../../server/project-root.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { PAGES } from '../../shared/pages.ts'
import { printedText } from '../../shared/printed-text.ts'
import { acting, claimIn, draft, finishedRun, freshConstant, makeCast, numberOf, takeTo, type Cast } from '../support/claims.ts'
import { makeMember, signedInAs } from '../support/people.ts'
import { databaseUrls } from '../support/test-database.ts'

/** The page that the client is built from has the same places to fill as the one that it is built to. */
const clientFolder = mkdtempSync(join(tmpdir(), 'merestone-pages-'))
writeFileSync(join(clientFolder, 'index.html'), readFileSync(join(projectRoot, 'client', 'index.html')))
afterAll(() => rmSync(clientFolder, { recursive: true }))

const app = createApp({ clientFolder })
/** Addresses of the installation in the tests, whatever the request's own host says. */
const ADDRESS = 'http://merestone.test'

interface Read {
  status: number
  title: string
  canonical: string | undefined
  noindex: boolean
  description: string
  headers: Record<string, string>
  text: string
}

async function read(path: string, agent: Pick<ReturnType<typeof request>, 'get'> = request(app)): Promise<Read> {
  const { status, headers, text } = await agent.get(path).set('Accept', 'text/html,application/xhtml+xml')
  const found = (pattern: RegExp): string | undefined => pattern.exec(text)?.[1]
  return {
    status, headers, text,
    title: found(/<title>([^<]*)<\/title>/) ?? '',
    canonical: found(/<link rel="canonical" href="([^"]*)"/),
    noindex: text.includes('<meta name="robots" content="noindex" data-page />'),
    description: found(/<meta name="description" content="([^"]*)"/) ?? '',
  }
}

const HOSTILE = '</script></noscript></title><script>alert("1")</script>'

let open: Cast
let closed: Cast

beforeAll(async () => {
  open = await makeCast({ public: true })
  closed = await makeCast({ public: false })
})

describe('what a page says of itself', () => {
  it('every page of the list is answered with its title, and is found where it is public', async () => {
    for (const page of Object.values(PAGES).filter(({ path }) => !path.includes(':'))) {
      const { status, title, canonical, noindex } = await read(page.path)
      expect([page.path, status, title]).toEqual([page.path, 200, `${page.title} · Merestone`])
      expect([page.path, noindex]).toEqual([page.path, page.access !== 'public'])
      expect(canonical).toBe(page.access === 'public' ? ADDRESS + ('canonical' in page ? page.canonical : page.path) : undefined)
    }
  })

  it('is not known by filters, sorting and cursors of the address, nor by another spelling of it', async () => {
    for (const path of ['/register?text=prime&sort=digits&order=desc', '/register/', '/', '/estimates?conditional=no']) {
      expect((await read(path)).canonical).toBe(path.startsWith('/estimates') ? `${ADDRESS}/estimates` : `${ADDRESS}/register`)
    }
  })

  it('a signed claim: title, certified digits, who and when, and its number as address even where the id was asked for', async () => {
    const claim = await claimIn('signed', open, { lo: '1.63661632335126', hi: '1.63661632335127' })
    const number = await numberOf(claim)
    const slug = number.replace('/', '-')
    for (const path of [`/claims/${slug}`, `/claims/${claim.id}`, `/claims/${slug}?reading=rounded`]) {
      const { status, title, canonical, noindex, description, text } = await read(path)
      expect(status).toBe(200)
      expect(title).toMatch(new RegExp(`^${number}: sum over primes`))
      expect(canonical).toBe(`${ADDRESS}/claims/${slug}`)
      expect(noindex).toBe(false)
      expect(description).toContain('1.6366163233512…, certified to 13 digits after the point.')
      expect(description).toContain(`By ${open.author.name}, ${open.group.name}; signed 20`)
      expect(text).toContain(`<meta property="og:url" content="${ADDRESS}/claims/${slug}"`)
      expect(text).toContain(`<meta property="og:title" content="${title.replace(' · Merestone', '')}"`)
      expect(text).toContain(`<html lang="en" data-address="${ADDRESS}">`)
    }
  })

  it('leads from a number as it is cited to the page of the claim', async () => {
    const { headers } = await request(app).get('/claims/MST-0042/1').set('Accept', 'text/html').expect(301)
    expect(headers.location).toBe('/claims/MST-0042-1')
    expect((await read('/claims/MST-0042/0')).status).toBe(404)
    expect((await read('/claims/evil.example/1')).status).toBe(404)
  })

  it('a constant, an estimate', async () => {
    const constant = await freshConstant(open.author)
    await claimIn('signed', open, { constant, lo: '0.125', hi: '0.125' })
    const page = await read(`/constants/${constantNumberText(constant.number)}`)
    expect(page).toMatchObject({ status: 200, noindex: false, canonical: `${ADDRESS}/constants/${constantNumberText(constant.number)}` })
    expect(page.description).toContain('Exactly 0.125.')
    const { id, title } = ESTIMATES[0]!
    expect(await read(`/estimates/${id}`)).toMatchObject({ status: 200, canonical: `${ADDRESS}/estimates/${id}`, title: `${printedText(title)} · Merestone` })
    expect((await read('/estimates/nobody-1900')).status).toBe(404)
  })
})

describe('the text of a page, for whoever reads it without JavaScript', () => {
  it('a claim: number, state, definition, both ends, digits, budget, estimates, signature, certificate, how to cite, caution', async () => {
    const claim = await claimIn('signed', open, { lo: '1.25001', hi: '1.25002' })
    const number = await numberOf(claim)
    const { text } = await read(`/claims/${number.replace('/', '-')}`)
    const noscript = /<noscript>([^]*)<\/noscript>/.exec(text)![1]!
    for (const part of [
      `<h1>${number}</h1>`, '<strong>signed</strong>', '<math', 'TeX: <code>\\sum', 'Sum over primes p of', '1.25001', '1.25002', '<span>2500</span>', 'transform, trapezoid', 'R-1',
      '1.0\u00a0·\u00a010<sup>−20</sup>', 'No published estimate was used', 'they meet', open.author.name, open.secondLead.name, `/api/v1/claims/${number.replace('/', '-')}/certificate`, claim.certificateDigest,
      '@misc{', 'should repeat it from the certificate.',
    ]) expect(noscript).toContain(part)
    await request(app).get(/\/api\/v1\/claims\/[\w-]+\/certificate/.exec(noscript)![0]).expect(200)
  })

  it('marks an estimate that is conditional', async () => {
    const { id, title } = ESTIMATES.find(({ conditional }) => conditional)!
    const run = await finishedRun(open.author, await freshConstant(open.author), { lo: '1.5', hi: '1.6', method: 'partial-sum' })
    await run.update({ outcome: { ...run.outcome!, estimates: [{ id, usedAt: 'x >= 10^6', validFor: 'x >= 599', conditional: true }] } })
    const claim = await takeTo('signed', await draftClaim(acting(open.author), { kind: 'enclosure', runId: run.id, remark: '' }), open)
    const { text } = await read(`/claims/${claim.id}`)
    for (const part of [`<a href="/estimates/${id}">${printedText(title)}</a>`, 'x\u00a0≥\u00a010<sup>6</sup>', 'x\u00a0≥\u00a0599', '<div>conditional</div>', 'uses 1 published estimate, 1 of them conditional']) expect(text).toContain(part)
  })

  it('a constant with its claims, and the register with its pages', async () => {
    const claim = await claimIn('signed', open)
    const [constant, number] = [(await numberOf(claim)).split('/')[0]!, await numberOf(claim)]
    expect((await read(`/constants/${constant}`)).text).toContain(`<a href="/claims/${number.replace('/', '-')}">${number}</a>`)
    const register = await read('/register?limit=1&sort=number')
    expect(register.text).toMatch(/<a href="\/constants\/MST-\d+">/)
    const next = /<a href="(\/register\?[^"]*cursor=[^"]*)">Next page/.exec(register.text)![1]!.replaceAll('&amp;', '&')
    const second = await read(next)
    expect(second.status).toBe(200)
    expect(second.text).not.toContain(/\/constants\/MST-\d+/.exec(register.text)![0])
    expect((await read(`/register?text=${constant}`)).text).toContain(`/constants/${constant}`)
  })

  it('an estimate with the public claims that rest on it', async () => {
    const { id } = ESTIMATES[0]!
    expect((await read('/estimates')).text).toContain(`<a href="/estimates/${id}">`)
    expect((await read(`/estimates/${id}`)).text).toContain('<h2>Source</h2>')
  })

  it('tells of an estimate in doubt where a group says so openly, there and at the claim that rests on it', async () => {
    const { id, title } = ESTIMATES[1]!
    const claim = await claimIn('signed', open, { estimates: [id] })
    const paths = ['/estimates', `/estimates/${id}`, `/claims/${claim.id}`]
    const doubt = async (cast: Cast, reason: string): Promise<void> => {
      const lead = await signedInAs(cast.lead, app)
      const { digest } = (await lead.get(`/api/v1/estimates/${id}/doubt`).expect(200)).body
      await lead.post(`/api/v1/estimates/${id}/doubt`).send({ reason, digest }).expect(201)
    }
    await doubt(closed, 'doubted among ourselves')
    for (const path of paths) expect((await read(path)).text).not.toMatch(/In doubt|among ourselves/)
    await doubt(open, `doubted openly ${HOSTILE}`)
    for (const path of paths) {
      const { text } = await read(path)
      expect(text).toContain('<strong>In doubt')
      expect(text).toContain(printedText(title))
      expect(text).not.toMatch(/among ourselves|<script>/)
    }
    expect((await read(paths[2]!)).text).toMatch(/State: <strong>suspended<\/strong>[^]*doubted openly &lt;/)
  })

  it('escapes whatever people have written', async () => {
    const author = await makeMember({ group: open.group, name: HOSTILE })
    const constant = await freshConstant(open.author)
    const made = await draftClaim(acting(author), { kind: 'stated', constant: constantNumberText(constant.number), value: { lo: '2', hi: '3' }, source: `${HOSTILE} $& $1`, remark: `${HOSTILE}\n<!--text-->` })
    const claim = await takeTo('signed', made, { ...open, author })
    const page = await read(`/claims/${(await numberOf(claim)).replace('/', '-')}`)
    expect(page.status).toBe(200)
    expect(page.text).not.toContain('<script>')
    expect(page.text.match(/<\/noscript>/g)).toHaveLength(1)
    expect(page.text.match(/<\/script>/g)).toHaveLength(1)
    expect(page.text.match(/<\/title>/g)!.length).toBe(1)
    expect(page.text).toContain('&lt;/script&gt;&lt;/noscript&gt;&lt;/title&gt;&lt;script&gt;alert(&quot;1&quot;)&lt;/script&gt; $&amp; $1')
    // What comes from elsewhere stands in attributes as well.
    const register = await read(`/register?text=${encodeURIComponent('"><script>')}`)
    expect(register.text).not.toContain('<script>')
  })

  it('needs no script of its own, as the policy for scripts demands', async () => {
    const { text, headers } = await read('/register')
    expect(headers['content-security-policy']).toContain("script-src 'self' 'wasm-unsafe-eval'")
    expect(text.match(/<script/g)).toHaveLength(1)
    expect(text).not.toMatch(/ on[a-z]+="/)
  })
})

describe('what is not open to the reader', () => {
  it('answers the same for a claim in work, one of a group that does not publish, and none', async () => {
    const nothing = await read('/claims/MST-9999-1')
    expect(nothing).toMatchObject({ status: 404, noindex: true, canonical: undefined, title: 'Not found · Merestone' })
    const hidden = [await claimIn('in-review', open), await claimIn('draft', open), await claimIn('signed', closed)]
    for (const claim of hidden) {
      for (const path of [`/claims/${claim.id}`, `/claims/${(await numberOf(claim)).replace('/', '-')}`]) {
        const page = await read(path)
        expect(page.status).toBe(404)
        expect(page.text).toBe(nothing.text)
      }
    }
    const constant = (await numberOf(hidden[2]!)).split('/')[0]!
    expect((await read(`/constants/${constant}`)).text).toBe(nothing.text)
    expect((await read('/register?text=' + constant)).text).not.toContain(`/constants/${constant}`)
  })

  it('opens to members to whom it is open, without a word of it in the page', async () => {
    const claim = await claimIn('signed', closed)
    const number = await numberOf(claim)
    const paths = [`/claims/${number.replace('/', '-')}`, `/constants/${number.split('/')[0]}`]
    const member = await signedInAs(closed.colleague, app)
    const stranger = await signedInAs(open.colleague, app)
    for (const path of paths) {
      const page = await read(path, member)
      expect(page).toMatchObject({ status: 200, noindex: true, canonical: undefined })
      expect(page.headers).toMatchObject({ 'cache-control': 'private, no-cache' })
      expect(page.headers.vary).toContain('Cookie')
      for (const word of [number, '1.25', closed.author.name, closed.group.name]) expect(page.text).not.toContain(word)
    }
    expect((await read(paths[0]!, stranger)).status).toBe(404)
    await member.delete('/api/v1/session').expect(204)
    expect((await read(paths[0]!, member)).status).toBe(404)
  })

  it('hides from the public page what a member may see there', async () => {
    const constant = await freshConstant(open.author)
    await claimIn('signed', open, { constant, lo: '3.5', hi: '3.75' })
    const inWork = await takeTo('in-review', await draft(open.author, { constant, lo: '3.6001', hi: '3.6002' }), open)
    const elsewhere = await claimIn('signed', closed, { constant, lo: '3.6101', hi: '3.6202' })
    const page = await read(`/constants/${constantNumberText(constant.number)}`, await signedInAs(open.author, app))
    expect(page.status).toBe(200)
    for (const word of ['3.6001', '3.6101', await numberOf(inWork), await numberOf(elsewhere), closed.group.name]) expect(page.text).not.toContain(word)
  })

  it('goes from the page when the group ceases to publish', async () => {
    const cast = await makeCast({ public: true })
    const claim = await claimIn('signed', cast)
    const path = `/claims/${(await numberOf(claim)).replace('/', '-')}`
    expect((await read(path)).status).toBe(200)
    await (await signedInAs(cast.lead, app)).patch('/api/v1/group').send({ public: false }).expect(200)
    expect((await read(path)).status).toBe(404)
  })
})

describe('addresses without a page', () => {
  it('answer 404 with the client, which says so', async () => {
    for (const path of ['/nowhere', '/.git/config', '/.env', '/constants/MST-00042', '/constants/42', '/claims/MST-0001', '/claims/x%00y', '/register/x', '/index.html', '/server/app.ts']) {
      const page = await read(path)
      expect([path, page.status, page.noindex]).toEqual([path, 404, true])
      expect(page.text).toContain('<div id="root">')
    }
  })

  it('that make no sense are refused as at the API, and the client shows why', async () => {
    for (const path of ['/register?k=none', '/register?set=smooth&k=3', '/register?cursor=abc', '/register?text=%00', '/constants/%E0%A4%A']) {
      const page = await read(path)
      expect([path, page.status]).toEqual([path, 400])
      expect(page.text).toContain('<div id="root">')
    }
  })

  it('tell a program 404 as a problem', async () => {
    const { headers } = await request(app).get('/nowhere').set('Accept', 'application/json').expect(404)
    expect(headers['content-type']).toMatch(/problem\+json/)
    await request(app).post('/register').send({}).expect(404)
  })

  it('are limited in number as requests of the API are', async () => {
    const limited = createApp({ clientFolder, ratePerMinute: 2 })
    for (const status of [200, 200, 429]) expect((await request(limited).get('/register').set('Accept', 'text/html')).status).toBe(status)
  })
})

describe('for search engines', () => {
  it('says where not to look, and lists the public constants only', async () => {
    const robots = await request(app).get('/robots.txt').expect(200)
    expect(robots.text).toContain(`Sitemap: ${ADDRESS}/sitemap.xml`)
    const own = await claimIn('signed', closed)
    const shown = await claimIn('signed', open)
    const index = await request(app).get('/sitemap.xml').expect(200)
    expect(index.headers['content-type']).toMatch(/^application\/xml/)
    const [file] = /\/sitemap-1\.xml/.exec(index.text)!
    const { text } = await request(app).get(file).expect(200)
    expect(text).toContain(`<loc>${ADDRESS}/constants/${(await numberOf(shown)).split('/')[0]}</loc>`)
    expect(text).not.toContain((await numberOf(own)).split('/')[0])
    await request(app).get('/sitemap-7.xml').expect(404)
  })
})

describe('a fault of the server', () => {
  it('leaves the reader with the client, which says so, and tells nobody that the page is gone', async () => {
    const owner = new pg.Client({ connectionString: databaseUrls.owner })
    await owner.connect()
    try {
      await owner.query('ALTER TABLE register_entries RENAME TO away')
      const page = await read('/register')
      expect(page).toMatchObject({ status: 500, noindex: true, title: 'Something went wrong here · Merestone' })
      expect(page.text).toContain('<div id="root">')
      expect(page.text).not.toMatch(/register_entries|relation/)
    } finally {
      await owner.query('ALTER TABLE away RENAME TO register_entries')
      await owner.end()
    }
  })
})
