import { Client } from 'pg';
import { type Api, Refused } from './api';
import { pause, populationBody } from './work';

/** Writes until told to stop, and knows what was acknowledged. */
export interface Writer {
  acknowledged: string[];
  /** Answers other than a good one, "unavailable" and a broken connection. */
  wrong: string[];
  stop(): Promise<void>;
}

function keepWriting(write: () => Promise<string>, isOutage: (error: unknown) => boolean): Writer {
  let isOver = false;
  const writer: Writer = { acknowledged: [], wrong: [], stop: async () => {} };
  const loop = (async () => {
    while (!isOver) {
      try {
        writer.acknowledged.push(await write());
      } catch (error) {
        if (!isOutage(error)) writer.wrong.push(String(error));
        await pause(50);
      }
    }
  })();
  writer.stop = async () => {
    isOver = true;
    await loop;
  };
  return writer;
}

/** What a person sees while a part of the product is away: no answer, or one that says so. */
export const isAway = (error: unknown) =>
  error instanceof Refused ? error.status === 503 : error instanceof TypeError;

/** Populations through the API, which are one row each. */
export function writeByApi(api: Api, prefix: string): Writer {
  let count = 0;
  return keepWriting(async () => {
    const name = `${prefix} ${++count}`;
    await api.post('populations', populationBody(name));
    return name;
  }, isAway);
}

/** Rows of a table of the row's own, as fast as the database takes them one by one. */
export function writeBySql(databaseUrl: () => string, writer: number): Writer {
  let client: Client | null = null;
  let count = 0;
  const connect = async () => {
    const made = new Client({ connectionString: databaseUrl(), application_name: 'harden' });
    made.on('error', () => {});
    await made.connect();
    return made;
  };
  const kept = keepWriting(
    async () => {
      client ??= await connect();
      const id = `${writer}-${++count}`;
      try {
        await client.query('insert into harden_write (id) values ($1)', [id]);
      } catch (error) {
        client.end().catch(() => {});
        client = null;
        throw error;
      }
      return id;
    },
    () => true,
  );
  return {
    ...kept,
    stop: async () => {
      await kept.stop();
      await client?.end().catch(() => {});
    },
  };
}
