import type { Express } from 'express'
import request from 'supertest'
import { beforeAll, describe, expect, it, vi } from 'vitest'
import '../support/test-database.ts'
import { createApp } from '../../server/app.ts'
import { ANSWERS } from '../../server/openapi/answers.ts'
import { operationsOf } from '../../server/openapi/operations.ts'
import { RESOURCES } from '../../server/routes/api.ts'
import { computeRuns } from '../support/compute.ts'
import { makeMember, signedInAs } from '../support/people.ts'

interface Described {
  operationId: string
  security: Record<string, string[]>[]
  parameters: { name: string; in: 'path' | 'query'; required: boolean }[]
  requestBody?: { content: Record<string, { schema: { required?: string[]; properties?: Record<string, unknown> } }> }
  responses: Record<string, { content?: Record<string, { schema: Record<string, unknown> }> }>
}

interface Document {
  openapi: string
  servers: { url: string }[]
  paths: Record<string, Record<string, Described>>
  components: { schemas: Record<string, { required?: string[]; properties: Record<string, unknown> }> }
}

/** A program that has read nothing but the document: it finds operations by name, fills in paths, and checks the answers against it. */
class DocumentClient {
  private readonly app: Express
  private readonly token: string
  private readonly document: Document

  constructor(app: Express, token: string, document: Document) {
    this.app = app
    this.token = token
    this.document = document
  }

  async call(name: string, { path = {}, body, file }: { path?: Record<string, string>; body?: object; file?: [string, Buffer] } = {}): Promise<Record<string, any>> { // eslint-disable-line @typescript-eslint/no-explicit-any
    for (const [template, operations] of Object.entries(this.document.paths)) {
      for (const [method, operation] of Object.entries(operations)) {
        if (operation.operationId === name) return this.send(template, method, operation, path, body, file)
      }
    }
    throw new Error(`the document has no operation ${name}`)
  }

  private async send(template: string, method: string, operation: Described, path: Record<string, string>, body?: object, file?: [string, Buffer]) {
    expect(operation.security.some((one) => 'token' in one), `${operation.operationId} is open to tokens`).toBe(true)
    const address = this.document.servers[0].url + template.replace(/\{(\w+)\}/g, (_, name: string) => encodeURIComponent(path[name]))
    const sent = request(this.app)[method as 'get' | 'post'](address).set('Authorization', `Bearer ${this.token}`)
    if (file) {
      const [field] = Object.keys(operation.requestBody!.content['multipart/form-data'].schema.properties!)
      sent.attach(field, file[1], file[0])
    } else if (body) {
      for (const name of operation.requestBody!.content['application/json'].schema.required ?? []) expect(body, `${operation.operationId} needs ${name}`).toHaveProperty(name)
      sent.send(body)
    }
    const answer = await sent
    const expected = operation.responses[String(answer.status)]
    expect(expected, `${operation.operationId} answered ${answer.status} ${JSON.stringify(answer.body)}`).toBeDefined()
    const described = expected.content?.['application/json']?.schema as { $ref?: string; required?: string[] } | undefined
    const schema = described?.$ref ? this.document.components.schemas[described.$ref.split('/').pop()!] : described
    for (const name of schema?.required ?? []) expect(answer.body, `${operation.operationId} answers ${name}`).toHaveProperty(name)
    return answer.body
  }
}

describe('the description of the API', () => {
  let app: Express
  let document: Document

  beforeAll(computeRuns)

  beforeAll(async () => {
    app = createApp()
    document = (await request(app).get('/api/v1/openapi.json').expect(200).expect('Content-Type', /json/)).body
  })

  it('describes every route, and no other', () => {
    const routes = operationsOf(RESOURCES).map(({ method, path }) => `${method.toUpperCase()} ${path}`)
    expect(routes.filter((route) => !(route in ANSWERS))).toEqual([])
    expect(Object.keys(ANSWERS).filter((route) => !routes.includes(route))).toEqual([])
    expect(new Set(Object.values(ANSWERS).map(({ name }) => name)).size).toBe(routes.length)
  })

  it('is OpenAPI 3.1: every path parameter is declared, every reference leads somewhere', () => {
    expect(document.openapi).toBe('3.1.0')
    for (const [path, operations] of Object.entries(document.paths)) {
      const names = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name)
      for (const operation of Object.values(operations)) {
        const declared = operation.parameters.filter((one) => one.in === 'path').map(({ name }) => name)
        // A key's address ends in .pem and is read without a schema.
        if (operation.operationId !== 'readKey') expect(declared.sort(), `${operation.operationId}`).toEqual(names.sort())
      }
    }
    const references = [...JSON.stringify(document).matchAll(/"\$ref":"#\/components\/schemas\/(\w+)"/g)].map(([, name]) => name)
    expect(references.length).toBeGreaterThan(10)
    for (const name of references) expect(document.components.schemas).toHaveProperty(name)
  })

  it("is all that a program needs for the researcher's whole job", async () => {
    const member = await makeMember({ roles: ['researcher'] })
    const made = await (await signedInAs(member, app)).post('/api/v1/access-tokens').send({ name: 'a program', scopes: ['read', 'run', 'draft'], days: 1 }).expect(201)
    const client = new DocumentClient(app, made.body.token, document)
    const definition = { type: 'series', set: { kind: 'almost-primes', k: 2, exclude: [] }, weight: { power: '1', logPower: '1' } }

    const plan = await client.call('plan', { body: { definition, goal: { digits: 20 } } })
    expect(plan.forecasts.filter((one: { recommended: boolean }) => one.recommended)).toHaveLength(1)
    const started = await client.call('startRun', { body: { definition, goal: { digits: 20 } } })
    const run = await vi.waitFor(async () => {
      const seen = await client.call('readRun', { path: { id: started.id } })
      expect(seen.state).toBe('done')
      return seen
    }, { timeout: 20_000, interval: 200 })
    // k = 2: Arb 2.23 and PARI/GP 2.15 (reference libraries).
    expect(run.outcome.enclosure.lo).toMatch(/^1\.14481657340591799152/)
    expect((await client.call('readRunCertificate', { path: { id: run.id } })).format).toBe('merestone-certificate')

    const claim = await client.call('draftClaim', { body: { kind: 'enclosure', runId: run.id, remark: 'by a program' } })
    const file = await client.call('attachEvidence', { path: { id: claim.id }, file: ['log.txt', Buffer.from('a log\n')] })
    expect(file.mediaType).toMatch(/^text\/plain/)
    const now = await client.call('readClaim', { path: { id: claim.id } })
    const submitted = await client.call('submitClaim', { path: { id: claim.id }, body: { version: now.version } })
    expect(submitted.state).toBe('submitted')
    const check = await client.call('checkDigits', { body: { against: { enclosure: run.outcome.enclosure }, text: '1.14481657340591799153', reading: 'truncated' } })
    expect(check.firstWrong).toBe(20)
  })
})
