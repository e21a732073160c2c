import { createHash } from 'node:crypto'
import { isIPv6 } from 'node:net'
import type { Transaction } from 'sequelize'
import { change, inTransaction, selectOne } from '../db.ts'
import { tooMany } from '../errors.ts'

const WINDOW_MINUTES = 15
/** Failures in the window that are let pass: for one account from one address, for an account, for an address. */
const LIMITS = { pair: 10, account: 50, address: 300 }

const digest = (text: string): string => createHash('sha256').update(text).digest('hex')

/** An IPv6 network of 64 bits belongs to one customer, who can use any address in it. */
function network(address: string): string {
  const plain = address.replace(/^::ffff:(?=\d+\.)/, '')
  return isIPv6(plain) ? plain.split(':').slice(0, 4).join(':') : plain
}

/**
 * Counts an attempt at a password as failed before it is checked, or refuses it with 429 where there were too many. Counting first
 * means that a hundred attempts at once do not slip through together. Answers a function that takes the count back on success.
 */
export async function countAttempt(account: string, address: string): Promise<{ succeeded: () => Promise<void> }> {
  const keys = { pair: `pair:${digest(`${account} ${network(address)}`)}`, account: `account:${digest(account)}`, address: `address:${network(address)}` }
  const ids = await inTransaction(async (transaction) => {
    // Attempts at one account from one address are counted one after the other.
    await selectOne('SELECT pg_advisory_xact_lock(hashtextextended($key, 0))', { key: keys.pair }, transaction)
    for (const kind of ['pair', 'account', 'address'] as const) await refuseBeyond(LIMITS[kind], keys[kind], transaction)
    const rows = await change<{ id: string }>('INSERT INTO sign_in_failures (key) SELECT unnest($keys::text[]) RETURNING id', { keys: Object.values(keys) }, transaction)
    return rows.map(({ id }) => id)
  })
  return {
    succeeded: async () => {
      await change('DELETE FROM sign_in_failures WHERE key = $pair OR id = ANY($ids::bigint[])', { pair: keys.pair, ids })
    },
  }
}

async function refuseBeyond(limit: number, key: string, transaction: Transaction): Promise<void> {
  const seen = await selectOne<{ count: string; seconds: string }>(
    `SELECT count(*) AS count, extract(epoch FROM min(at) + make_interval(mins => $window) - now()) AS seconds
     FROM sign_in_failures WHERE key = $key AND at > now() - make_interval(mins => $window)`,
    { key, window: WINDOW_MINUTES },
    transaction,
  )
  if (Number(seen?.count) < limit) return
  throw tooMany(Number(seen?.seconds), `Too many wrong passwords. Wait ${Math.ceil(Number(seen?.seconds) / 60)} minutes, or have your password reset.`)
}

/** Clears failures that no longer count. */
export async function forgetOldFailures(): Promise<void> {
  await change('DELETE FROM sign_in_failures WHERE at < now() - make_interval(mins => $window)', { window: WINDOW_MINUTES })
}
