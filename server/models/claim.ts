import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import type { Json } from '../audit/canonical.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { sequelize } from '../db.ts'

/** An assertion put to the register. What it asserts is decided by its kind (server/claim-kinds). */
export class Claim extends Model<InferAttributes<Claim>, InferCreationAttributes<Claim>> {
  declare id: CreationOptional<string>
  declare kind: string
  declare constantId: string
  /** For an order: the greater constant. */
  declare otherConstantId: string | null
  /** Given at the first submission, never changed. */
  declare ordinal: CreationOptional<number | null>
  declare groupId: string
  declare authorId: string
  declare state: CreationOptional<ClaimState>
  /** Grows with every change of content or state. */
  declare version: CreationOptional<number>
  /** Exact decimals; null for a claim without an enclosure of its own. */
  declare lo: string | null
  declare hi: string | null
  declare digitsTruncated: number | null
  declare digitsRounded: number | null
  declare runId: string | null
  /** What only its kind knows. */
  declare basis: { [key: string]: Json }
  declare source: string | null
  declare remark: string
  /** Text of the file to download. */
  declare certificate: string
  declare certificateDigest: string
  /** SHA-256 of what is asserted. */
  declare digest: string
  declare repeatedHere: boolean
  declare supersededBy: CreationOptional<string | null>
  declare signedBy: CreationOptional<string | null>
  declare signedAt: CreationOptional<Date | null>
  declare createdAt: CreationOptional<Date>
  declare submittedAt: CreationOptional<Date | null>
  declare since: CreationOptional<Date>
}

Claim.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    kind: { type: DataTypes.TEXT, allowNull: false },
    constantId: { type: DataTypes.UUID, allowNull: false },
    otherConstantId: DataTypes.UUID,
    ordinal: DataTypes.INTEGER,
    groupId: { type: DataTypes.UUID, allowNull: false },
    authorId: { type: DataTypes.UUID, allowNull: false },
    state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'draft' },
    version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    lo: DataTypes.DECIMAL,
    hi: DataTypes.DECIMAL,
    digitsTruncated: DataTypes.INTEGER,
    digitsRounded: DataTypes.INTEGER,
    runId: DataTypes.UUID,
    basis: { type: DataTypes.JSONB, allowNull: false, defaultValue: {} },
    source: DataTypes.TEXT,
    remark: { type: DataTypes.TEXT, allowNull: false, defaultValue: '' },
    certificate: { type: DataTypes.TEXT, allowNull: false },
    certificateDigest: { type: DataTypes.TEXT, allowNull: false },
    digest: { type: DataTypes.TEXT, allowNull: false },
    repeatedHere: { type: DataTypes.BOOLEAN, allowNull: false },
    supersededBy: DataTypes.UUID,
    signedBy: DataTypes.UUID,
    signedAt: DataTypes.DATE,
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    submittedAt: DataTypes.DATE,
    since: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'claims' },
)
