import { afterAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { startRepository } from '@/lib/local/repository-stand-in';

const standIn = await startRepository({ token: 'known', doiPrefix: '10.99999' });
vi.stubEnv('REPOSITORY_URL', standIn.url);
vi.stubEnv('REPOSITORY_TOKEN', 'known');

const { GET: look, POST: send } = await import(
  '@/app/api/v1/collaborations/[collaboration]/releases/[release]/deposit/route'
);
const { claim } = await import('@/lib/queue/attempt');
const { depositSchema } = await import('@/lib/schemas/deposits');
const { findDeposit } = await import('@/lib/services/deposits/deposits');
const { citeAsBibtex, citeAsText } = await import('@/lib/formats/bundle');
const { DepositRow, JobRow, ReleaseFileRow } = await import('@/models');
const { perform } = await import('@/workers/perform');
const { performDepositRelease } = await import('@/workers/tasks/deposit-release');
const { withDatabase } = await import('../support/database');
const { bearer, call, createCollaborationWith, tokenOf } = await import('../support/people');
const { publishRelease } = await import('../support/published-release');

const { query } = withDatabase();
const team = await createCollaborationWith(['owner', 'author', 'statistician', 'student']);
const author = bearer(await tokenOf(team.people.author, team.collaboration));

beforeEach(() => {
  standIn.deposits.clear();
  standIn.faults.splice(0);
  standIn.seen.splice(0);
});
afterAll(async () => {
  await standIn.close();
  vi.unstubAllEnvs();
});

type Release = Awaited<ReturnType<typeof publishRelease>>;
const ask = (handler: typeof send, release: Release, headers = author, method = 'POST') =>
  call(handler, {
    method,
    headers,
    params: { collaboration: team.collaboration.slug, release: release.id },
  });
const stateOf = async (release: Release) =>
  depositSchema.parse(await (await ask(look, release, author, 'GET')).json());
const jobOf = async (release: Release) => {
  const { jobId } = await DepositRow.findOne({
    where: { releaseId: release.id },
    rejectOnEmpty: true,
  });
  return jobId;
};
const sent = async () => {
  const release = await publishRelease(team.collaboration);
  expect((await ask(send, release)).status).toBe(202);
  return { release, jobId: await jobOf(release) };
};

/** One delivery of the job to a worker, as the queue makes it. */
const pauses: number[] = [];
async function deliver(jobId: string): Promise<void> {
  pauses.splice(0);
  const wait = async (ms: number) => void pauses.push(ms);
  const delivery = { jobId, workerId: 'w', shutdown: new AbortController().signal };
  await perform({ ...delivery, pool: {} as never }, (work) =>
    performDepositRelease(work, { wait }),
  );
}

/** A worker that is killed where it would have paused: nothing is given back, the lease runs out. */
async function dieAtFirstPause(jobId: string): Promise<void> {
  const attempt = await claim(jobId, 'w');
  if (!attempt) throw new Error('the job could not be taken');
  const { signal } = new AbortController();
  const wait = () => Promise.reject(new Error('killed'));
  const work = { attempt, signal, pool: {} as never };
  await expect(performDepositRelease(work, { wait })).rejects.toThrow('killed');
  await query(`update job set lease_until = now() - interval '1 s' where id = $1`, [jobId]);
}

/** One published record that holds every file as it was released. */
async function expectWhole(release: Release): Promise<void> {
  expect(standIn.deposits.size).toBe(1);
  const [deposit] = standIn.deposits.values();
  expect(deposit.state).toBe('published');
  const files = await ReleaseFileRow.findAll({ where: { releaseId: release.id } });
  const there = [...deposit.files.values()].map(({ name, sha256 }) => `${name} ${sha256}`);
  expect(there.sort()).toEqual(files.map(({ name, sha256 }) => `${name} ${sha256}`).sort());
  const view = await stateOf(release);
  expect(view).toMatchObject({ state: 'published', doi: deposit.doi, address: deposit.address });
}

describe('sending a release to an open repository', () => {
  it('makes one public record with its metadata and every file, and tells its DOI', async () => {
    const { release, jobId } = await sent();
    expect((await ask(send, release)).status).toBe(409);
    await deliver(jobId);
    await expectWhole(release);
    expect(pauses).toEqual([]);
    const [{ metadata, doi }] = standIn.deposits.values();
    expect(metadata).toMatchObject({
      title: release.title,
      identifier: expect.stringMatching(new RegExp(`/r/${release.code}$`)),
      creators: [{ name: 'R. Castellan', orcid: '0000-0002-1825-0097' }, { name: 'Mira Sand' }],
      licence: 'https://creativecommons.org/licenses/by/4.0/',
      publicationDate: '2026-11-03',
    });
    expect(doi).toMatch(/^10\.99999\//);
    expect(await findDeposit(release.id)).toMatchObject({ doi, isPractice: false });
    expect((await ask(send, release)).status).toBe(409);
    const log = await query<{ summary: string }>(
      `select summary from audit_entry where action = 'deposit-release' and item_id = $1 order by id`,
      [release.id],
    );
    expect(log.map(({ summary }) => summary)).toEqual([
      `sent R-${release.number} to the open repository`,
      `deposited R-${release.number} as ${doi}`,
    ]);
  });

  it('is for authors and owners, of what is published and stands', async () => {
    const release = await publishRelease(team.collaboration);
    for (const role of ['student', 'statistician'] as const) {
      const headers = bearer(await tokenOf(team.people[role], team.collaboration));
      expect((await ask(send, release, headers)).status).toBe(403);
    }
    const draft = await publishRelease(team.collaboration, {
      publishedAt: null,
      publishedByName: null,
    });
    const gone = await publishRelease(team.collaboration, {
      withdrawnAt: new Date(),
      withdrawnReason: 'A wrong age',
    });
    for (const other of [draft, gone]) expect((await ask(send, other)).status).toBe(409);
    const outsider = await createCollaborationWith(['owner']);
    const foreign = await publishRelease(outsider.collaboration);
    expect((await ask(send, foreign)).status).toBe(404);
    expect(await DepositRow.count({ where: { releaseId: [draft.id, gone.id, foreign.id] } })).toBe(
      0,
    );
  });
});

describe('a repository that is not at its best', () => {
  it('is waited for as long as it says, and twice as long each time where it says nothing', async () => {
    const { release, jobId } = await sent();
    standIn.faults.push(
      { at: 'read', kind: 'busy', retryAfterS: 7 },
      { at: 'create', kind: 'fault' },
      { at: 'create', kind: 'fault' },
      { at: 'doi', kind: 'busy', retryAfterS: 0 },
    );
    await deliver(jobId);
    await expectWhole(release);
    expect(pauses).toEqual([7000, 1000, 2000, 0]);
    expect(standIn.faults).toEqual([]);
  });

  it('gets a file again whose connection was cut in the middle, or that arrived damaged', async () => {
    const { release, jobId } = await sent();
    standIn.faults.push(
      { at: 'upload', kind: 'busy', retryAfterS: 1 },
      { at: 'upload', kind: 'damage' },
      { at: 'upload', kind: 'cut', afterBytes: 5 },
      { at: 'upload', kind: 'no-answer' },
    );
    await deliver(jobId);
    await expectWhole(release);
    expect(standIn.faults).toEqual([]);
  });

  it('publishes once, also when the answer to that never comes', async () => {
    const { release, jobId } = await sent();
    standIn.faults.push({ at: 'publish', kind: 'no-answer' });
    await deliver(jobId);
    await expectWhole(release);
    expect(standIn.seen.filter((line) => line.endsWith('/publish'))).toHaveLength(2);
  });

  it.each([
    [
      'fails for good',
      Array.from({ length: 6 }, () => ({ at: 'doi', kind: 'fault' }) as const),
      /could not be reached in 6 tries; the last time it answered 500\. What had arrived is kept/,
    ],
    [
      'damages a file every time',
      Array.from({ length: 3 }, () => ({ at: 'upload', kind: 'damage' }) as const),
      /limits\.csv arrived damaged at the repository 3 times\. Nothing was published there/,
    ],
  ])(
    'that %s ends in a sentence, and sending again goes on where it stood',
    async (_, faults, words) => {
      const { release, jobId } = await sent();
      standIn.faults.push(...faults);
      await deliver(jobId);
      const failed = await stateOf(release);
      expect(failed).toMatchObject({ state: 'failed', canAsk: true });
      expect(failed.fault).toMatch(words);
      expect((await ask(send, release)).status).toBe(202);
      expect(await jobOf(release)).toBe(jobId);
      await deliver(jobId);
      await expectWhole(release);
    },
  );

  it('that forgot the draft gets a new one', async () => {
    const { release, jobId } = await sent();
    standIn.faults.push(
      ...Array.from({ length: 6 }, () => ({ at: 'doi', kind: 'fault' }) as const),
    );
    await deliver(jobId);
    standIn.deposits.clear();
    await ask(send, release);
    await deliver(jobId);
    await expectWhole(release);
  });
});

describe('a worker that is killed on the way', () => {
  it.each([
    ['after the draft was made, before its number was kept', 'create', 'no-answer'],
    ['after the identifier was reserved, before it was kept', 'doi', 'no-answer'],
    ['in the middle of a file', 'upload', 'no-answer'],
    ['after it was published, before that was kept', 'publish', 'no-answer'],
  ] as const)('%s: the next one ends with one record', async (_, at, kind) => {
    const { release, jobId } = await sent();
    standIn.faults.push({ at, kind });
    await dieAtFirstPause(jobId);
    expect((await stateOf(release)).state).not.toBe('published');
    await deliver(jobId);
    await expectWhole(release);
    expect((await JobRow.findByPk(jobId))?.status).toBe('done');
  });

  it('sends no file twice that had arrived whole', async () => {
    const { release, jobId } = await sent();
    standIn.faults.push({ at: 'publish', kind: 'no-answer' });
    await dieAtFirstPause(jobId);
    await deliver(jobId);
    await expectWhole(release);
    expect(standIn.seen.filter((line) => line.startsWith('PUT'))).toHaveLength(3);
  });
});

it('a citation names the DOI beside the address', () => {
  const cited = {
    key: 'rarebound-abc',
    title: 'Giants are rare',
    authors: [{ name: 'R. Castellan' }],
    year: 2026,
    version: 'release R-4',
    fingerprint: 'f'.repeat(64),
    address: 'https://rarebound.example.org/r/abc',
  };
  const doi = '10.99999/practice.1';
  expect(citeAsText({ ...cited, doi })).toBe(`${citeAsText(cited)}, https://doi.org/${doi}`);
  expect(citeAsBibtex({ ...cited, doi })).toContain(`  doi = {${doi}},`);
  expect(citeAsBibtex(cited)).not.toContain('doi');
});
