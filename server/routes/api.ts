import { type RequestHandler, Router } from 'express'
import { authenticate } from '../middleware/authenticate.ts'
import { describeApi } from '../openapi/document.ts'
import { accessToken } from './access-token.ts'
import { account } from './account.ts'
import { audit } from './audit.ts'
import { claimAct } from './claim-act.ts'
import { claim } from './claim.ts'
import { constant } from './constant.ts'
import { desk } from './desk.ts'
import { digitCheck } from './digit-check.ts'
import { estimate } from './estimate.ts'
import { estimateDoubt } from './estimate-doubt.ts'
import { evidence } from './evidence.ts'
import { group } from './group.ts'
import { imports } from './import.ts'
import { invitation } from './invitation.ts'
import { key } from './key.ts'
import { outbox } from './outbox.ts'
import { lookUp } from './look-up.ts'
import { passwordReset } from './password-reset.ts'
import { plan } from './plan.ts'
import { run } from './run.ts'
import { session } from './session.ts'

/** Every resource under /api/v1 and where it is mounted; the description of the API is made from this list, too. */
export const RESOURCES: readonly (readonly [string, Router])[] = [
  ['', session],
  ['/password-resets', passwordReset],
  ['/invitations', invitation],
  ['/group', group],
  ['/account', account],
  ['/access-tokens', accessToken],
  ['/audit', audit],
  ['/outbox', outbox],
  ['/keys', key],
  ['/plans', plan],
  ['/runs', run],
  ['/estimates', estimate],
  ['/estimates', estimateDoubt],
  ['/constants', constant],
  ['/look-ups', lookUp],
  ['/claims', claim],
  ['/claims', claimAct],
  ['', evidence],
  ['/imports', imports],
  ['/digit-checks', digitCheck],
  ['/desk', desk],
]

/** Everything under /api/v1, one router a resource. */
export function api(): Router {
  const router = Router()
  router.get('/openapi.json', openApi)
  router.use(authenticate)
  for (const [path, resource] of RESOURCES) router.use(path || '/', resource)
  return router
}

/** The description of all of it, made once when it is first asked for. */
const openApi: RequestHandler = (_req, res) => {
  description ??= JSON.stringify(describeApi(RESOURCES))
  res.set('Cache-Control', 'no-cache').type('application/json').send(description)
}
let description: string | undefined
