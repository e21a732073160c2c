import type { Transaction } from 'sequelize'
import type { Run } from '../models/run.ts'

/** Told of every run that is done, failed or stopped, within the transaction that makes it so: what it throws undoes that. */
export type RunFinishedHook = (transaction: Transaction, run: Run) => Promise<void>

/** Those who are told, in order. Modules that care add themselves when they are loaded, in the web process and in the worker. */
export const onRunFinished: RunFinishedHook[] = []

export async function tellRunFinished(transaction: Transaction, run: Run): Promise<void> {
  for (const hook of onRunFinished) await hook(transaction, run)
}
