import type { Transaction } from 'sequelize'
import { seedPeople } from './demo-people.ts'

/** Fills an empty database with the demo: for people to try the product with, never for tests. */
export async function seedDemo(transaction: Transaction): Promise<void> {
  await seedPeople(transaction)
}
