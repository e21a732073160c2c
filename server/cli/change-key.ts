import { connectToLocalDatabase } from './local-database.ts'

/** `change-key`: takes a new signing key into use; signatures made with earlier keys stay verifiable. */
const leave = await connectToLocalDatabase()
const { recordAudit } = await import('../audit/record.ts')
const { inTransaction, sequelize } = await import('../db.ts')
const { changeKey, publicKeys } = await import('../keys.ts')

const before = publicKeys()[0]?.id ?? null
const id = changeKey()
await inTransaction((transaction) =>
  recordAudit(transaction, { act: 'key.change', actorId: null, groupId: null, subject: { kind: 'key', id }, detail: { from: before, to: id } }),
)
console.log(`New signatures are made with key ${id}.`)
await sequelize.close()
await leave()
