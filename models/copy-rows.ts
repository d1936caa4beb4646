import type { Client, Connection, Submittable } from 'pg';
import type { Transaction } from 'sequelize';
import { database } from './index';

/** Signature, flags and length of an extension come before the first row. */
const SIGNATURE = Buffer.from('PGCOPY\n\xff\r\n\0', 'latin1');
const END = -1;

export type CopiedField = Buffer | null;

/** Splits one message of a binary copy into its rows, each a count of columns and then length and bytes of each. */
function takeRows(chunk: Buffer, start: number, onRow: (fields: CopiedField[]) => void): void {
  let at = start;
  while (at < chunk.length) {
    const columns = chunk.readInt16BE(at);
    at += 2;
    if (columns === END) return;
    const fields: CopiedField[] = [];
    for (let i = 0; i < columns; i++) {
      const length = chunk.readInt32BE(at);
      at += 4;
      fields.push(length < 0 ? null : chunk.subarray(at, at + length));
      at += Math.max(0, length);
    }
    onRow(fields);
  }
}

/** Where the rows begin in the first message. */
function headerLength(chunk: Buffer): number {
  if (!chunk.subarray(0, SIGNATURE.length).equals(SIGNATURE)) {
    throw new TypeError('the copy does not begin as a binary one does');
  }
  return SIGNATURE.length + 8 + chunk.readInt32BE(SIGNATURE.length + 4);
}

function copyFrom(
  client: Client,
  statement: string,
  onRow: (fields: CopiedField[]) => void,
): Promise<void> {
  return new Promise((resolve, reject) => {
    let isStarted = false;
    let failure: Error | null = null;
    const copy = {
      submit: (connection: Connection) => connection.query(statement),
      handleRowDescription: () => undefined,
      handleCopyData: ({ chunk }: { chunk: Buffer }) => {
        if (failure !== null) return;
        try {
          takeRows(chunk, isStarted ? 0 : headerLength(chunk), onRow);
          isStarted = true;
        } catch (reason) {
          // The rest has to arrive all the same before the connection can serve again.
          failure = reason as Error;
        }
      },
      handleCommandComplete: () => undefined,
      handleError: (reason: Error) => {
        failure ??= reason;
        reject(failure);
      },
      handleReadyForQuery: () => (failure === null ? resolve() : reject(failure)),
    };
    client.query(copy as Submittable);
  });
}

/**
 * Reads rows through `COPY (query) TO STDOUT (FORMAT binary)`, each as soon as it has arrived: bytes
 * come as bytes, where the driver's own rows would come as text twice as long, and nothing is kept.
 *
 * @param query a SELECT whose values stand in it: a copy takes no parameters
 * @param onRow the row's columns in PostgreSQL's binary form, valid only during the call
 * @param transaction where the rows must be those that it sees
 * @throws what `onRow` throws, once the rest of the rows has gone by
 */
export async function copyRows(
  query: string,
  onRow: (fields: CopiedField[]) => void,
  transaction?: Transaction,
): Promise<void> {
  const statement = `copy (${query}) to stdout (format binary)`;
  const own = transaction as (Transaction & { connection?: Client }) | undefined;
  if (own?.connection) return copyFrom(own.connection, statement, onRow);
  const { connectionManager } = database();
  const connection = await connectionManager.getConnection({ type: 'read' });
  try {
    await copyFrom(connection as Client, statement, onRow);
  } finally {
    connectionManager.releaseConnection(connection);
  }
}
