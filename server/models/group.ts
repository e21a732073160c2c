import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import { sequelize } from '../db.ts'

/** A research group and its rules. */
export class Group extends Model<InferAttributes<Group>, InferCreationAttributes<Group>> {
  declare id: CreationOptional<string>
  declare name: string
  declare confirmationsNeeded: CreationOptional<number>
  declare recheckNeeded: CreationOptional<boolean>
  declare reminderDays: CreationOptional<number>
  declare public: CreationOptional<boolean>
  declare createdAt: CreationOptional<Date>
}

Group.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    name: { type: DataTypes.TEXT, allowNull: false },
    confirmationsNeeded: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    recheckNeeded: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: true },
    reminderDays: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 7 },
    public: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: true },
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'groups' },
)
