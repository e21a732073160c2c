import type { RequestHandler, Router } from 'express'
import type { AccessMark } from '../middleware/authenticate.ts'
import type { RequestSchemas } from '../middleware/validate.ts'

/** One route as the routers have it. */
export interface Operation {
  method: string
  /** As Express writes it, under /api/v1: "/runs/:id". */
  path: string
  schemas: RequestSchemas
  /** `public`: nobody need be signed in. */
  access: 'public' | AccessMark['access']
}

type Handler = RequestHandler & { schemas?: RequestSchemas } & Partial<AccessMark>
interface Layer {
  route?: { path: string; stack: { method: string; handle: Handler }[] }
  handle: Handler
}

/** Every route of the routers, with the checks that stand before its handler: what is described is what runs. */
export function operationsOf(resources: readonly (readonly [string, Router])[]): Operation[] {
  return resources.flatMap(([prefix, router]) => {
    let common: Operation['access'] = 'public'
    return (router.stack as unknown as Layer[]).flatMap((layer) => {
      if (!layer.route) {
        common = layer.handle.access ?? common
        return []
      }
      const { path, stack } = layer.route
      const handlers = stack.map(({ handle }) => handle)
      const access = handlers.find((handle) => handle.access)?.access ?? common
      const schemas = Object.assign({}, ...handlers.map((handle) => handle.schemas ?? {})) as RequestSchemas
      return [{ method: stack[0].method, path: `${prefix}${path}`.replace(/(.)\/$/, '$1'), schemas, access }]
    })
  })
}
