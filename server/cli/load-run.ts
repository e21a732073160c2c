import { once } from 'node:events'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { newToken, tokenHash } from '../auth/tokens.ts'
import { change } from '../db.ts'
import type { Roll } from './load-definitions.ts'
import { gatherFacts, type Facts } from './load-facts.ts'
import type { LoadGroup } from './load-people.ts'
import { checkPlansOf, listenToStatements, type PlanCheck, type Statement } from './load-plans.ts'
import { askOnce, gatherCrowd } from './load-readers.ts'
import { EXPORTS, VISITS } from './load-visits.ts'

/** What readers ask for, an invitation that stays open among it. */
export async function prepareFacts(groups: readonly LoadGroup[]): Promise<Facts> {
  const token = newToken()
  await change(
    `INSERT INTO invitations (group_id, inviter_id, email, name, roles, token_hash, expires_at) VALUES ($group, $inviter, 'asked@load.test', 'Asked', '{referee}', $hash, now() + interval '1 day')`,
    { group: groups[0]!.id, inviter: groups[0]!.lead.id, hash: tokenHash(token) },
  )
  return gatherFacts(token)
}

/**
 * Asks everything once of an application in this process, with an ear at the driver, and looks at the plan of every statement that
 * was sent. Answers how many different ones there were and what is wrong with them or with the answers.
 */
export async function checkPlans(facts: Facts, groups: readonly LoadGroup[], { readers, deep, roll, evenSmall = false }: Reading): Promise<PlanCheck> {
  const { createApp } = await import('../app.ts')
  const server = createServer(createApp()).listen(0, '127.0.0.1')
  await once(server, 'listening')
  const ear = listenToStatements()
  try {
    const crowd = await gatherCrowd(`http://127.0.0.1:${(server.address() as AddressInfo).port}`, facts, groups, readers, deep)
    ear.heard()
    const sent: [string, Statement[]][] = []
    await askOnce(crowd, [...VISITS, ...EXPORTS], roll, ({ route, what }) => sent.push([`${route}, ${what},`, ear.heard()]))
    ear.stop()
    const { statements, faults } = await checkPlansOf(sent, { evenSmall })
    return { statements, faults: [...crowd.faults, ...faults] }
  } finally {
    ear.stop()
    server.close()
    server.closeAllConnections()
  }
}

export interface Reading {
  readers: number
  /** Rows before a list's deep page. */
  deep: number
  roll: Roll
  evenSmall?: boolean
}
