import { Router } from 'express'
import { oneTimeToken } from '../../shared/schemas/member.ts'
import { passwordResetCompletion, passwordResetInput } from '../../shared/schemas/session.ts'
import { completePasswordReset, openPasswordReset, requestPasswordReset } from '../commands/password.ts'
import { validate, type Validated } from '../middleware/validate.ts'

export const passwordReset = Router()

const request = { body: passwordResetInput }
const offer = { params: oneTimeToken }
const completion = { params: oneTimeToken, body: passwordResetCompletion }

passwordReset.post('/', validate(request), async (req: Validated<typeof request>, res) => {
  await requestPasswordReset(req.input.email)
  res.status(202).json({})
})

passwordReset.get('/:token', validate(offer), async (req: Validated<typeof offer>, res) => {
  const { reset, member } = await openPasswordReset(req.input.token)
  res.set('Cache-Control', 'no-store').json({ email: member.email, expiresAt: reset.expiresAt.toISOString() })
})

passwordReset.post('/:token', validate(completion), async (req: Validated<typeof completion>, res) => {
  await completePasswordReset(req.input.token, req.input.password)
  res.status(204).end()
})
