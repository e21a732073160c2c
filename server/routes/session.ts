import { Router } from 'express'
import { Op } from 'sequelize'
import { z } from 'zod'
import { id } from '../../shared/schemas/common.ts'
import { passwordChange, signInInput } from '../../shared/schemas/session.ts'
import { clearSessionCookie, setSessionCookie } from '../auth/session-cookie.ts'
import { changePassword } from '../commands/password.ts'
import { endSession, signIn } from '../commands/session.ts'
import { signedInByPassword } from '../middleware/authenticate.ts'
import { originOf } from '../middleware/origin.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { Session } from '../models/session.ts'
import { presentReader, presentSession } from '../presenters/session.ts'
import { countsFor } from '../queries/counts.ts'
import { readerBySession } from '../queries/reader.ts'

export const session = Router()

const signInRequest = { body: signInInput }
const ownSession = { params: z.object({ id }) }
const passwordRequest = { body: passwordChange }

const currentSession = (via: { kind: string; sessionId?: string }) => via.sessionId

session.get('/session', async (req, res) => {
  res.set('Cache-Control', 'no-store').json(presentReader(req.reader, await countsFor(req.reader)))
})

session.post('/session', validate(signInRequest), async (req: Validated<typeof signInRequest>, res) => {
  const opened = await signIn(req.input.email, req.input.password, originOf(req))
  setSessionCookie(res, opened.id, opened.expiresAt)
  const reader = await readerBySession(opened.id)
  res.json(presentReader(reader, await countsFor(reader)))
})

session.delete('/session', async (req, res) => {
  if (req.reader?.via.kind === 'session') await endSession(req.reader.id, req.reader.via.sessionId)
  clearSessionCookie(res)
  res.status(204).end()
})

session.get('/sessions', signedInByPassword, async (req, res) => {
  const rows = await Session.findAll({ where: { memberId: req.member.id, endedAt: null, expiresAt: { [Op.gt]: new Date() } }, order: [['lastSeenAt', 'DESC']] })
  res.json({ items: rows.map((row) => presentSession(row, currentSession(req.member.via))) })
})

session.delete('/sessions/:id', signedInByPassword, validate(ownSession), async (req: Validated<typeof ownSession>, res) => {
  await endSession(req.member.id, req.input.id)
  if (req.input.id === currentSession(req.member.via)) clearSessionCookie(res)
  res.status(204).end()
})

session.put('/password', signedInByPassword, validate(passwordRequest), async (req: Validated<typeof passwordRequest>, res) => {
  await changePassword(req.member, req.input.current, req.input.next, originOf(req).address)
  res.status(204).end()
})
