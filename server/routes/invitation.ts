import { Router } from 'express'
import { z } from 'zod'
import { id } from '../../shared/schemas/common.ts'
import { invitationAcceptance, invitationInput, oneTimeToken } from '../../shared/schemas/member.ts'
import { setSessionCookie } from '../auth/session-cookie.ts'
import { acceptInvitation, invite, openInvitation, resendInvitation, revokeInvitation } from '../commands/invitation.ts'
import { may, signedIn } from '../middleware/authenticate.ts'
import { originOf } from '../middleware/origin.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { Group } from '../models/group.ts'
import { Invitation } from '../models/invitation.ts'
import { Member } from '../models/member.ts'
import { presentInvitation, presentOffer } from '../presenters/invitation.ts'
import { presentReader } from '../presenters/session.ts'
import { countsFor } from '../queries/counts.ts'
import { readerBySession } from '../queries/reader.ts'

export const invitation = Router()

const offer = { params: oneTimeToken }
const acceptance = { params: oneTimeToken, body: invitationAcceptance }
const creation = { body: invitationInput }
const one = { params: z.object({ id }) }

const inviterOf = ({ inviterId }: Invitation) => (inviterId === null ? null : Member.findByPk(inviterId))

invitation.get('/accept/:token', validate(offer), async (req: Validated<typeof offer>, res) => {
  const row = await openInvitation(req.input.token)
  const group = await Group.findByPk(row.groupId, { rejectOnEmpty: true })
  res.set('Cache-Control', 'no-store').json(presentOffer(row, await inviterOf(row), group))
})

invitation.post('/accept/:token', validate(acceptance), async (req: Validated<typeof acceptance>, res) => {
  const opened = await acceptInvitation(req.input.token, req.input, originOf(req))
  setSessionCookie(res, opened.id, opened.expiresAt)
  const reader = await readerBySession(opened.id)
  res.status(201).json(presentReader(reader, await countsFor(reader)))
})

invitation.use(signedIn, may('members.manage'))

invitation.get('/', async (req, res) => {
  const rows = await Invitation.findAll({ where: { groupId: req.member.groupId }, order: [['createdAt', 'DESC']], limit: 500 })
  const members = new Map((await Member.findAll({ where: { groupId: req.member.groupId } })).map((member) => [member.id, member]))
  res.json({ items: rows.map((row) => presentInvitation(row, members.get(row.inviterId ?? '') ?? null, req.member)) })
})

invitation.post('/', validate(creation), async (req: Validated<typeof creation>, res) => {
  res.status(201).json(presentInvitation(await invite(req.member, req.input), req.member, req.member))
})

invitation.post('/:id/resend', validate(one), async (req: Validated<typeof one>, res) => {
  const row = await resendInvitation(req.member, req.input.id)
  res.json(presentInvitation(row, await inviterOf(row), req.member))
})

invitation.delete('/:id', validate(one), async (req: Validated<typeof one>, res) => {
  await revokeInvitation(req.member, req.input.id)
  res.status(204).end()
})
