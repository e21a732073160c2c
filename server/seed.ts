import { seedDemo } from '../seeders/demo.ts'
import { inTransaction, selectOne } from './db.ts'

/** Seeds the demo group if there is no group at all; answers whether it did. */
export async function seedIfEmpty(): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const some = await selectOne('SELECT 1 AS found FROM groups LIMIT 1', {}, transaction)
    if (some) return false
    await seedDemo(transaction)
    return true
  })
}
