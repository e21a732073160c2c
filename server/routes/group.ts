import { Router } from 'express'
import { z } from 'zod'
import { id } from '../../shared/schemas/common.ts'
import { groupPatch } from '../../shared/schemas/group.ts'
import { departureInput, memberPatch } from '../../shared/schemas/member.ts'
import { clearSessionCookie } from '../auth/session-cookie.ts'
import { changeRules } from '../commands/group.ts'
import { changeRoles, endMembership, leaveGroup } from '../commands/member.ts'
import { confirmPassword } from '../commands/session.ts'
import { may, signedIn, signedInByPassword } from '../middleware/authenticate.ts'
import { originOf } from '../middleware/origin.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { Group } from '../models/group.ts'
import { Member } from '../models/member.ts'
import { presentGroup } from '../presenters/group.ts'
import { presentMember } from '../presenters/member.ts'

export const group = Router()

const rules = { body: groupPatch }
const rolesOf = { params: z.object({ id }), body: memberPatch }
const one = { params: z.object({ id }) }
const departure = { body: departureInput }

group.get('/', signedIn, async (req, res) => {
  res.json(presentGroup(await Group.findByPk(req.member.groupId, { rejectOnEmpty: true }), req.member))
})

group.patch('/', signedIn, may('group.set-rules'), validate(rules), async (req: Validated<typeof rules>, res) => {
  res.json(presentGroup(await changeRules(req.member, req.input), req.member))
})

group.get('/members', signedIn, async (req, res) => {
  const rows = await Member.findAll({ where: { groupId: req.member.groupId }, order: [['state', 'ASC'], ['name', 'ASC']] })
  res.json({ items: rows.map((row) => presentMember(row, req.member)) })
})

group.patch('/members/:id', signedIn, may('members.manage'), validate(rolesOf), async (req: Validated<typeof rolesOf>, res) => {
  res.json(presentMember(await changeRoles(req.member, req.input.id, req.input.roles), req.member))
})

group.delete('/members/:id', signedIn, may('members.manage'), validate(one), async (req: Validated<typeof one>, res) => {
  await endMembership(req.member, req.input.id)
  res.status(204).end()
})

group.post('/departure', signedInByPassword, validate(departure), async (req: Validated<typeof departure>, res) => {
  await confirmPassword(req.member.id, req.input.password, originOf(req).address)
  await leaveGroup(req.member)
  clearSessionCookie(res)
  res.status(204).end()
})
