import { Router } from 'express'
import { constantNumberText } from '../../shared/constant-number.ts'
import { planInput } from '../../shared/schemas/run.ts'
import { readDefinition } from '../engine/definition.ts'
import { forecasts } from '../engine/forecast.ts'
import { estimatesToLeaveOut } from '../engine/without.ts'
import { signedInFor } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { Constant } from '../models/constant.ts'

/** What would be computed, and how long it would take, before anything starts. Nothing is stored. */
export const plan = Router()

const asked = { body: planInput }

plan.post('/', signedInFor('read'), validate(asked), async (req: Validated<typeof asked>, res) => {
  const { definition, key, view } = readDefinition(req.input.definition)
  const without = await estimatesToLeaveOut(req.member.groupId, req.input.without)
  const known = await Constant.findOne({ where: { definitionKey: key }, attributes: ['number'] })
  res.json({ definition: view, constant: known ? constantNumberText(known.number) : null, forecasts: await forecasts(definition, req.input.goal, without), without })
})
