import { describe, expect, it } from 'vitest';
import { QueryTypes, type Model, type ModelAttributeColumnOptions, type ModelStatic } from 'sequelize';
import { database } from '@/db/connection';
import { models } from '@/db/models/define-models';

interface Column {
  readonly type: string;
  readonly allowNull: boolean;
  readonly primaryKey: boolean;
  readonly autoIncrement: boolean;
}

/** MariaDB's word for a model's type: it prints display widths, keeps JSON as LONGTEXT and BOOLEAN as TINYINT(1). */
function storedType(type: string): string {
  return type
    .replace(/^(?!TINYINT\(1\)$)(\w*INT)\(\d+\)/, '$1')
    .replace(/^JSON$/, 'LONGTEXT')
    .replace(/^INTEGER/, 'INT')
    .replace(/^CHAR\((\d+)\).*/, 'CHAR($1)')
    .replace(/ PRECISION$/, '');
}

function modelColumns(
  attributes: Readonly<Record<string, ModelAttributeColumnOptions>>,
): Map<string, Column> {
  return new Map(
    Object.entries(attributes).map(([name, { field, type, allowNull, primaryKey, autoIncrement }]) => [
      field ?? name,
      {
        type: storedType((type as { toSql: () => string }).toSql()),
        allowNull: allowNull ?? true,
        primaryKey: primaryKey ?? false,
        autoIncrement: autoIncrement ?? false,
      },
    ]),
  );
}

async function tableColumns(table: string): Promise<Map<string, Column>> {
  const described = await database().getQueryInterface().describeTable(table);
  return new Map(
    Object.entries(described).map(([name, { type, allowNull, primaryKey, autoIncrement }]) => [
      name,
      { type: storedType(type), allowNull, primaryKey, autoIncrement },
    ]),
  );
}

type AnyModel = ModelStatic<Model>;
const cases: readonly (readonly [string, AnyModel])[] = models.map((model) => [model.name, model]);

/** A model's table; models know it once the database is open. */
function tableOf(model: AnyModel): string {
  database();
  return model.getTableName() as string;
}

describe('models', () => {
  it.each(cases)('the model %s has exactly the columns of the migrated table', async (_name, model) => {
    const table = await tableColumns(tableOf(model));
    expect(modelColumns(model.getAttributes())).toEqual(table);
  });

  it('every table has a model, except the two that are loaded in bulk and the record of migrations', async () => {
    const rows = await database().query<{ name: string }>(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE()',
      { type: QueryTypes.SELECT },
    );
    const withoutModel = new Set(['measurements', 'calibrated_magnitudes', 'migrations']);
    const tables = rows.map(({ name }) => name).filter((name) => !withoutModel.has(name));
    expect(cases.map(([, model]) => tableOf(model)).toSorted()).toEqual(tables.toSorted());
  });

  it.each(cases)('the associations of %s are the foreign keys of its table', async (_name, model) => {
    const keys = await database().query<{ column: string; parent: string }>(
      `SELECT column_name AS \`column\`, referenced_table_name AS parent
           FROM information_schema.key_column_usage
          WHERE table_schema = DATABASE() AND table_name = :table AND referenced_table_name IS NOT NULL`,
      { type: QueryTypes.SELECT, replacements: { table: tableOf(model) } },
    );
    const attributes: Readonly<Record<string, ModelAttributeColumnOptions>> = model.getAttributes();
    const associated = Object.values(model.associations).map(({ foreignKey, target }) => ({
      column: attributes[foreignKey]?.field,
      parent: target.getTableName(),
    }));
    const order = (a: { column?: string | undefined }, b: { column?: string | undefined }) =>
      (a.column ?? '').localeCompare(b.column ?? '');
    expect(associated.toSorted(order)).toEqual([...keys].toSorted(order));
  });
});
