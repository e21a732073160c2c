import { estimateById } from '../../shared/engine/estimates/library.ts'
import { invalidField } from '../errors.ts'
import { estimatesInDoubt } from '../queries/estimate-doubt.ts'

/** Estimates that a computation of a group may not rest on: those that it has in doubt, and those that are named besides. */
export async function estimatesToLeaveOut(groupId: string, named: readonly string[] = []): Promise<string[]> {
  const unknown = named.find((id) => !estimateById(id))
  if (unknown !== undefined) throw invalidField('without', `there is no estimate named ${unknown}`)
  const inDoubt = (await estimatesInDoubt(groupId)).filter((id) => estimateById(id))
  return [...new Set([...inDoubt, ...named])].sort()
}
