import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import { sequelize } from '../db.ts'

/** A file in support of a claim. `content` is large: ask for the attributes that are needed. */
export class Evidence extends Model<InferAttributes<Evidence>, InferCreationAttributes<Evidence>> {
  declare id: CreationOptional<string>
  declare claimId: string
  declare name: string
  /** Told from the content. */
  declare mediaType: string
  declare bytes: number
  /** SHA-256 of the content. */
  declare digest: string
  declare content: Buffer
  declare uploadedBy: string
  declare uploadedAt: CreationOptional<Date>
}

Evidence.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    claimId: { type: DataTypes.UUID, allowNull: false },
    name: { type: DataTypes.TEXT, allowNull: false },
    mediaType: { type: DataTypes.TEXT, allowNull: false },
    bytes: { type: DataTypes.INTEGER, allowNull: false },
    digest: { type: DataTypes.TEXT, allowNull: false },
    content: { type: DataTypes.BLOB, allowNull: false },
    uploadedBy: { type: DataTypes.UUID, allowNull: false },
    uploadedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'evidence' },
)
