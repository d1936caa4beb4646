import { Op } from 'sequelize';
import { ReleaseRow, ReleaseRunRow } from '@/models';
import type { ReleaseFacts } from '../export-limits';
import { addressOfRelease } from './address';

/** What the words of a published release say of it; none of a draft. */
export function factsOfRelease(row: ReleaseRow): ReleaseFacts | undefined {
  const { publishedAt, title, number: version, licence, authors, code } = row;
  if (!publishedAt) return undefined;
  const year = publishedAt.getUTCFullYear();
  return { title, version, licence, authors, year, address: addressOfRelease(code) };
}

/** The newest release that the public can read with this run in it. */
export async function releaseOfRun(runId: string): Promise<ReleaseFacts | undefined> {
  const links = await ReleaseRunRow.findAll({ where: { runId } });
  const newest = await ReleaseRow.findOne({
    where: {
      id: links.map(({ releaseId }) => releaseId),
      publishedAt: { [Op.not]: null },
      withdrawnAt: null,
    },
    order: [['publishedAt', 'DESC']],
  });
  return newest ? factsOfRelease(newest) : undefined;
}
