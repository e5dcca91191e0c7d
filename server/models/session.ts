import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'

/** A signed-in browser. The cookie carries a random token; only its hash is kept. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string
  declare tokenHash: string
  declare personId: string
  declare device: string
  declare address: string
  declare createdAt: string
  declare seenAt: string
  declare endedAt: CreationOptional<string | null>
}

export function initSession(sequelize: Sequelize): void {
  Session.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      tokenHash: { type: DataTypes.TEXT, allowNull: false },
      personId: { type: DataTypes.TEXT, allowNull: false },
      device: { type: DataTypes.TEXT, allowNull: false },
      address: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      seenAt: { type: DataTypes.TEXT, allowNull: false },
      endedAt: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'sessions', modelName: 'Session' },
  )
}
