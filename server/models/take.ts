import { DataTypes, Model } from 'sequelize'
import type { CreationOptional, InferAttributes, InferCreationAttributes, Sequelize } from 'sequelize'
import type { Claim } from '~/utils/contracts/production'
import type { TakeSketch } from '~/utils/contracts/take'
import type { CheckResult, Key, PointKey } from '~/utils/motion/types'
import { jsonColumn } from './json'

/** A numbered, immutable posting of a spacing list, with the answer that the judge gave it. */
export class Take extends Model<InferAttributes<Take>, InferCreationAttributes<Take>> {
  declare id: string
  declare clientId: string
  declare shotId: string
  declare number: number
  declare keys: Key[] | PointKey[]
  declare unit: string
  declare slop: number
  declare tolerance: number
  declare fps: number
  declare claim: Claim
  declare note: string
  declare personId: string
  declare createdAt: string
  declare withdrawnAt: CreationOptional<string | null>
  declare answer: CheckResult
  declare verdict: CheckResult['verdict']
  declare judgeVersion: string
  declare sketch: TakeSketch
}

export function initTake(sequelize: Sequelize): void {
  Take.init(
    {
      id: { type: DataTypes.TEXT, primaryKey: true },
      clientId: { type: DataTypes.TEXT, allowNull: false },
      shotId: { type: DataTypes.TEXT, allowNull: false },
      number: { type: DataTypes.INTEGER, allowNull: false },
      keys: jsonColumn('keys'),
      unit: { type: DataTypes.TEXT, allowNull: false },
      slop: { type: DataTypes.REAL, allowNull: false },
      tolerance: { type: DataTypes.REAL, allowNull: false },
      fps: { type: DataTypes.REAL, allowNull: false },
      claim: jsonColumn('claim'),
      note: { type: DataTypes.TEXT, allowNull: false },
      personId: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.TEXT, allowNull: false },
      withdrawnAt: { type: DataTypes.TEXT, allowNull: true },
      answer: jsonColumn('answer'),
      verdict: { type: DataTypes.TEXT, allowNull: false },
      judgeVersion: { type: DataTypes.TEXT, allowNull: false },
      sketch: jsonColumn('sketch'),
    },
    { sequelize, tableName: 'takes', modelName: 'Take' },
  )
}
