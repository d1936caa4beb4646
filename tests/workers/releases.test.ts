import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as bringIn } from '@/app/api/v1/collaborations/[collaboration]/bundles/route';
import { DELETE as endLink } from '@/app/api/v1/collaborations/[collaboration]/guest-links/[link]/route';
import { POST as giveLink } from '@/app/api/v1/collaborations/[collaboration]/guest-links/route';
import { GET as getOverview } from '@/app/api/v1/collaborations/[collaboration]/overview/route';
import { POST as agree } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/agree/route';
import { POST as checkAgain } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/check/route';
import { POST as publish } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/publish/route';
import {
  GET as getRelease,
  PATCH as updateRelease,
} from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/route';
import { POST as signOff } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/sign-off/route';
import { POST as withdraw } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/withdraw/route';
import {
  POST as createRelease,
  GET as listReleases,
} from '@/app/api/v1/collaborations/[collaboration]/releases/route';
import { GET as getBundle } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/bundle/route';
import {
  POST as freeze,
  GET as getStanding,
} from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/freeze/route';
import { POST as writeNote } from '@/app/api/v1/guest/[token]/notes/route';
import { GET as getFile } from '@/app/api/v1/releases/[code]/files/[file]/route';
import { packFiles, unpackFiles } from '@/lib/formats/bundle';
import { describePrior } from '@/lib/inference';
import type { Role } from '@/lib/schemas/common';
import { overviewSchema } from '@/lib/schemas/overview';
import { freezeStandingSchema, newGuestLinkSchema } from '@/lib/schemas/releases';
import { readAsGuest } from '@/lib/services/releases/guest-links';
import { listImports } from '@/lib/services/releases/import-bundle';
import { findPublicRelease } from '@/lib/services/releases/public-page';
import {
  CollaborationRow,
  CompanionRow,
  FrozenRunRow,
  GuestLinkRow,
  RunRow,
  TargetRow,
} from '@/models';
import { sha256Hex } from '@/models/digest';
import { portableDigests } from '@/models/portable-digest';
import { withDatabase } from '../support/database';
import {
  actorOf,
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
  webAddress,
} from '../support/people';
import { openReleaseLab, type ReleaseLab, readRelease as view } from '../support/release-lab';
import { untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();
let lab: ReleaseLab;
let run: RunRow;
let second: RunRow;
let release: { id: string; key: string; code: string };
let draft: Buffer;

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await openReleaseLab();
  ({ run, second } = lab);
}, 60_000);
afterAll(killWorkers);

const ask: ReleaseLab['ask'] = (handler, given) => lab.ask(handler, given);
const post: ReleaseLab['ask'] = (handler, given) => ask(handler, { method: 'POST', ...given });
const untilChecked = async () => {
  const shown = await view(await ask(getRelease, { role: 'student', params: { release: 'R-1' } }));
  await untilEnded(shown.job?.id ?? 'nothing is being checked');
};

describe('freezing a run', () => {
  const params = () => ({ run: run.id });

  it('states its checks, and asks for a reason where one is not met', async () => {
    const standing = freezeStandingSchema.parse(
      await (await ask(getStanding, { role: 'student', params: params() })).json(),
    );
    expect(standing.checks.map(({ name, isMet }) => [name, isMet])).toEqual([
      ['inputs', true],
      ['maps', true],
      ['calibration', false],
      ['candidates', false],
    ]);
    expect(standing.canFreeze).toBe(false);
    expect((await post(freeze, { role: 'author', params: params(), body: {} })).status).toBe(422);
    const refused = await post(freeze, { role: 'statistician', params: params(), body: {} });
    expect(refused.status).toBe(403);
  });

  it('refuses a run whose inputs have changed since', async () => {
    const companion = await CompanionRow.findOne({ where: { status: 'confirmed' } });
    await companion?.update({ status: 'background' });
    const body = { reason: 'agreed at the meeting' };
    const given = { role: 'author' as const, params: params(), body };
    expect((await post(freeze, given)).status).toBe(409);
    await companion?.update({ status: 'confirmed' });
  });

  it('keeps the inputs with it, once', async () => {
    const body = { reason: 'no calibration for a test' };
    for (const { id } of [run, second]) {
      const given = { role: 'author' as const, params: { run: id }, body };
      expect((await post(freeze, given)).status).toBe(201);
      expect((await post(freeze, given)).status).toBe(409);
    }
    expect(await lab.stateOfFiles(run.id)).toBe(`frozen, run ${run.number}`);
    const frozen = await FrozenRunRow.findOne({ where: { runId: run.id }, rejectOnEmpty: true });
    expect(sha256Hex(frozen.snapshot)).toBe(frozen.snapshotSha256);
    await expect(frozen.update({ reason: 'another' })).rejects.toThrow();
  });
});

describe('a release', () => {
  const params = { release: 'R-1' };
  /** What the overview says of the release to the member of a role. */
  const waitsFor = async (role: Role) => {
    const { waiting } = overviewSchema.parse(await (await ask(getOverview, { role })).json());
    return waiting
      .filter(({ address }) => address.endsWith('/releases/R-1'))
      .map((one) => one.fact);
  };

  it('checks the iD of each author, and takes frozen runs of its collaboration only', async () => {
    const body = {
      title: 'Giant planets around five stars',
      // The iD that ORCID gives as an example, and the same with another last digit.
      authors: [{ name: 'I. Marrand', orcid: '0000-0002-1825-0097' }],
      runIds: [run.id, second.id],
    };
    const wrong = { ...body, authors: [{ name: 'I. Marrand', orcid: '0000-0002-1825-0098' }] };
    expect((await post(createRelease, { role: 'author', body: wrong })).status).toBe(422);
    const foreign = { role: 'author' as const, body: { ...body, runIds: [crypto.randomUUID()] } };
    expect((await post(createRelease, foreign)).status).toBe(404);
    expect((await post(createRelease, { role: 'student', body })).status).toBe(403);
    const made = await view(await post(createRelease, { role: 'author', body }));
    release = made;
    expect(release.key).toBe('R-1');
    const { result, recipe } = run;
    const counted = result?.counted.length;
    expect(made.runs[0]).toMatchObject({
      ranges: expect.stringMatching(/^planets of .*MJ at .*AU$/),
      prior: describePrior(recipe.prior, result?.quantity ?? 'host_fraction'),
      detections: counted === 1 ? '1 detection' : `${counted || 'zero'} detections`,
    });
    await expect(findPublicRelease(release.code)).rejects.toThrow('No such release');
  });

  it('needs a statistician and somebody else than who froze it, then runs everything again', async () => {
    expect((await post(publish, { role: 'owner', params })).status).toBe(409);
    expect((await post(signOff, { role: 'author', params })).status).toBe(403);
    expect((await post(agree, { role: 'statistician', params })).status).toBe(403);
    const own = await post(agree, { role: 'author', params });
    expect([own.status, (await own.json()).detail]).toEqual([
      403,
      expect.stringContaining('You froze a run of this release'),
    ]);
    expect(await waitsFor('statistician')).toEqual(['R-1 waits for its signatures']);
    expect((await view(await post(signOff, { role: 'statistician', params }))).state).toBe('draft');
    expect(await waitsFor('owner')).toEqual(['R-1 waits for its second signature']);
    for (const role of ['statistician', 'author', 'student'] as const) {
      expect(await waitsFor(role)).toEqual([]);
    }
    const agreed = await view(await post(agree, { role: 'owner', params }));
    expect(agreed.job).not.toBeNull();
    expect(await waitsFor('owner')).toEqual([]);
    await untilChecked();
    const checked = await view(await ask(getRelease, { role: 'student', params }));
    expect(checked.state).toBe('checked');
    expect(checked.verification?.runs.map(({ isSameDigest }) => isSameDigest)).toEqual([
      true,
      true,
    ]);
    expect(checked.verification?.runs[0].limit).toBe(run.result?.answer.limit);
  });

  it('asks for both signatures again after a change', async () => {
    const body = { abstract: 'Five stars, one planet.' };
    const given = { role: 'author' as const, params, body, method: 'PATCH' };
    const changed = await view(await ask(updateRelease, given));
    expect([changed.state, changed.signedOff, changed.agreed]).toEqual(['draft', null, null]);
    await post(agree, { role: 'owner', params });
    await post(signOff, { role: 'statistician', params });
    await untilChecked();
  });

  it('stops where the same inputs give other numbers, and says where', async () => {
    const stored = second.result;
    if (!stored) throw new Error('no result');
    const answer = { ...stored.answer, limit: stored.answer.limit * (1 + 2e-6) };
    const withTrigger = async (result: unknown) => {
      await query('alter table run disable trigger run_result_is_final');
      await query('update run set result = $1 where id = $2', [JSON.stringify(result), second.id]);
      await query('alter table run enable trigger run_result_is_final');
    };
    await withTrigger({ ...stored, answer });
    await ask(updateRelease, { role: 'author', params, body: { note: 'x' }, method: 'PATCH' });
    await post(signOff, { role: 'statistician', params });
    await post(agree, { role: 'owner', params });
    await untilChecked();
    const shown = await view(await ask(getRelease, { role: 'owner', params }));
    expect(shown.state).toBe('mismatch');
    expect(shown.verification?.runs[1]).toMatchObject({ isSame: false, differenceCount: 1 });
    expect(shown.verification?.runs[1].differences[0]).toMatch(
      /^answer\.limit: 0\.\d+ stored, 0\./,
    );
    expect((await post(publish, { role: 'owner', params })).status).toBe(409);
    await withTrigger(stored);
    await post(checkAgain, { role: 'owner', params });
    await untilChecked();
  });

  it('is public once it is published: a page, files with their checksums, and no change', async () => {
    const published = await view(await post(publish, { role: 'owner', params }));
    expect(published.state).toBe('published');
    expect(await lab.stateOfFiles(run.id)).toBe('release 1: Giant planets around five stars');
    const page = await findPublicRelease(release.code);
    expect(page.runs.map(({ result }) => result.statement.sentence)).toEqual(
      [run, second].map(({ result }) => result?.statement.sentence),
    );
    expect(page.citation?.bibtex).toContain('https://orcid.org/0000-0002-1825-0097');
    for (const { name, sha256 } of published.files) {
      const file = await call(getFile, { params: { code: release.code, file: name } });
      expect(file.status).toBe(200);
      expect(sha256Hex(Buffer.from(await file.arrayBuffer()))).toBe(sha256);
    }
    const change = { method: 'PATCH', body: { title: 'Another title' } };
    expect((await ask(updateRelease, { role: 'author', params, ...change })).status).toBe(409);
  });

  it('gives a bundle whose every file has the checksum that it states', async () => {
    const name = 'R-1-bundle.zip';
    const file = await call(getFile, { params: { code: release.code, file: name } });
    const files = await unpackFiles(Buffer.from(await file.arrayBuffer()));
    const sums = files.get('checksums.txt')?.toString('utf8').trim().split('\n') ?? [];
    expect(sums).toHaveLength(files.size - 1);
    for (const line of sums) {
      const [sum, path] = [line.slice(0, 64), line.slice(66)];
      expect(sha256Hex(files.get(path) as Buffer), path).toBe(sum);
    }
    const crate = JSON.parse(files.get('ro-crate-metadata.json')?.toString('utf8') ?? '');
    const kinds = crate['@graph'].map((entity: { '@type': string }) => entity['@type']);
    expect(kinds.filter((kind: string) => kind === 'CreateAction')).toHaveLength(2);
    expect(kinds.filter((kind: string) => kind === 'File')).toHaveLength(files.size - 2);
  });
});

describe('a guest link', () => {
  it('opens what it names without an account, takes a note, and ends', async () => {
    const body = { label: 'referee 1', runId: run.id, days: 30 };
    expect((await post(giveLink, { role: 'statistician', body })).status).toBe(403);
    const given = newGuestLinkSchema.parse(
      await (await post(giveLink, { role: 'author', body })).json(),
    );
    const token = given.address.split('/r/')[1];
    const page = await readAsGuest(token);
    expect([page.kind, page.runs.length, page.files]).toEqual(['run', 1, []]);
    const note = { name: 'Referee', body: 'What if the start is cold?' };
    const headers = { origin: new URL(given.address).origin };
    const left = await call(writeNote, { method: 'POST', params: { token }, headers, body: note });
    expect(left.status).toBe(201);
    expect((await readAsGuest(token)).guest.notes.map(({ body: text }) => text)).toEqual([
      note.body,
    ]);
    const row = await GuestLinkRow.findByPk(given.link.id, { rejectOnEmpty: true });
    expect(row.lastUsedAt).not.toBeNull();
    expect(JSON.stringify(row)).not.toContain(token);
    await row.update({ expiresAt: new Date(Date.now() - 1000) });
    await expect(readAsGuest(token)).rejects.toThrow('No such page');
    await row.update({ expiresAt: new Date(Date.now() + 60_000) });
    await ask(endLink, { role: 'owner', params: { link: row.id }, method: 'DELETE' });
    await expect(readAsGuest(token)).rejects.toThrow('No such page');
    const late = await call(writeNote, { method: 'POST', params: { token }, headers, body: note });
    expect(late.status).toBe(404);
  });
});

describe('withdrawal', () => {
  it('leaves the page with its reason, and no number and no file', async () => {
    const params = { release: 'R-1' };
    const body = { reason: 'A distance was wrong.' };
    expect((await post(withdraw, { role: 'author', params, body })).status).toBe(403);
    await view(await post(withdraw, { role: 'owner', params, body }));
    const page = await findPublicRelease(release.code);
    expect(await lab.stateOfFiles(run.id)).toBe(`frozen, run ${run.number}`);
    expect([page.withdrawn?.reason, page.runs, page.files]).toEqual([body.reason, [], []]);
    const file = await call(getFile, { params: { code: release.code, file: 'R-1-bundle.zip' } });
    expect(file.status).toBe(404);
  });

  it('is "not found" for another collaboration', async () => {
    const other = await createCollaborationWith(['owner']);
    const headers = bearer(await tokenOf(other.people.owner, other.collaboration));
    const own = { collaboration: other.collaboration.slug };
    for (const handler of [getRelease, getStanding, getBundle]) {
      const params = { ...own, release: release.id, run: run.id };
      expect((await call(handler, { headers, params })).status).toBe(404);
    }
    const list = await call(listReleases, { headers, params: own });
    expect(await list.json()).toEqual({ releases: [] });
  });
});

describe('a bundle', () => {
  const bring = async (to: { collaboration: TestCollaboration; people: { owner: TestPerson } }) => {
    const headers = bearer(await tokenOf(to.people.owner, to.collaboration));
    const { slug: collaboration } = to.collaboration;
    const body = new Uint8Array(draft);
    const request = new Request(webAddress(), { method: 'POST', headers, body });
    return bringIn(request, { params: Promise.resolve({ collaboration }) });
  };

  it('is the same bytes each time, and says that its run is frozen, with the digest of what was kept', async () => {
    const take = async () =>
      Buffer.from(
        await (await ask(getBundle, { role: 'student', params: { run: run.id } })).arrayBuffer(),
      );
    draft = await take();
    expect(sha256Hex(await take())).toBe(sha256Hex(draft));
    const files = await unpackFiles(draft);
    const frozen = await FrozenRunRow.findOne({ where: { runId: run.id }, rejectOnEmpty: true });
    const readme = files.get('README.txt')?.toString('utf8');
    expect(readme).toContain('Frozen, run 1, kept with its inputs for good');
    expect(readme).toContain(frozen.snapshotSha256);
    expect(files.get('CITATION.bib')?.toString('utf8')).toContain('frozen, run 1');
  });

  it('gives the same answer beside its origin, under ids of its own', async () => {
    const other = await createCollaborationWith(['owner']);
    const made = await bring(other);
    expect([made.status, (await made.clone().json()).detail]).toEqual([201, undefined]);
    const again = await RunRow.findByPk((await made.json()).run.id, { rejectOnEmpty: true });
    const job = await untilEnded(again.jobId);
    expect([job.status, job.fault]).toEqual(['done', null]);
    await again.reload();
    expect(again.result?.answer.limit).toBe(run.result?.answer.limit);
    expect(portableDigests(again)).toEqual(portableDigests(run));
    expect(again.resultDigest).not.toBe(run.resultDigest);
    const actor = await actorOf(other.people.owner, other.collaboration);
    expect((await listImports(actor)).imports[0].agreement).toMatchObject({
      isSameInputs: true,
      isSameResult: true,
    });
    expect((await bring(other)).status).toBe(409);
  });

  it('gives the same digests where nothing was, after its origin is gone', async () => {
    const { resultDigest } = run;
    await CollaborationRow.destroy({ where: {} });
    expect(await TargetRow.count()).toBe(0);
    const other = await createCollaborationWith(['owner']);
    const made = await bring(other);
    expect(made.status).toBe(201);
    const again = await RunRow.findByPk((await made.json()).run.id, { rejectOnEmpty: true });
    await untilEnded(again.jobId);
    await again.reload();
    expect(again.resultDigest).toBe(resultDigest);
    expect(portableDigests(again)).toEqual(portableDigests(run));
  });

  it('refuses one in which a number was changed', async () => {
    const other = await createCollaborationWith(['owner']);
    const files = await unpackFiles(draft);
    const path = [...files.keys()].find((name) => name.endsWith('inputs/curves.json')) as string;
    const text = files.get(path)?.toString('utf8').replace('11.5', '12.5') ?? '';
    files.set(path, Buffer.from(text));
    draft = await packFiles([...files].map(([name, bytes]) => ({ name, bytes })));
    const refused = await bring(other);
    expect(refused.status).toBe(422);
    expect((await refused.json()).errors[0].code).toBe('checksum');
  });
});
