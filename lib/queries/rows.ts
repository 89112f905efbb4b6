import { DataTypes, type Model, type ModelStatic } from 'sequelize';
import { canonicalDecimal } from '@/lib/design/decimal';

type AnyModel = ModelStatic<Model>;
export type RawRow = Readonly<Record<string, unknown>>;

/** What an attribute of a row becomes outside the tables: instants as ISO 8601 texts, doses as canonical decimals. */
export function plainValue(model: AnyModel, attribute: string, value: unknown): unknown {
  if (value === null || value === undefined) return null;
  if (value instanceof Date) return value.toISOString();
  const type = model.getAttributes()[attribute]?.type;
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

/** Where each attribute of a model stands in a joined row, worked out once for a model and alias. */
const places = new WeakMap<
  AnyModel,
  Map<string, readonly (readonly [attribute: string, column: string])[]>
>();

function placesOf(model: AnyModel, alias: string): readonly (readonly [string, string])[] {
  let ofModel = places.get(model);
  if (ofModel === undefined) places.set(model, (ofModel = new Map()));
  let found = ofModel.get(alias);
  if (found === undefined) {
    found = Object.keys(model.getAttributes()).map((attribute) => [attribute, `${alias}__${attribute}`]);
    ofModel.set(alias, found);
  }
  return found;
}

/** The plain object of a model's columns in a joined row, or null where an outer join found none. */
export function entityOf<T>(model: AnyModel, alias: string, row: RawRow, key = 'id'): T | null {
  if (row[`${alias}__${key}`] === null || row[`${alias}__${key}`] === undefined) return null;
  const entity: Record<string, unknown> = {};
  for (const [attribute, column] of placesOf(model, alias)) {
    const value = row[column];
    if (value !== undefined) entity[attribute] = plainValue(model, attribute, value);
  }
  return entity as T;
}
