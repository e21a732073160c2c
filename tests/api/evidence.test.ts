import { createHash } from 'node:crypto'
import { once } from 'node:events'
import { request as httpRequest, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { gzipSync } from 'node:zlib'
import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { cleanName } from '../../server/commands/evidence-type.ts'
import { selectOne } from '../../server/db.ts'
import { Claim } from '../../server/models/claim.ts'
import { Evidence } from '../../server/models/evidence.ts'
import { LIMITS } from '../../shared/limits.ts'
import { claimIn, draft, makeCast, takeTo, type Cast } from '../support/claims.ts'
import { signedInAs, type Agent } from '../support/people.ts'

const app = createApp()
let cast: Cast
let author: Agent
let claim: Claim

beforeAll(async () => {
  cast = await makeCast()
  author = await signedInAs(cast.author, app)
  claim = await draft(cast.author)
})

const upload = (content: Buffer | string, name: string, agent: Agent = author, id = claim.id) => agent.post(`/api/v1/claims/${id}/evidence`).attach('file', Buffer.from(content), name)
const PDF = '%PDF-1.7\n1 0 obj\n<<>>\nendobj\n%%EOF\n'
const PNG = Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]), Buffer.alloc(20)])
const JPEG = Buffer.concat([Buffer.from([0xff, 0xd8, 0xff, 0xe0]), Buffer.alloc(20)])
const ZIP = Buffer.concat([Buffer.from([0x50, 0x4b, 0x03, 0x04]), Buffer.alloc(20)])
const TAR = Buffer.concat([Buffer.from('a.txt'.padEnd(257, '\0')), Buffer.from('ustar\0'), Buffer.alloc(249)])

// The first bytes of each type: PDF 32000-1:2008 7.5.2; PNG (W3C) 5.2; ITU T.81 B.1.1.3; APPNOTE 4.3.7; RFC 1952 2.3.1; POSIX pax.
describe('a file is told from its content', () => {
  it.each([
    ['a PDF', PDF, 'page.pdf', 'application/pdf'],
    ['a PNG', PNG, 'scan.PNG', 'image/png'],
    ['a JPEG', JPEG, 'scan.jpeg', 'image/jpeg'],
    ['a ZIP archive', ZIP, 'all.zip', 'application/zip'],
    ['a gzip file', gzipSync('digits'), 'log.gz', 'application/gzip'],
    ['a tar archive', TAR, 'all.tar', 'application/x-tar'],
    ['plain text', 'The computation took 3 s.\nπ is not involved.\n', 'log.txt', 'text/plain'],
    ['a program', '#!/usr/bin/gp\nf(x) = x < 3;\n', 'sum.gp', 'text/plain'],
    ['a table', 'k,digits\n1,1.6366\n2,1.1448\n', 'table.csv', 'text/csv'],
    ['a table by semicolons with quoted commas', 'k;"digits; all"\n1;1,6366\n', 'table.csv', 'text/csv'],
    ['a name without ending', `${PDF} `, 'page', 'application/pdf'],
  ])('%s', async (_name, content, name, mediaType) => {
    const buffer = Buffer.from(content)
    const { body } = await upload(buffer, name).expect(201)
    expect(body).toMatchObject({ name, mediaType, bytes: buffer.length, digest: createHash('sha256').update(buffer).digest('hex'), uploadedBy: { name: cast.author.name } })
  })

  it.each([
    ['nothing', '', 'empty.txt', 'empty'],
    ['HTML', '<!DOCTYPE html><p>1.6366</p>', 'page.html', 'HTML and SVG'],
    ['HTML under another name', ' <!-- a --><html><script>alert(1)</script></html>', 'page.pdf', 'HTML and SVG'],
    ['HTML after some words', 'hello <script src=x></script>', 'note.txt', 'HTML and SVG'],
    ['SVG', '<?xml version="1.0"?>\n<svg xmlns="http://www.w3.org/2000/svg"/>', 'drawing.png', 'HTML and SVG'],
    ['an ELF program', Buffer.concat([Buffer.from('\x7fELF\x02\x01\x01'), Buffer.alloc(40)]), 'sum', 'none of them'],
    ['a Windows program', Buffer.concat([Buffer.from('MZ\x90\0'), Buffer.alloc(40)]), 'page.pdf', 'none of them'],
    ['an image called a PDF', PNG, 'page.pdf', 'The content is a PNG image'],
    ['a text called a program', 'echo hello', 'run.exe', 'ends in .exe'],
    ['a text called a page', 'hello', 'page.html', 'ends in .html'],
    ['Latin-1', Buffer.from([0x68, 0xe9, 0x6c, 0x6c, 0x6f]), 'old.txt', 'none of them'],
    ['text with control characters', 'a\0b', 'odd.txt', 'none of them'],
  ])('%s is refused', async (_name, content, name, reason) => {
    const { body } = await upload(content, name).expect(415)
    expect(body).toMatchObject({ code: 'type_not_accepted', detail: expect.stringContaining(reason) })
  })
})

describe('a name', () => {
  it('keeps its letters, whatever the script', async () => {
    const name = 'Beilage — größer als π (第三版).txt'
    const { body } = await upload('unicode', name).expect(201)
    expect(body.name).toBe(name)
    const { headers } = await author.get(`/api/v1/evidence/${body.id}`).expect(200)
    expect(headers['content-disposition']).toContain(`filename*=UTF-8''${encodeURIComponent(name).replaceAll('(', '%28').replaceAll(')', '%29')}`)
  })

  it.each([
    ['../../etc/passwd', 'passwd'],
    ['C:\\papers\\page.pdf', 'page.pdf'],
    ['gpj.\u202efdp', 'gpj.fdp'],
    ['a\0b\n.txt', 'ab.txt'],
    ['..', 'evidence'],
    ['', 'evidence'],
    [`${'x'.repeat(300)}.pdf`, `${'x'.repeat(196)}.pdf`],
  ])('%j is kept as %j', (given, kept) => expect(cleanName(given)).toBe(kept))
})

describe('a file is served', () => {
  it('as an attachment that no browser runs, to those who may read the claim', async () => {
    const { body } = await upload('served', 'served.txt').expect(201)
    const response = await author.get(`/api/v1/evidence/${body.id}`).expect(200)
    expect(response.headers).toMatchObject({
      'content-type': 'text/plain; charset=utf-8', 'content-disposition': 'attachment; filename=served.txt', 'x-content-type-options': 'nosniff', 'content-security-policy': "sandbox; default-src 'none'",
      etag: `"${body.digest}"`,
    })
    expect(response.text).toBe('served')
    await author.get(`/api/v1/evidence/${body.id}`).set('If-None-Match', `"${body.digest}"`).expect(304)
    await (await signedInAs(cast.colleague, app)).get(`/api/v1/evidence/${body.id}`).expect(200)
    await (await signedInAs(cast.referee, app)).get(`/api/v1/evidence/${body.id}`).expect(404)
    await request(app).get(`/api/v1/evidence/${body.id}`).expect(401)
  })

  it('to everybody once the claim is in a public register', async () => {
    const open = await draft(cast.author)
    const { body } = await upload('public', 'public.txt', author, open.id).expect(201)
    await takeTo('signed', open, cast)
    await request(app).get(`/api/v1/evidence/${body.id}`).expect(200)
  })
})

describe('a file stays', () => {
  it('until it is removed from a draft, and for good once the claim was submitted', async () => {
    const own = await draft(cast.author)
    const [first, second] = [(await upload('one', 'one.txt', author, own.id)).body, (await upload('two', 'two.txt', author, own.id)).body]
    await author.delete(`/api/v1/evidence/${first.id}`).expect(204)
    await author.get(`/api/v1/evidence/${first.id}`).expect(404)
    await author.delete(`/api/v1/evidence/${first.id}`).expect(404)
    await takeTo('returned', own, cast)
    expect((await author.delete(`/api/v1/evidence/${second.id}`).expect(409)).body.code).toBe('wrong_state')
    await upload('three', 'three.txt', author, own.id).expect(201)
    expect((await author.get(`/api/v1/claims/${own.id}`)).body.evidence.map(({ name }: { name: string }) => name)).toEqual(['two.txt', 'three.txt'])
  })

  it('once only, and at most twenty to a claim', async () => {
    const own = await draft(cast.author)
    await upload('same', 'a.txt', author, own.id).expect(201)
    expect((await upload('same', 'b.txt', author, own.id).expect(409)).body.detail).toContain('“a.txt”')
    for (let index = 1; index < LIMITS.evidencePerClaim; index += 1) await upload(`file ${index}`, `${index}.txt`, author, own.id).expect(201)
    expect((await upload('one more', 'more.txt', author, own.id).expect(409)).body.code).toBe('evidence_full')
  })

  it('goes with the draft that it belongs to', async () => {
    const own = await draft(cast.author)
    const { body } = await upload('gone', 'gone.txt', author, own.id).expect(201)
    await author.delete(`/api/v1/claims/${own.id}`).expect(204)
    expect(await Evidence.count({ where: { id: body.id } })).toBe(0)
  })
})

describe('too much', () => {
  let server: Server
  let port: number
  beforeAll(async () => {
    server = app.listen(0, '127.0.0.1')
    await once(server, 'listening')
    port = (server.address() as AddressInfo).port
  })
  afterAll(() => server.close())

  /** Sends a file of `megabytes` as fast as it is taken, and tells the answer and how much was taken. */
  async function send(megabytes: number, stated: boolean): Promise<{ status: number; type: string; sent: number }> {
    const cookie = (await author.get('/api/v1/session')).request.cookies as string
    const head = Buffer.from('--x\r\nContent-Disposition: form-data; name="file"; filename="big.txt"\r\nContent-Type: text/plain\r\n\r\n')
    const tail = Buffer.from('\r\n--x--\r\n')
    const chunk = Buffer.alloc(1024 * 1024, 'a')
    const outgoing = httpRequest({
      port, method: 'POST', path: `/api/v1/claims/${claim.id}/evidence`,
      headers: { Cookie: cookie, 'X-Merestone': '1', 'Content-Type': 'multipart/form-data; boundary=x', ...(stated && { 'Content-Length': head.length + megabytes * chunk.length + tail.length }) },
    })
    let sent = 0
    const broken = new Promise<void>((resolve) => outgoing.once('error', () => resolve()))
    const answered = new Promise<{ status: number; type: string }>((resolve) =>
      outgoing.once('response', (response) => {
        response.resume()
        resolve({ status: response.statusCode ?? 0, type: response.headers['content-type'] ?? '' })
      }),
    )
    let over = false
    void Promise.race([broken, answered]).then(() => (over = true))
    outgoing.write(head)
    for (let index = 0; index < megabytes && !over; index += 1) {
      sent += 1
      if (!outgoing.write(chunk)) await Promise.race([once(outgoing, 'drain').catch(() => undefined), answered, broken])
    }
    if (!over) outgoing.end(tail)
    const answer = await Promise.race([answered, broken.then(() => ({ status: 0, type: '' }))])
    outgoing.destroy()
    return { ...answer, sent }
  }

  it.each([
    ['that says so', true],
    ['that does not say so', false],
  ])('a gigabyte %s is cut off early and leaves nothing', async (_name, stated) => {
    const before = await selectOne('SELECT count(*) AS count FROM evidence')
    const { status, type, sent } = await send(1024, stated)
    expect([status, type]).toEqual([413, expect.stringContaining('application/problem+json')])
    expect(sent).toBeLessThan(64)
    expect(await selectOne('SELECT count(*) AS count FROM evidence')).toEqual(before)
  })

  it('takes 25 MB and not a byte more', async () => {
    const own = await draft(cast.author)
    await upload(Buffer.alloc(LIMITS.evidenceBytes, 'a'), 'full.txt', author, own.id).expect(201)
    await upload(Buffer.alloc(LIMITS.evidenceBytes + 1, 'b'), 'over.txt', author, own.id).expect(413)
  })
})

describe('who may not', () => {
  it('is refused before the file is read, and so is what is no upload', async () => {
    const colleague = await signedInAs(cast.colleague, app)
    expect((await upload(PDF, 'x.pdf', colleague).expect(403)).body.code).toBe('not_author')
    const signed = await claimIn('signed', cast)
    await upload(PDF, 'x.pdf', author, signed.id).expect(409)
    await request(app).post(`/api/v1/claims/${claim.id}/evidence`).set('X-Merestone', '1').attach('file', Buffer.from(PDF), 'x.pdf').expect(401)
    for (const [type, body] of [['multipart/form-data', 'x'], ['multipart/form-data; boundary=x', '--x\r\nContent-Disposition: form-data; name="file"; filename="a.txt"\r\n\r\nhalf']]) {
      expect((await author.post(`/api/v1/claims/${claim.id}/evidence`).set('Content-Type', type!).send(body).expect(400)).body.code).toBe('malformed_upload')
    }
    expect((await author.post(`/api/v1/claims/${claim.id}/evidence`).field('note', 'no file').expect(400)).body.fields).toEqual([{ path: 'file', message: 'is needed' }])
  })
})
