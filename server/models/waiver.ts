import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { FindingName } from '~/utils/contracts/take'
import { jsonColumn } from './json'

/** A finding that a supervisor lets pass, with the reason. */
export class Waiver extends Model<InferAttributes<Waiver>, InferCreationAttributes<Waiver>> {
  declare id: string
  declare clientId: string
  declare takeId: string
  declare finding: FindingName
  declare reason: string
  declare personId: string
  declare createdAt: string
  declare liftedAt: CreationOptional<string | null>
  declare liftedBy: CreationOptional<string | null>
}

export function initWaiver(sequelize: Sequelize): void {
  Waiver.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      takeId: { type: DataTypes.TEXT, allowNull: false },
      finding: jsonColumn('finding'),
      reason: { type: DataTypes.TEXT, allowNull: false },
      personId: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      liftedAt: { type: DataTypes.TEXT, allowNull: true },
      liftedBy: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'waivers', modelName: 'Waiver' },
  )
}
