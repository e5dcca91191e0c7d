import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { Claim } from '~/utils/contracts/production'
import { jsonColumn } from './json'

/** A shot and what it claims. */
export class Shot extends Model<InferAttributes<Shot>, InferCreationAttributes<Shot>> {
  declare id: string
  declare clientId: string
  declare productionId: string
  declare sequenceId: string
  declare code: string
  declare title: string
  declare firstFrame: number
  declare lastFrame: number
  declare fps: number
  declare brief: string
  declare position: number
  declare dueOn: CreationOptional<string | null>
  declare animatorId: CreationOptional<string | null>
  declare supervisorId: CreationOptional<string | null>
  declare claim: CreationOptional<Claim | null>
  declare version: CreationOptional<number>
  declare createdBy: CreationOptional<string | null>
  declare createdAt: string
}

export function initShot(sequelize: Sequelize): void {
  Shot.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      productionId: { type: DataTypes.TEXT, allowNull: false },
      sequenceId: { type: DataTypes.TEXT, allowNull: false },
      code: { type: DataTypes.TEXT, allowNull: false },
      title: { type: DataTypes.TEXT, allowNull: false },
      firstFrame: { type: DataTypes.INTEGER, allowNull: false },
      lastFrame: { type: DataTypes.INTEGER, allowNull: false },
      fps: { type: DataTypes.REAL, allowNull: false },
      brief: { type: DataTypes.TEXT, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
      dueOn: { type: DataTypes.TEXT, allowNull: true },
      animatorId: { type: DataTypes.TEXT, allowNull: true },
      supervisorId: { type: DataTypes.TEXT, allowNull: true },
      claim: jsonColumn('claim', true),
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdBy: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'shots', modelName: 'Shot' },
  )
}
