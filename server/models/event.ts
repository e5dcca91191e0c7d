import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { EventKind } from '~/utils/contracts/event'

/** One numbered change of a production. */
export class Event extends Model<InferAttributes<Event>, InferCreationAttributes<Event>> {
  declare productionId: string
  declare n: number
  declare kind: EventKind
  declare shotId: CreationOptional<string | null>
  declare personId: CreationOptional<string | null>
  declare takeNumber: CreationOptional<number | null>
  declare commentId: CreationOptional<string | null>
  declare createdAt: string
}

export function initEvent(sequelize: Sequelize): void {
  Event.init(
    {
      productionId: { type: DataTypes.TEXT, primaryKey: true },
      n: { type: DataTypes.INTEGER, primaryKey: true },
      kind: { type: DataTypes.TEXT, allowNull: false },
      shotId: { type: DataTypes.TEXT, allowNull: true },
      personId: { type: DataTypes.TEXT, allowNull: true },
      takeNumber: { type: DataTypes.INTEGER, allowNull: true },
      commentId: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'events', modelName: 'Event' },
  )
}
