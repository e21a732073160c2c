import { Router } from 'express'
import { accountPatch } from '../../shared/schemas/member.ts'
import { changeAccount } from '../commands/member.ts'
import { signedInByPassword } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Member } from '../models/member.ts'
import { presentAccount } from '../presenters/member.ts'

export const account = Router()

const patch = { body: accountPatch }

account.use(signedInByPassword)

async function own({ id, groupId, groupName }: SignedInMember) {
  return presentAccount(await Member.findByPk(id, { rejectOnEmpty: true }), { id: groupId, name: groupName })
}

account.get('/', async (req, res) => {
  res.json(await own(req.member))
})

account.patch('/', validate(patch), async (req: Validated<typeof patch>, res) => {
  await changeAccount(req.member, req.input)
  res.json(await own(req.member))
})
