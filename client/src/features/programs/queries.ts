import { queryOptions } from '@tanstack/react-query'
import { api } from '../../lib/api-client.ts'

/** What the page shows of the OpenAPI document. */
export interface ApiDocument {
  info: { description: string }
  servers: { url: string }[]
  paths: Record<string, Record<string, ApiOperation>>
}

export interface ApiOperation {
  operationId: string
  tags: string[]
  summary: string
  security: Record<string, string[]>[]
  parameters: { name: string; in: string; required: boolean; schema: { description?: string } }[]
  requestBody?: { content: Record<string, { schema: object }> }
  responses: Record<string, { description: string }>
}

export const apiDocumentQuery = () => queryOptions({ queryKey: ['api-document'], queryFn: ({ signal }) => api.get<ApiDocument>('/openapi.json', { signal }), staleTime: Infinity })
