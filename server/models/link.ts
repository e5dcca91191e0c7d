import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { Role } from '~/utils/permissions'

/** A one-use link: an invitation or a forgotten password. Only a hash of its secret is kept. */
export class Link extends Model<InferAttributes<Link>, InferCreationAttributes<Link>> {
  declare id: string
  declare kind: 'invitation' | 'reset'
  declare tokenHash: string
  declare email: string
  declare name: string
  declare keeper: CreationOptional<boolean>
  declare productionId: CreationOptional<string | null>
  declare role: CreationOptional<Role | null>
  declare personId: CreationOptional<string | null>
  declare madeBy: CreationOptional<string | null>
  declare createdAt: string
  declare expiresAt: string
  declare usedAt: CreationOptional<string | null>
}

export function initLink(sequelize: Sequelize): void {
  Link.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      kind: { type: DataTypes.TEXT, allowNull: false },
      tokenHash: { type: DataTypes.TEXT, allowNull: false },
      email: { type: DataTypes.TEXT, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      keeper: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      productionId: { type: DataTypes.TEXT, allowNull: true },
      role: { type: DataTypes.TEXT, allowNull: true },
      personId: { type: DataTypes.TEXT, allowNull: true },
      madeBy: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      expiresAt: { type: DataTypes.TEXT, allowNull: false },
      usedAt: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'links', modelName: 'Link' },
  )
}
