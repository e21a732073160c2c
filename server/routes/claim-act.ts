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
import { viewOf } from '../policies/claim.ts'
import { claimDetail, readClaim } from '../queries/claim-page.ts'
import { standingOf } from '../queries/claim-review.ts'

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
    const { row } = await readClaim(req.member, req.input.id)
    await handle(req.member, row.id, req.input, originOf(req).address)
    // Who gives a review back may have no view of the claim any more.
    const standing = await standingOf(req.member, { id: row.id, kind: row.kind, groupId: row.group_id, authorId: row.author_id })
    if (viewOf({ signedAt: row.signed_at, groupPublic: row.group_public }, standing) === 'none') res.status(204).end()
    else res.json(await claimDetail(req.reader, row.id))
  })
}
