import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { FindingName } from '~/utils/contracts/take'
import { jsonColumn } from './json'

/** What a supervisor says about frames of a take. */
export class Flag extends Model<InferAttributes<Flag>, InferCreationAttributes<Flag>> {
  declare id: string
  declare clientId: string
  declare takeId: string
  declare fromFrame: number
  declare toFrame: number
  declare reason: string
  declare finding: CreationOptional<FindingName | null>
  declare personId: string
  declare createdAt: string
  declare liftedAt: CreationOptional<string | null>
  declare liftedBy: CreationOptional<string | null>
}

export function initFlag(sequelize: Sequelize): void {
  Flag.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      takeId: { type: DataTypes.TEXT, allowNull: false },
      fromFrame: { type: DataTypes.INTEGER, allowNull: false },
      toFrame: { type: DataTypes.INTEGER, allowNull: false },
      reason: { type: DataTypes.TEXT, allowNull: false },
      finding: jsonColumn('finding', true),
      personId: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      liftedAt: { type: DataTypes.TEXT, allowNull: true },
      liftedBy: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'flags', modelName: 'Flag' },
  )
}
