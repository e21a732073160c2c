import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes } from 'sequelize'
import type { ArithmeticName, Method, Outcome } from '../../shared/engine/methods/computation.ts'
import type { Goal } from '../../shared/engine/methods/goal.ts'
import type { Run as RunView } from '../../shared/schemas/run.ts'
import { sequelize } from '../db.ts'

/** A computation of the engine, in the words of the table: see the migration for what fences it. */
export class Run extends Model<InferAttributes<Run>, InferCreationAttributes<Run>> {
  declare id: CreationOptional<string>
  declare constantId: string
  declare groupId: string
  declare startedBy: string
  declare purpose: CreationOptional<RunView['purpose']>
  declare claimId: CreationOptional<string | null>
  declare method: Method
  declare arithmetic: ArithmeticName
  /** JSON of the engine's request. */
  declare request: string
  declare requestKey: string
  declare goal: Goal
  /** JSON of the parameters that the engine completed; the shards belong to these. */
  declare parameters: CreationOptional<string | null>
  declare engineDigest: CreationOptional<string | null>
  declare state: CreationOptional<RunView['state']>
  declare attempt: CreationOptional<number>
  declare losses: CreationOptional<number>
  declare leaseUntil: CreationOptional<Date | null>
  declare progress: CreationOptional<string>
  declare shardsDone: CreationOptional<number>
  declare shardsTotal: CreationOptional<number | null>
  declare interimLo: CreationOptional<string | null>
  declare interimHi: CreationOptional<string | null>
  declare cpuMs: CreationOptional<string>
  declare secondsLeft: CreationOptional<string | null>
  declare forecastSeconds: CreationOptional<string | null>
  declare outcome: CreationOptional<Outcome | null>
  /** The certificate's canonical JSON, unsigned. */
  declare certificate: CreationOptional<string | null>
  declare certificateDigest: CreationOptional<string | null>
  declare estimates: CreationOptional<string[]>
  declare failure: CreationOptional<string | null>
  declare createdAt: CreationOptional<Date>
  declare startedAt: CreationOptional<Date | null>
  declare finishedAt: CreationOptional<Date | null>
}

Run.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    constantId: { type: DataTypes.UUID, allowNull: false },
    groupId: { type: DataTypes.UUID, allowNull: false },
    startedBy: { type: DataTypes.UUID, allowNull: false },
    purpose: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'run' },
    claimId: DataTypes.UUID,
    method: { type: DataTypes.TEXT, allowNull: false },
    arithmetic: { type: DataTypes.TEXT, allowNull: false },
    request: { type: DataTypes.TEXT, allowNull: false },
    requestKey: { type: DataTypes.TEXT, allowNull: false },
    goal: { type: DataTypes.JSONB, allowNull: false },
    parameters: DataTypes.TEXT,
    engineDigest: DataTypes.TEXT,
    state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'queued' },
    attempt: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    losses: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    leaseUntil: DataTypes.DATE,
    progress: { type: DataTypes.DECIMAL(7, 6), allowNull: false, defaultValue: '0' },
    shardsDone: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    shardsTotal: DataTypes.INTEGER,
    interimLo: DataTypes.TEXT,
    interimHi: DataTypes.TEXT,
    cpuMs: { type: DataTypes.BIGINT, allowNull: false, defaultValue: '0' },
    secondsLeft: DataTypes.DECIMAL,
    forecastSeconds: DataTypes.DECIMAL,
    outcome: DataTypes.JSONB,
    certificate: DataTypes.TEXT,
    certificateDigest: DataTypes.TEXT,
    estimates: { type: DataTypes.ARRAY(DataTypes.TEXT), allowNull: false, defaultValue: [] },
    failure: DataTypes.TEXT,
    createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    startedAt: DataTypes.DATE,
    finishedAt: DataTypes.DATE,
  },
  { sequelize, tableName: 'runs' },
)
