import { Router } from 'express'
import { z } from 'zod'
import { act, claimReference, type Act } from '../../shared/schemas/claim.ts'
import { acceptReview, assignReferee, confirmClaim, declineReview, recheckClaim, remindReferee } from '../commands/assignment.ts'
import { reinstateClaim, returnClaim, signClaim, suspendClaim, withdrawClaim } from '../commands/claim-decisions.ts'
import { resubmitClaim, submitClaim } from '../commands/claim.ts'
import { answerObjection, objectToClaim, settleObjection } from '../commands/objection.ts'
import { signedIn, signedInFor } from '../middleware/authenticate.ts'
import { originOf } from '../middleware/origin.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { claimDetailIfOpen, claimIdFor } from '../queries/claim-page.ts'

/** The acts of a claim's life, each under its own address. Who may do what and when is in shared/claim-life.ts. */
export const claimAct = Router()

type Handlers = { [Name in Act]: (member: SignedInMember, id: string, input: z.output<(typeof act)[Name]>, address: string) => Promise<void> }

const HANDLERS: Handlers = {
  submit: (member, id, { version }) => submitClaim(member, id, version),
  assign: assignReferee,
  remind: remindReferee,
  accept: acceptReview,
  decline: declineReview,
  recheck: recheckClaim,
  object: objectToClaim,
  answer: answerObjection,
  settle: settleObjection,
  confirm: confirmClaim,
  return: returnClaim,
  resubmit: resubmitClaim,
  sign: signClaim,
  suspend: suspendClaim,
  reinstate: reinstateClaim,
  withdraw: withdrawClaim,
}

/** An author's program may put claims to the register; everything else needs a person who has signed in. */
const OPEN_TO_TOKENS: readonly Act[] = ['submit', 'answer', 'resubmit']

for (const name of Object.keys(HANDLERS) as Act[]) {
  const request = { params: z.object({ id: claimReference }), body: act[name] }
  const handle = HANDLERS[name] as (member: SignedInMember, id: string, input: unknown, address: string) => Promise<void>
  claimAct.post(`/:id/${name}`, OPEN_TO_TOKENS.includes(name) ? signedInFor('draft') : signedIn, validate(request), async (req: Validated<typeof request>, res) => {
    const id = await claimIdFor(req.input.id)
    await handle(req.member, id, req.input, originOf(req).address)
    const detail = await claimDetailIfOpen(req.member, id)
    if (detail) res.json(detail)
    else res.status(204).end()
  })
}
