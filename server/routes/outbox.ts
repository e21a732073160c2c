import { Router } from 'express'
import { z } from 'zod'
import { id } from '../../shared/schemas/common.ts'
import { outboxQuery } from '../../shared/schemas/group.ts'
import { resendMail } from '../commands/outbox.ts'
import { may, signedIn } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { presentOutboxItem } from '../presenters/outbox.ts'
import { listOutbox } from '../queries/outbox.ts'

/** The fate of the mails of the lead's own group. */
export const outbox = Router()

const list = { query: outboxQuery }
const one = { params: z.object({ id }) }

outbox.use(signedIn, may('outbox.manage'))

outbox.get('/', validate(list), async (req: Validated<typeof list>, res) => {
  res.json(await listOutbox(req.member.groupId, req.input))
})

outbox.post('/:id/resend', validate(one), async (req: Validated<typeof one>, res) => {
  res.status(201).json(presentOutboxItem(await resendMail(req.member, req.input.id)))
})
