import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'

/** One film or series with its own members. */
export class Production extends Model<InferAttributes<Production>, InferCreationAttributes<Production>> {
  declare id: string
  declare slug: string
  declare title: string
  declare eventNumber: CreationOptional<number>
  declare createdAt: string
}

export function initProduction(sequelize: Sequelize): void {
  Production.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      slug: { type: DataTypes.TEXT, allowNull: false },
      title: { type: DataTypes.TEXT, allowNull: false },
      eventNumber: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'productions', modelName: 'Production' },
  )
}
