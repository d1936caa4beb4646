import { z } from 'zod';
import type { FileToDeposit, RemoteDeposit, Repository } from './contract';
import { type Answered, type ExchangeOptions, exchange, RepositoryFault } from './exchange';

const MOST_UPLOADS = 3;

const hex = z.string().regex(/^[0-9a-f]{64}$/);
const fileSchema = z.object({ name: z.string(), byteLength: z.number(), sha256: hex });
const doiSchema = z.string().regex(/^10\.\d{4,9}\/\S{1,200}$/);
const depositSchema = z.object({
  id: z.string().min(1).max(200),
  state: z.enum(['draft', 'published']),
  doi: doiSchema.nullable(),
  address: z.url({ protocol: /^https?$/ }).nullable(),
  files: z.array(fileSchema),
});

function readAs<T>(schema: z.ZodType<T>, { body }: Answered): T {
  const read = schema.safeParse(body);
  if (read.success) return read.data;
  throw new RepositoryFault('The repository answered in a form that is not known here');
}

/**
 * The plain deposit API: drafts as JSON, one PUT for each file with its digest, one POST to publish.
 * A repository that speaks otherwise gets a file beside this one with the same five steps.
 */
export function openRepository(options: ExchangeOptions): Repository {
  const at = (id: string) => `/deposits/${encodeURIComponent(id)}`;
  const find = async (id: string): Promise<RemoteDeposit | null> => {
    const answer = await exchange({ method: 'GET', path: at(id), also: [404] }, options);
    return answer.status === 404 ? null : readAs(depositSchema, answer);
  };
  const put = async (id: string, file: FileToDeposit): Promise<boolean> => {
    const digest = Buffer.from(file.sha256, 'hex').toString('base64');
    const answer = await exchange(
      {
        method: 'PUT',
        path: `${at(id)}/files/${encodeURIComponent(file.name)}`,
        content: {
          open: file.open,
          byteLength: file.byteLength,
          headers: { 'content-type': file.mediaType, 'repr-digest': `sha-256=:${digest}:` },
        },
        // The repository has compared the digest itself, and kept nothing.
        also: [422],
      },
      options,
    );
    if (answer.status === 422) return false;
    const stored = readAs(fileSchema, answer);
    return stored.sha256 === file.sha256 && stored.byteLength === file.byteLength;
  };
  return {
    name: new URL(options.url).host,
    find,
    async createDraft(metadata) {
      // A draft whose number was lost with a process is found again, not made twice.
      const path = `/deposits?identifier=${encodeURIComponent(metadata.identifier)}`;
      const found = readAs(
        z.object({ deposits: z.array(depositSchema) }),
        await exchange({ method: 'GET', path }, options),
      );
      if (found.deposits.length > 0) return found.deposits[0];
      const made = await exchange({ method: 'POST', path: '/deposits', json: metadata }, options);
      return readAs(depositSchema, made);
    },
    async reserveDoi(id) {
      const answer = await exchange({ method: 'POST', path: `${at(id)}/doi` }, options);
      return readAs(z.object({ doi: doiSchema }), answer).doi;
    },
    async uploadFile(id, file) {
      for (let attempt = 1; attempt <= MOST_UPLOADS; attempt++) {
        if (await put(id, file)) return;
      }
      throw new RepositoryFault(
        `${file.name} arrived damaged at the repository ${MOST_UPLOADS} times. Nothing was published there`,
      );
    },
    async publish(id) {
      // 409: it was published by a request whose answer never came.
      const asked = { method: 'POST', path: `${at(id)}/publish`, also: [409] } as const;
      await exchange(asked, options);
      const deposit = await find(id);
      if (deposit?.state === 'published') return deposit;
      throw new RepositoryFault('The repository keeps the deposit as a draft and does not say why');
    },
  };
}
