import { DataTypes } from 'sequelize'
import type { Model, ModelAttributeColumnOptions } from 'sequelize'

/**
 * A column that holds JSON text. Sequelize parses what SQLite calls JSON only, and a STRICT table knows no such type: it
 * is parsed here, once per row, when it is first asked for.
 */
export function jsonColumn(name: string, allowNull = false): ModelAttributeColumnOptions {
  return {
    type: DataTypes.JSON,
    allowNull,
    get(this: Model) {
      const values = this.dataValues as Record<string, unknown>
      const value = values[name]
      if (typeof value === 'string') values[name] = JSON.parse(value)
      return values[name]
    },
  }
}
