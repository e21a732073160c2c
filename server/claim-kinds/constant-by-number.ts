import type { Transaction } from 'sequelize'
import { parseConstantNumber } from '../../shared/constant-number.ts'
import { invalidField } from '../errors.ts'
import { Constant } from '../models/constant.ts'

/** The constant that an author names in this field. */
export async function constantByNumber(transaction: Transaction, field: string, text: string): Promise<Constant> {
  const number = parseConstantNumber(text)
  const constant = number === null ? null : await Constant.findOne({ where: { number }, transaction })
  if (!constant) throw invalidField(field, 'there is no such constant')
  return constant
}
