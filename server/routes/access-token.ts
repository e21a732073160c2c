import { Router } from 'express'
import { z } from 'zod'
import { id } from '../../shared/schemas/common.ts'
import { accessTokenInput } from '../../shared/schemas/session.ts'
import { createAccessToken, revokeAccessToken } from '../commands/access-token.ts'
import { signedInByPassword } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { AccessToken } from '../models/access-token.ts'
import { presentAccessToken } from '../presenters/access-token.ts'

export const accessToken = Router()

const creation = { body: accessTokenInput }
const one = { params: z.object({ id }) }

// A token must not make or list others: whoever steals one would keep the door open.
accessToken.use(signedInByPassword)

accessToken.get('/', async (req, res) => {
  const rows = await AccessToken.findAll({ where: { memberId: req.member.id }, order: [['createdAt', 'DESC']], limit: 200 })
  res.json({ items: rows.map(presentAccessToken) })
})

accessToken.post('/', validate(creation), async (req: Validated<typeof creation>, res) => {
  const { row, token } = await createAccessToken(req.member, req.input)
  res.status(201).set('Cache-Control', 'no-store').json({ ...presentAccessToken(row), token })
})

accessToken.delete('/:id', validate(one), async (req: Validated<typeof one>, res) => {
  await revokeAccessToken(req.member, req.input.id)
  res.status(204).end()
})
