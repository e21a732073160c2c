import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import type { Role } from '../../shared/permissions.ts'
import { sequelize } from '../db.ts'

/** An invitation to a group. The mailed link holds the token; here is its hash only. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<string>
  declare groupId: string
  /** Null: made by the command line. */
  declare inviterId: string | null
  declare email: string
  declare name: string
  declare roles: Role[]
  declare tokenHash: string
  declare createdAt: CreationOptional<Date>
  declare expiresAt: Date
  declare acceptedAt: CreationOptional<Date | null>
  declare revokedAt: CreationOptional<Date | null>
  /** Who it became. */
  declare memberId: CreationOptional<string | null>
}

Invitation.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    groupId: { type: DataTypes.UUID, allowNull: false },
    inviterId: DataTypes.UUID,
    email: { type: DataTypes.TEXT, allowNull: false },
    name: { type: DataTypes.TEXT, allowNull: false },
    roles: { type: DataTypes.ARRAY(DataTypes.TEXT), allowNull: false },
    tokenHash: { type: DataTypes.TEXT, allowNull: false },
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    expiresAt: { type: DataTypes.DATE, allowNull: false },
    acceptedAt: DataTypes.DATE,
    revokedAt: DataTypes.DATE,
    memberId: DataTypes.UUID,
  },
  { sequelize, tableName: 'invitations' },
)
