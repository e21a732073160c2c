import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import { sequelize } from '../db.ts'

/** A member's sign-in from one browser. The cookie names it; it stands while it is not ended and not expired. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: CreationOptional<string>
  declare memberId: string
  declare createdAt: CreationOptional<Date>
  declare lastSeenAt: CreationOptional<Date>
  declare expiresAt: Date
  declare endedAt: CreationOptional<Date | null>
  declare address: string
  declare userAgent: string
}

Session.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    memberId: { type: DataTypes.UUID, allowNull: false },
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    lastSeenAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    expiresAt: { type: DataTypes.DATE, allowNull: false },
    endedAt: DataTypes.DATE,
    address: { type: DataTypes.TEXT, allowNull: false },
    userAgent: { type: DataTypes.TEXT, allowNull: false },
  },
  { sequelize, tableName: 'sessions' },
)
