import { QueryTypes } from 'sequelize';
import type { Sequelize } from 'sequelize';

/** Puts one row in and answers its id (0 where the table has none of its own making). */
export async function insert(
  db: Sequelize,
  table: string,
  row: Readonly<Record<string, unknown>>,
): Promise<number> {
  const columns = Object.keys(row);
  const [id] = await db.query(
    `INSERT INTO \`${table}\` (${columns.join(', ')}) VALUES (${columns.map((name) => `:${name}`).join(', ')})`,
    { replacements: { ...row }, type: QueryTypes.INSERT },
  );
  return Number(id);
}
