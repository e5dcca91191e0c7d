import { DataTypes, Model } from 'sequelize'
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'

/** One fact about the installation, such as whether it is a demo. */
export class Setting extends Model<InferAttributes<Setting>, InferCreationAttributes<Setting>> {
  declare key: string
  declare value: string
}

export function initSetting(sequelize: Sequelize): void {
  Setting.init(
    {
      key: { type: DataTypes.TEXT, primaryKey: true },
      value: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'settings', modelName: 'Setting' },
  )
}
