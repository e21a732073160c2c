import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { gzipSync } from 'node:zlib'
import request from 'supertest'
import { afterAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'

describe('the web application', () => {
  const app = createApp()

  it('says that it is up and reaches its database', async () => {
    await request(app).get('/health/live').expect(200, { status: 'up' })
    await request(app).get('/health/ready').expect(200, { status: 'ready' })
  })

  it('answers an unknown address of the API with a problem', async () => {
    const response = await request(app).get('/api/v1/nowhere').expect(404)
    expect(response.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(response.body).toMatchObject({ status: 404, code: 'not_found', requestId: response.headers['x-request-id'] })
  })

  it('answers malformed JSON with 400 and no word of its inside', async () => {
    const response = await request(app).post('/api/v1/session').set('X-Merestone', '1').set('Content-Type', 'application/json').send('{"email":').expect(400)
    expect(response.body.code).toBe('malformed_json')
    expect(response.text).not.toMatch(/SyntaxError|node_modules|at /)
  })

  it('refuses a change without the header that only our own pages send', async () => {
    const response = await request(app).post('/api/v1/session').send({}).expect(403)
    expect(response.body.code).toBe('cross_site_request')
  })
})

describe('the built client', () => {
  const folder = mkdtempSync(join(tmpdir(), 'merestone-client-'))
  const script = `console.log(${JSON.stringify('x'.repeat(2_000))})`
  mkdirSync(join(folder, 'assets'))
  writeFileSync(join(folder, 'index.html'), '<!doctype html><title>Merestone</title>')
  writeFileSync(join(folder, 'assets', 'main-abc.js'), script)
  writeFileSync(join(folder, 'assets', 'main-abc.js.gz'), gzipSync(script))
  writeFileSync(join(folder, '.stamp'), 'not for readers')
  const app = createApp({ clientFolder: folder })
  afterAll(() => rmSync(folder, { recursive: true }))

  it('comes compressed to whoever takes that, and whole to whoever does not', async () => {
    const small = await request(app).get('/assets/main-abc.js').set('Accept-Encoding', 'gzip').expect(200)
    expect(small.headers).toMatchObject({ 'content-encoding': 'gzip', vary: 'Accept-Encoding' })
    expect(small.headers['content-type']).toMatch(/^text\/javascript/)
    expect(small.headers['cache-control']).toContain('immutable')
    expect(small.text).toBe(script)
    const whole = await request(app).get('/assets/main-abc.js').set('Accept-Encoding', 'identity').expect(200)
    expect(whole.headers['content-encoding']).toBeUndefined()
    expect(whole.text).toBe(script)
  })

  it('answers what is not there with 404, and gives out nothing else of the disk', async () => {
    for (const path of ['/assets/gone.js', '/assets/..%2f..%2fpackage.json', '/assets/%2e%2e%2f.stamp']) await request(app).get(path).expect(404)
    await request(app).get('/.stamp').set('Accept', 'application/json').expect(404)
    await request(app).post('/constants').expect(404)
  })
})
