import type { Client, Connection, Submittable } from 'pg';

/** Signature, flags and length of an extension come before the first row. */
const SIGNATURE = Buffer.from('PGCOPY\n\xff\r\n\0', 'latin1');

/**
 * The one column of `COPY … TO STDOUT (FORMAT binary)`, row by row as it arrives.
 *
 * The driver hands over the messages of a copy as they come; each holds whole rows: a count of
 * columns, then length and bytes of each, and -1 at the end.
 */
export function copyColumn(
  client: Client,
  statement: string,
  onRow: (bytes: Buffer) => void,
): Promise<number> {
  return new Promise((resolve, reject) => {
    let rows = 0;
    let isStarted = false;
    let failure: Error | null = null;
    const takeRows = (chunk: Buffer) => {
      let at = 0;
      if (!isStarted) {
        if (!chunk.subarray(0, SIGNATURE.length).equals(SIGNATURE)) {
          throw new TypeError('the copy does not begin as a binary one does');
        }
        at = SIGNATURE.length + 8 + chunk.readInt32BE(SIGNATURE.length + 4);
        isStarted = true;
      }
      while (at < chunk.length) {
        const columns = chunk.readInt16BE(at);
        if (columns === -1) return;
        if (columns !== 1) throw new TypeError(`expected one column, got ${columns}`);
        const length = chunk.readInt32BE(at + 2);
        onRow(chunk.subarray(at + 6, at + 6 + length));
        at += 6 + length;
        rows++;
      }
    };
    const copy = {
      submit: (connection: Connection) => connection.query(statement),
      handleRowDescription: () => undefined,
      handleCopyData: ({ chunk }: { chunk: Buffer }) => {
        try {
          if (failure === null) takeRows(chunk);
        } catch (reason) {
          failure = reason as Error;
        }
      },
      handleCommandComplete: () => undefined,
      handleError: (reason: Error) => {
        failure = reason;
        reject(reason);
      },
      handleReadyForQuery: () => (failure === null ? resolve(rows) : reject(failure)),
    };
    client.query(copy as Submittable);
  });
}
