import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import type { Role } from '../../shared/permissions.ts'
import type { MailPreferences } from '../../shared/schemas/member.ts'
import { sequelize } from '../db.ts'

/** A person in a group. Who leaves keeps the row, since the name stands on what they signed. */
export class Member extends Model<InferAttributes<Member>, InferCreationAttributes<Member>> {
  declare id: CreationOptional<string>
  declare groupId: string
  /** In lower case; unique among active members. */
  declare email: string
  declare name: string
  declare passwordHash: string
  declare roles: Role[]
  declare state: CreationOptional<'active' | 'left'>
  /** What the person has set; a mail that is not named here is wanted. */
  declare mailPreferences: CreationOptional<Partial<MailPreferences>>
  declare mailBouncedAt: CreationOptional<Date | null>
  declare createdAt: CreationOptional<Date>
  declare leftAt: CreationOptional<Date | null>
}

Member.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    groupId: { type: DataTypes.UUID, allowNull: false },
    email: { type: DataTypes.TEXT, allowNull: false },
    name: { type: DataTypes.TEXT, allowNull: false },
    passwordHash: { type: DataTypes.TEXT, allowNull: false },
    roles: { type: DataTypes.ARRAY(DataTypes.TEXT), allowNull: false },
    state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'active' },
    mailPreferences: { type: DataTypes.JSONB, allowNull: false, defaultValue: {} },
    mailBouncedAt: DataTypes.DATE,
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    leftAt: DataTypes.DATE,
  },
  { sequelize, tableName: 'members' },
)
