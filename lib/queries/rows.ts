import { DataTypes, type Model, type ModelStatic } from 'sequelize';
import { canonicalDecimal } from '@/lib/design/decimal';

type AnyModel = ModelStatic<Model>;
export type RawRow = Readonly<Record<string, unknown>>;

/** What an attribute of a row becomes outside the tables: instants as ISO 8601 texts, doses as canonical decimals. */
export function plainValue(model: AnyModel, attribute: string, value: unknown): unknown {
  if (value === null || value === undefined) return null;
  const type = model.getAttributes()[attribute]?.type;
  if (value instanceof Date) return value.toISOString();
  if (type instanceof DataTypes.BOOLEAN) return value === true || value === 1;
  if (type instanceof DataTypes.DECIMAL) return canonicalDecimal(String(value));
  return value;
}

/** The select list of a model under an alias: `c.opened_at AS c__openedAt, …`, some attributes left out. */
export function columnsOf(model: AnyModel, alias: string, leaveOut: readonly string[] = []): string {
  return Object.entries(model.getAttributes())
    .filter(([attribute]) => !leaveOut.includes(attribute))
    .map(([attribute, { field }]) => `${alias}.${field ?? attribute} AS ${alias}__${attribute}`)
    .join(', ');
}

/** The plain object of a model's columns in a joined row, or null where an outer join found none. */
export function entityOf<T>(model: AnyModel, alias: string, row: RawRow, key = 'id'): T | null {
  if (row[`${alias}__${key}`] === null || row[`${alias}__${key}`] === undefined) return null;
  const entity: Record<string, unknown> = {};
  for (const attribute of Object.keys(model.getAttributes())) {
    const column = `${alias}__${attribute}`;
    if (column in row) entity[attribute] = plainValue(model, attribute, row[column]);
  }
  return entity as T;
}
