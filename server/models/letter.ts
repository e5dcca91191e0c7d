import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { LetterKind, LetterState } from '~/utils/contracts/letter'

/** A letter sent or still owed. */
export class Letter extends Model<InferAttributes<Letter>, InferCreationAttributes<Letter>> {
  declare id: string
  declare kind: LetterKind
  declare rulingId: CreationOptional<string | null>
  declare linkId: CreationOptional<string | null>
  declare personId: CreationOptional<string | null>
  declare toAddress: string
  declare toName: string
  declare messageId: string
  declare threadMessageId: CreationOptional<string | null>
  declare subject: string
  declare text: string
  declare html: string
  declare sealedLink: CreationOptional<string | null>
  declare state: CreationOptional<LetterState>
  declare attempts: CreationOptional<number>
  declare nextAt: CreationOptional<string | null>
  declare leaseUntil: CreationOptional<string | null>
  declare leaseBy: CreationOptional<string | null>
  declare lastError: CreationOptional<string | null>
  declare sentAt: CreationOptional<string | null>
  declare createdAt: string
}

export function initLetter(sequelize: Sequelize): void {
  Letter.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      kind: { type: DataTypes.TEXT, allowNull: false },
      rulingId: { type: DataTypes.TEXT, allowNull: true },
      linkId: { type: DataTypes.TEXT, allowNull: true },
      personId: { type: DataTypes.TEXT, allowNull: true },
      toAddress: { type: DataTypes.TEXT, allowNull: false },
      toName: { type: DataTypes.TEXT, allowNull: false },
      messageId: { type: DataTypes.TEXT, allowNull: false },
      threadMessageId: { type: DataTypes.TEXT, allowNull: true },
      subject: { type: DataTypes.TEXT, allowNull: false },
      text: { type: DataTypes.TEXT, allowNull: false },
      html: { type: DataTypes.TEXT, allowNull: false },
      sealedLink: { type: DataTypes.TEXT, allowNull: true },
      state: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'waiting' },
      attempts: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      nextAt: { type: DataTypes.TEXT, allowNull: true },
      leaseUntil: { type: DataTypes.TEXT, allowNull: true },
      leaseBy: { type: DataTypes.TEXT, allowNull: true },
      lastError: { type: DataTypes.TEXT, allowNull: true },
      sentAt: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
    },
    { sequelize, tableName: 'letters', modelName: 'Letter' },
  )
}
