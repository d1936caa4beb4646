import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '@/models';

/** Rows of one SQL statement with numbered parameters. */
export function select<Row extends object>(
  sql: string,
  bind: unknown[] = [],
  transaction?: Transaction,
): Promise<Row[]> {
  return database().query<Row>(sql, { bind, transaction, type: QueryTypes.SELECT });
}
