import { Router } from 'express'
import { signedIn } from '../middleware/authenticate.ts'
import { presentDesk } from '../presenters/desk.ts'
import { claimRows } from '../queries/claim.ts'
import { MOST_ON_DESK, waitingFor } from '../queries/desk.ts'

/** What waits for whoever is signed in, by role, longest waiting first. */
export const desk = Router()

desk.get('/', signedIn, async (req, res) => {
  const waiting = await waitingFor(req.member, MOST_ON_DESK)
  res.set('Cache-Control', 'no-store').json(presentDesk(waiting, await claimRows(waiting.map((row) => row.claim_id))))
})
