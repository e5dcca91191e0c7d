import { DataTypes, Model } from 'sequelize'
import type { InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'

/** One thing said in a thread; its event number puts it in order. */
export class Comment extends Model<InferAttributes<Comment>, InferCreationAttributes<Comment>> {
  declare id: string
  declare clientId: string
  declare threadId: string
  declare eventNumber: number
  declare body: string
  declare personId: string
  declare createdAt: string
}

export function initComment(sequelize: Sequelize): void {
  Comment.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      threadId: { type: DataTypes.TEXT, allowNull: false },
      eventNumber: { type: DataTypes.INTEGER, allowNull: false },
      body: { type: DataTypes.TEXT, allowNull: false },
      personId: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'comments', modelName: 'Comment' },
  )
}
