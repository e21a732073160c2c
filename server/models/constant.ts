import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { sequelize } from '../db.ts'

/** A number defined by a series or a sum over primes. Its definition never changes. */
export class Constant extends Model<InferAttributes<Constant>, InferCreationAttributes<Constant>> {
  declare id: CreationOptional<string>
  declare number: number
  declare definition: Definition
  /** SHA-256 of the canonical JSON of the definition. */
  declare definitionKey: string
  declare setKind: string
  declare k: number | null
  /** Excluded primes, comma separated. */
  declare exclude: string
  declare power: string | null
  declare logPower: string | null
  declare latex: string
  declare text: string
  declare aliases: string[]
  declare words: string
  declare groupId: string
  declare statedBy: string
  declare statedAt: CreationOptional<Date>
  /** Exact decimals: the intersection of all signed enclosures. */
  declare bestLo: CreationOptional<string | null>
  declare bestHi: CreationOptional<string | null>
  declare bestDigits: CreationOptional<number | null>
}

Constant.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    number: { type: DataTypes.INTEGER, allowNull: false },
    definition: { type: DataTypes.JSONB, allowNull: false },
    definitionKey: { type: DataTypes.TEXT, allowNull: false },
    setKind: { type: DataTypes.TEXT, allowNull: false },
    k: DataTypes.INTEGER,
    exclude: { type: DataTypes.TEXT, allowNull: false },
    power: DataTypes.TEXT,
    logPower: DataTypes.TEXT,
    latex: { type: DataTypes.TEXT, allowNull: false },
    text: { type: DataTypes.TEXT, allowNull: false },
    aliases: { type: DataTypes.ARRAY(DataTypes.TEXT), allowNull: false },
    words: { type: DataTypes.TEXT, allowNull: false },
    groupId: { type: DataTypes.UUID, allowNull: false },
    statedBy: { type: DataTypes.UUID, allowNull: false },
    statedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    bestLo: DataTypes.DECIMAL,
    bestHi: DataTypes.DECIMAL,
    bestDigits: DataTypes.INTEGER,
  },
  { sequelize, tableName: 'constants' },
)
