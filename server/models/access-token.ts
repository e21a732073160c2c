import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import type { TokenScope } from '../../shared/schemas/session.ts'
import { sequelize } from '../db.ts'

/** A personal access token, for programs. It is shown once; here is its hash only. */
export class AccessToken extends Model<InferAttributes<AccessToken>, InferCreationAttributes<AccessToken>> {
  declare id: CreationOptional<string>
  declare memberId: string
  declare name: string
  declare tokenHash: string
  declare scopes: TokenScope[]
  declare createdAt: CreationOptional<Date>
  declare expiresAt: Date
  declare lastUsedAt: CreationOptional<Date | null>
  declare revokedAt: CreationOptional<Date | null>
}

AccessToken.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    memberId: { type: DataTypes.UUID, allowNull: false },
    name: { type: DataTypes.TEXT, allowNull: false },
    tokenHash: { type: DataTypes.TEXT, allowNull: false },
    scopes: { type: DataTypes.ARRAY(DataTypes.TEXT), allowNull: false },
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    expiresAt: { type: DataTypes.DATE, allowNull: false },
    lastUsedAt: DataTypes.DATE,
    revokedAt: DataTypes.DATE,
  },
  { sequelize, tableName: 'access_tokens' },
)
