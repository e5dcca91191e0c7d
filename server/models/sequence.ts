import { DataTypes, Model } from 'sequelize'
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'

/** A run of shots in story order. */
export class Sequence extends Model<InferAttributes<Sequence>, InferCreationAttributes<Sequence>> {
  declare id: string
  declare productionId: string
  declare code: string
  declare title: string
  declare position: number
}

export function initSequence(sequelize: Sequelize): void {
  Sequence.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      productionId: { type: DataTypes.TEXT, allowNull: false },
      code: { type: DataTypes.TEXT, allowNull: false },
      title: { type: DataTypes.TEXT, allowNull: false },
      position: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, tableName: 'sequences', modelName: 'Sequence' },
  )
}
