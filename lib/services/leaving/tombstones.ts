import { QueryTypes } from 'sequelize';
import type { ReleasePage } from '@/lib/schemas/release-page';
import { database } from '@/models';

interface Tombstone {
  number: number;
  title: string;
  doi: string | null;
  publishedAt: Date;
  removedAt: Date;
}

/**
 * What stands at the public address of a release whose collaboration was deleted: title, dates and
 * the identifier of a copy elsewhere, because others cite them; no name, no number, no file.
 */
export async function findTombstone(code: string): Promise<ReleasePage | null> {
  const [found] = await database().query<Tombstone>(
    `select number, title, doi, published_at as "publishedAt", removed_at as "removedAt"
     from release_tombstone where code = $1`,
    { bind: [code], type: QueryTypes.SELECT },
  );
  if (!found) return null;
  const copy = found.doi === null ? '' : ` A copy is kept at https://doi.org/${found.doi}.`;
  return {
    kind: 'release',
    key: `R-${found.number}`,
    title: found.title,
    collaboration: 'a collaboration that was deleted',
    authors: [],
    abstract: '',
    note: '',
    licence: null,
    address: null,
    publishedAt: found.publishedAt.toISOString(),
    signedOff: null,
    agreed: null,
    published: null,
    verification: null,
    withdrawn: {
      at: found.removedAt.toISOString(),
      reason: `The collaboration that published it was deleted with everything in it.${copy}`,
    },
    replaces: null,
    replacedBy: null,
    files: [],
    citation: null,
    runs: [],
  };
}
