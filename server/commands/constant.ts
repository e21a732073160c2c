import type { Transaction } from 'sequelize'
import { constantNumberText } from '../../shared/constant-number.ts'
import { recordAudit } from '../audit/record.ts'
import { selectOne } from '../db.ts'
import type { ReadDefinition } from '../engine/definition.ts'
import { Constant } from '../models/constant.ts'
import { fold } from '../queries/constant-text.ts'
import { refreshBest } from './constant-best.ts'

/** Key of the advisory lock that orders those who state constants. Any constant does, as long as nothing else uses it. */
const NUMBER_LOCK = 4_207_003

/** Words by which a set is searched for, beside those of its reading. */
const SET_WORDS: Record<ReadDefinition['filters']['setKind'], string> = {
  primes: 'primes',
  'almost-primes': 'almost primes',
  'squarefree-almost-primes': 'squarefree almost primes',
  'distinct-prime-factors': 'distinct prime factors',
  integers: 'all integers',
  squarefree: 'squarefree',
  smooth: 'smooth integers',
  'residue-class': 'primes residue class modulo',
  finite: 'finite list',
  'over-primes': 'euler product primes',
  named: 'named',
}

/** What a constant's row says of its definition. */
export function columnsOf(number: number, { definition, key, view, filters }: ReadDefinition) {
  return {
    number,
    definition,
    definitionKey: key,
    ...filters,
    latex: view.latex,
    text: view.text,
    aliases: view.aliases,
    words: fold([constantNumberText(number), SET_WORDS[filters.setKind], view.text, ...view.aliases].join(' ')),
  }
}

/**
 * The constant of a definition: the one that exists, or a new one with the next register number. Whoever states a new one holds
 * the lock until the end of their transaction, so that numbers have no gaps and one definition never gets two.
 */
export async function stateConstant(
  transaction: Transaction,
  member: { id: string; groupId: string },
  read: ReadDefinition,
): Promise<{ constant: Constant; created: boolean }> {
  const known = await Constant.findOne({ where: { definitionKey: read.key }, transaction })
  if (known) return { constant: known, created: false }

  await selectOne('SELECT pg_advisory_xact_lock($lock)', { lock: NUMBER_LOCK }, transaction)
  const quicker = await Constant.findOne({ where: { definitionKey: read.key }, transaction })
  if (quicker) return { constant: quicker, created: false }

  const last = await selectOne<{ number: number }>('SELECT coalesce(max(number), 0) AS number FROM constants', {}, transaction)
  const number = (last?.number ?? 0) + 1
  const constant = await Constant.create({ ...columnsOf(number, read), groupId: member.groupId, statedBy: member.id }, { transaction })
  await refreshBest(transaction, constant.id)
  await recordAudit(transaction, {
    act: 'constant.state',
    actorId: member.id,
    groupId: member.groupId,
    subject: { kind: 'constant', id: constant.id, label: constantNumberText(number) },
    digest: read.key,
  })
  return { constant, created: true }
}
