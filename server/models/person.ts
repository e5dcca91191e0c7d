import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { MailWish } from '~/utils/contracts/people'

/** Somebody with an account, or invited to have one. */
export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: string
  declare email: string
  declare name: string
  declare passwordHash: CreationOptional<string | null>
  declare keeper: CreationOptional<boolean>
  declare mailWish: CreationOptional<MailWish>
  declare disabledAt: CreationOptional<string | null>
  declare version: CreationOptional<number>
  declare createdAt: string
}

export function initPerson(sequelize: Sequelize): void {
  Person.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      email: { type: DataTypes.TEXT, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      passwordHash: { type: DataTypes.TEXT, allowNull: true },
      keeper: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      mailWish: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'all' },
      disabledAt: { type: DataTypes.TEXT, allowNull: true },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'people', modelName: 'Person' },
  )
}
