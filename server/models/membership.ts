import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { Role } from '~/utils/permissions'

/** A person's role in a production. */
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare productionId: string
  declare personId: string
  declare role: Role
  declare version: CreationOptional<number>
  declare createdAt: string
}

export function initMembership(sequelize: Sequelize): void {
  Membership.init(
    {
      productionId: { type: DataTypes.TEXT, primaryKey: true },
      personId: { type: DataTypes.TEXT, primaryKey: true },
      role: { type: DataTypes.TEXT, allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'memberships', modelName: 'Membership' },
  )
}
