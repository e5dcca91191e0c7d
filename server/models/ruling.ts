import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { Decision } from '~/utils/contracts/production'

/** A supervisor's decision on one take. */
export class Ruling extends Model<InferAttributes<Ruling>, InferCreationAttributes<Ruling>> {
  declare id: string
  declare clientId: string
  declare takeId: string
  declare decision: Decision
  declare note: string
  declare personId: string
  declare createdAt: string
  declare reopenedAt: CreationOptional<string | null>
  declare reopenedBy: CreationOptional<string | null>
  declare reopenedReason: CreationOptional<string | null>
}

export function initRuling(sequelize: Sequelize): void {
  Ruling.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      takeId: { type: DataTypes.TEXT, allowNull: false },
      decision: { type: DataTypes.TEXT, allowNull: false },
      note: { type: DataTypes.TEXT, allowNull: false },
      personId: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      reopenedAt: { type: DataTypes.TEXT, allowNull: true },
      reopenedBy: { type: DataTypes.TEXT, allowNull: true },
      reopenedReason: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'rulings', modelName: 'Ruling' },
  )
}
