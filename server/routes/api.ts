import { Router } from 'express'
import { authenticate } from '../middleware/authenticate.ts'
import { accessToken } from './access-token.ts'
import { account } from './account.ts'
import { audit } from './audit.ts'
import { claimAct } from './claim-act.ts'
import { claim } from './claim.ts'
import { constant } from './constant.ts'
import { desk } from './desk.ts'
import { digitCheck } from './digit-check.ts'
import { estimate } from './estimate.ts'
import { evidence } from './evidence.ts'
import { group } from './group.ts'
import { invitation } from './invitation.ts'
import { key } from './key.ts'
import { outbox } from './outbox.ts'
import { lookUp } from './look-up.ts'
import { passwordReset } from './password-reset.ts'
import { plan } from './plan.ts'
import { run } from './run.ts'
import { session } from './session.ts'

/** Everything under /api/v1, one router a resource. */
export function api(): Router {
  const router = Router()
  router.use(authenticate)
  router.use(session)
  router.use('/password-resets', passwordReset)
  router.use('/invitations', invitation)
  router.use('/group', group)
  router.use('/account', account)
  router.use('/access-tokens', accessToken)
  router.use('/audit', audit)
  router.use('/outbox', outbox)
  router.use('/keys', key)
  router.use('/plans', plan)
  router.use('/runs', run)
  router.use('/estimates', estimate)
  router.use('/constants', constant)
  router.use('/look-ups', lookUp)
  router.use('/claims', claim)
  router.use('/claims', claimAct)
  router.use(evidence)
  router.use('/digit-checks', digitCheck)
  router.use('/desk', desk)
  return router
}
