import type { Router } from 'express'
import { z } from 'zod'
import { certificateSchema } from '../../shared/schemas/certificate.ts'
import { claim } from '../../shared/schemas/claim.ts'
import { problem } from '../../shared/schemas/common.ts'
import { constant } from '../../shared/schemas/constant.ts'
import { run } from '../../shared/schemas/run.ts'
import { session } from '../../shared/schemas/session.ts'
import { COOKIE } from '../auth/session-cookie.ts'
import { type Answer, ANSWERS } from './answers.ts'
import { type Operation, operationsOf } from './operations.ts'

type JsonSchema = Record<string, unknown>

/** A zod schema as JSON Schema 2020-12, which OpenAPI 3.1 uses; `input` as it is sent, `output` as it is answered. */
function jsonSchema(schema: z.ZodType, io: 'input' | 'output'): JsonSchema {
  const { $schema: _, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any', reused: 'inline' })
  return rest
}

/** The fields of an object schema as parameters of a path or a query. */
function parameters(schema: z.ZodType | undefined, where: 'path' | 'query'): JsonSchema[] {
  if (!schema) return []
  const { properties = {}, required = [] } = jsonSchema(schema, 'input') as { properties?: Record<string, JsonSchema>; required?: string[] }
  return Object.entries(properties).map(([name, one]) => ({ name, in: where, required: where === 'path' || required.includes(name), schema: one }))
}

/** Schemas that many answers share, by the name they have in the document. */
const NAMED = new Map<z.ZodType, string>([
  [claim, 'Claim'],
  [constant, 'Constant'],
  [run, 'Run'],
  [session, 'Session'],
  [certificateSchema, 'Certificate'],
])

function answerSchema(schema: z.ZodType): JsonSchema {
  const name = NAMED.get(schema)
  return name ? { $ref: `#/components/schemas/${name}` } : jsonSchema(schema, 'output')
}

function answerBody(answer: Answer): JsonSchema {
  if (answer.body === null) return { description: answer.summary }
  if (typeof answer.body === 'string') return { description: answer.summary, content: { [answer.body]: { schema: { type: 'string' } } } }
  return { description: answer.summary, content: { 'application/json': { schema: answerSchema(answer.body) } } }
}

const REFUSAL = { description: 'Refused: what is wrong, and at which field.', content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } } }

function requestBody(operation: Operation, answer: Answer): JsonSchema | undefined {
  if (answer.upload) {
    const schema = { type: 'object', required: [answer.upload], properties: { [answer.upload]: { type: 'string', contentMediaType: 'application/octet-stream' } } }
    return { required: true, content: { 'multipart/form-data': { schema } } }
  }
  if (!operation.schemas.body) return undefined
  return { required: true, content: { 'application/json': { schema: jsonSchema(operation.schemas.body, 'input') } } }
}

/** Tokens serve reading where a session does; what is open to their other scopes says so. */
function security({ access, method }: Operation): JsonSchema[] {
  if (access === 'public') return [{}, { session: [] }, { token: [] }]
  if (access === 'session' || (access === 'reading' && method !== 'get')) return [{ session: [] }]
  return [{ session: [] }, { token: [access === 'reading' ? 'read' : access] }]
}

function describe(operation: Operation): JsonSchema {
  const answer = ANSWERS[`${operation.method.toUpperCase()} ${operation.path}`]
  if (!answer) throw new Error(`${operation.method} ${operation.path} has no entry in the description of the API`)
  const body = requestBody(operation, answer)
  return {
    operationId: answer.name,
    tags: [operation.path.split('/')[1]],
    summary: answer.summary,
    security: security(operation),
    parameters: [...parameters(operation.schemas.params, 'path'), ...parameters(operation.schemas.query, 'query')],
    ...(body && { requestBody: body }),
    responses: { [String(answer.status)]: answerBody(answer), default: REFUSAL },
  }
}

/** The API as an OpenAPI 3.1 document, made from the routes that run and the schemas that they check by. */
export function describeApi(resources: readonly (readonly [string, Router])[]): JsonSchema {
  const paths: Record<string, Record<string, JsonSchema>> = {}
  for (const operation of operationsOf(resources)) {
    const path = operation.path.replace(/:(\w+)/g, '{$1}')
    paths[path] = { ...paths[path], [operation.method]: describe(operation) }
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Merestone',
      version: '1',
      description:
        'Enclosures and claims of numerical constants of explicit number theory. Numbers are exact decimal text. A refusal is application/problem+json (RFC 9457) with the fields at fault. ' +
        'Lists answer { items, next }; send `next` as `cursor` for the following page. A request that changes something from a browser session carries the header X-Merestone: 1; one with an access token does not need it.',
    },
    servers: [{ url: '/api/v1' }],
    paths,
    components: {
      schemas: { Problem: jsonSchema(problem, 'output'), ...Object.fromEntries([...NAMED].map(([schema, name]) => [name, jsonSchema(schema, 'output')])) },
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: COOKIE },
        token: { type: 'http', scheme: 'bearer', description: 'A personal access token with the scope read, run or draft, made on the account page.' },
      },
    },
  }
}
