import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import { sequelize } from '../db.ts'

/** A member's part in the review of a claim, from being asked to the verdict. */
export class Assignment extends Model<InferAttributes<Assignment>, InferCreationAttributes<Assignment>> {
  declare id: CreationOptional<string>
  declare claimId: string
  declare refereeId: string
  declare askedBy: string
  declare note: CreationOptional<string>
  declare state: CreationOptional<'asked' | 'accepted' | 'declined'>
  declare declineReason: CreationOptional<string | null>
  declare verdict: CreationOptional<'confirmed' | 'objected' | null>
  /** Digest of the claim that the verdict is about. */
  declare verdictDigest: CreationOptional<string | null>
  declare remark: CreationOptional<string | null>
  declare checklist: CreationOptional<{ item: string; checked: boolean }[]>
  /** The verdict while it is being written; for nobody else's eyes. */
  declare draft: CreationOptional<string | null>
  declare askedAt: CreationOptional<Date>
  declare answeredAt: CreationOptional<Date | null>
  declare verdictAt: CreationOptional<Date | null>
  declare remindedAt: CreationOptional<Date | null>
}

Assignment.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    claimId: { type: DataTypes.UUID, allowNull: false },
    refereeId: { type: DataTypes.UUID, allowNull: false },
    askedBy: { type: DataTypes.UUID, allowNull: false },
    note: { type: DataTypes.TEXT, allowNull: false, defaultValue: '' },
    state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'asked' },
    declineReason: DataTypes.TEXT,
    verdict: DataTypes.TEXT,
    verdictDigest: DataTypes.TEXT,
    remark: DataTypes.TEXT,
    checklist: { type: DataTypes.JSONB, allowNull: false, defaultValue: [] },
    draft: DataTypes.TEXT,
    askedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    answeredAt: DataTypes.DATE,
    verdictAt: DataTypes.DATE,
    remindedAt: DataTypes.DATE,
  },
  { sequelize, tableName: 'assignments' },
)
