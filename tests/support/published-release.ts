import { createHash } from 'node:crypto';
import { ReleaseFileRow, ReleaseRow } from '@/models';
import type { TestCollaboration } from './people';

const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex');

let made = 0;

/** A published release with three files, the largest of more than one part; no run is computed. */
export async function publishRelease(
  team: TestCollaboration,
  given: Partial<ReleaseRow['dataValues']> = {},
): Promise<ReleaseRow> {
  made += 1;
  const at = new Date('2026-11-03T10:00:00Z');
  const release = await ReleaseRow.create({
    collaborationId: team.id,
    number: made,
    code: createHash('sha256').update(`${team.id} ${made}`).digest('hex').slice(0, 10),
    title: `Giants are rare ${made}`,
    authors: [{ name: 'R. Castellan', orcid: '0000-0002-1825-0097' }, { name: 'Mira Sand' }],
    abstract: 'Fewer than one star in twenty.',
    licence: 'CC-BY-4.0',
    signedOffByName: 'Mira Sand',
    signedOffAt: at,
    agreedByName: 'R. Castellan',
    agreedAt: at,
    publishedByName: 'R. Castellan',
    publishedAt: at,
    verification: {
      isSame: true,
      digits: 6,
      runs: [],
      engineVersion: '1',
      checkedAt: at.toISOString(),
    },
    ...given,
  });
  const files = [
    { name: 'limits.csv', bytes: Buffer.from('mass,limit\n5,0.058\n') },
    { name: 'bundle.zip', bytes: Buffer.alloc(1_200_000, `bytes of ${release.code} `) },
    { name: 'CITATION.bib', bytes: Buffer.from('@misc{a}\n') },
  ];
  await ReleaseFileRow.bulkCreate(
    files.map(({ name, bytes }, position) => ({
      releaseId: release.id,
      collaborationId: team.id,
      position,
      name,
      bytes,
      mediaType: 'application/octet-stream',
      description: name,
      sha256: sha256(bytes),
      byteLength: bytes.length,
    })),
  );
  return release;
}
