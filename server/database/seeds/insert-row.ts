import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';

/** Puts one row in and answers its id; objects go in as JSON. */
export async function insertRow(
  db: Sequelize,
  transaction: Transaction,
  table: string,
  row: Readonly<Record<string, unknown>>,
): Promise<number> {
  const columns = Object.keys(row);
  const replacements = Object.fromEntries(
    Object.entries(row).map(([column, value]) => [
      column,
      value !== null && typeof value === 'object' && !(value instanceof Date)
        ? JSON.stringify(value)
        : value,
    ]),
  );
  const [id] = await db.query(
    `INSERT INTO \`${table}\` (${columns.join(', ')}) VALUES (${columns.map((column) => `:${column}`).join(', ')})`,
    { replacements, transaction, type: QueryTypes.INSERT },
  );
  return Number(id);
}
