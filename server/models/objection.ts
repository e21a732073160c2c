import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import { sequelize } from '../db.ts'

/** A referee's stated reason why a claim does not stand; what is said about it are its messages. */
export class Objection extends Model<InferAttributes<Objection>, InferCreationAttributes<Objection>> {
  declare id: CreationOptional<string>
  declare claimId: string
  declare assignmentId: string
  declare state: CreationOptional<'open' | 'answered' | 'settled' | 'upheld'>
  declare raisedAt: CreationOptional<Date>
  declare since: CreationOptional<Date>
}

Objection.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    claimId: { type: DataTypes.UUID, allowNull: false },
    assignmentId: { type: DataTypes.UUID, allowNull: false },
    state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'open' },
    raisedAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    since: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'objections' },
)

export class ObjectionMessage extends Model<InferAttributes<ObjectionMessage>, InferCreationAttributes<ObjectionMessage>> {
  declare id: CreationOptional<string>
  declare objectionId: string
  declare authorId: string
  declare text: string
  declare at: CreationOptional<Date>
}

ObjectionMessage.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    objectionId: { type: DataTypes.UUID, allowNull: false },
    authorId: { type: DataTypes.UUID, allowNull: false },
    text: { type: DataTypes.TEXT, allowNull: false },
    at: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'objection_messages' },
)
