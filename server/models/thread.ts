import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'

/** A conversation pinned to a take, a frame or a run of frames. */
export class Thread extends Model<InferAttributes<Thread>, InferCreationAttributes<Thread>> {
  declare id: string
  declare clientId: string
  declare shotId: string
  declare takeId: CreationOptional<string | null>
  declare fromFrame: CreationOptional<number | null>
  declare toFrame: CreationOptional<number | null>
  declare personId: string
  declare createdAt: string
  declare settledAt: CreationOptional<string | null>
  declare settledBy: CreationOptional<string | null>
}

export function initThread(sequelize: Sequelize): void {
  Thread.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      shotId: { type: DataTypes.TEXT, allowNull: false },
      takeId: { type: DataTypes.TEXT, allowNull: true },
      fromFrame: { type: DataTypes.INTEGER, allowNull: true },
      toFrame: { type: DataTypes.INTEGER, allowNull: true },
      personId: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      settledAt: { type: DataTypes.TEXT, allowNull: true },
      settledBy: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'threads', modelName: 'Thread' },
  )
}
