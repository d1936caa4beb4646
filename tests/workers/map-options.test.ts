import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as startMaps } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/maps/route';
import { PATCH as changeSurvey } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/route';
import { POST as storeUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/store/route';
import { POST as sendUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import { closeReaders } from '@/lib/services/reading';
import { CompletenessMapRow, JobRow, type SurveyRow, TargetRow } from '@/models';
import { loadRecipe } from '@/models/map-recipe';
import { unpackMap } from '@/models/map-values';
import { describeDetection } from '@/workers/tasks/run-words';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf, webAddress } from '../support/people';
import { buildSurvey, SMALL_GRID } from '../support/sample';
import { untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();

const TARGETS = `name,distance,age,age_error,mag_H,moving_group,membership_probability,multiplicity,binary_semi_major_axis,binary_eccentricity,binary_mass_ratio
Alone,25,45,5,6.2,,,,,,
Pair,25,45,5,6.2,,,binary,100,0.2,0.5
Half,25,45,5,6.2,,,binary,100,,
Member,25,45,5,6.2,Group,0.6,,,,
`;
const CURVES = `target,separation [arcsec],contrast [mag],band
${['Alone', 'Pair', 'Half', 'Member']
  .flatMap((name) =>
    [
      [0.15, 7],
      [0.3, 9.5],
      [0.6, 11.5],
      [1.2, 13],
      [5, 14.2],
    ].map(([separation, contrast]) => `${name},${separation},${contrast},H`),
  )
  .join('\n')}
`;

let slug = '';
let headers: Record<string, string> = {};
let survey: SurveyRow;

beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  slug = collaboration.slug;
  headers = bearer(await tokenOf(people.owner, collaboration));
  survey = await buildSurvey(collaboration.id, { name: 'Options' });
  await startWorker({ threads: 1 });
  await importFile('targets', TARGETS);
  await importFile('contrast-curves', CURVES);
  await settled();
});
afterAll(async () => {
  await killWorkers();
  await closeReaders();
});

const params = (more: Record<string, string> = {}) => ({ collaboration: slug, ...more });

async function importFile(kind: string, text: string): Promise<void> {
  const query = new URLSearchParams({ kind, name: `${kind}.csv`, survey: survey.slug });
  const request = new Request(`${webAddress()}/api/v1/collaborations/${slug}/uploads?${query}`, {
    method: 'POST',
    headers: { ...headers, 'content-type': 'application/octet-stream' },
    body: text,
  });
  const read = await sendUpload(request, { params: Promise.resolve(params()) });
  const { id, report } = await read.json();
  expect([read.status, report?.faults ?? []]).toEqual([201, []]);
  const stored = await call(storeUpload, {
    method: 'POST',
    params: params({ upload: id }),
    headers,
  });
  expect(await stored.json()).toMatchObject({ state: 'stored' });
}

/** Waits until every job of the survey has ended. */
async function settled(): Promise<void> {
  for (const job of await JobRow.findAll({ where: { surveyId: survey.id } })) {
    expect((await untilEnded(job.id)).status).toBe('done');
  }
}

async function setRules(rules: Record<string, unknown>): Promise<void> {
  const changed = await call(changeSurvey, {
    method: 'PATCH',
    params: params({ survey: survey.slug }),
    headers,
    body: { mapSettings: { ...SMALL_GRID, ...rules } },
  });
  expect([changed.status, (await changed.json()).mapSettings]).toMatchObject([200, rules]);
  const started = await call(startMaps, {
    method: 'POST',
    params: params({ survey: survey.slug }),
    headers,
  });
  expect(started.status).toBeLessThan(300);
  await settled();
}

async function mapsByName() {
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id } });
  const maps = await CompletenessMapRow.findAll({
    where: { id: targets.flatMap((t) => t.mapId ?? []) },
  });
  return new Map(targets.map((t) => [t.name, maps.find((map) => map.id === t.mapId)]));
}

type Maps = Awaited<ReturnType<typeof mapsByName>>;
const digests = (maps: Maps) => [...maps].map(([name, map]) => [name, map?.digest]).sort();
const sum = (map: CompletenessMapRow | undefined) =>
  map ? unpackMap(map.nodeValues).reduce((total, value) => total + value, 0) : Number.NaN;

describe('rules of a survey', () => {
  let plain: Maps;

  it('stars with the same curve, age and distance share a map while no rule tells them apart', async () => {
    plain = await mapsByName();
    expect(new Set(digests(plain).map(([, digest]) => digest)).size).toBe(1);
    expect(sum(plain.get('Alone'))).toBeGreaterThan(1);
  });

  it('rules that are off leave the settings in a digest as they always were', async () => {
    const { settings } = await loadRecipe(survey.collaborationId, mapSettingsSchema.parse({}));
    expect(settings).toEqual({
      eccentricity: { law: 'uniform', max: 0.95 },
      threshold: 'smooth',
      massOutsideTable: 'undetectable',
      ageOutsideTable: 'refuse',
    });
    expect(describeDetection(settings)).toBe(
      'chance to be seen rises through one half at the contrast limit, Gaussian noise',
    );
    const { settings: all } = await loadRecipe(
      survey.collaborationId,
      mapSettingsSchema.parse({
        smallSample: { fwhmArcsec: 0.06 },
        unstableZone: 'remove',
        candidates: 'cut',
        fieldAge: { minMyr: 200, maxMyr: 5000 },
      }),
    );
    const words = describeDetection(all);
    for (const part of ['0.06 arcsec', '0.1 arcsec', 'Holman & Wiegert', '200 to 5000 Myr']) {
      expect(words).toContain(part);
    }
  });

  it('few resolution elements: every map is made anew, with less in it', async () => {
    await setRules({ smallSample: { fwhmArcsec: 0.1 } });
    const raised = await mapsByName();
    expect(raised.get('Alone')?.digest).not.toBe(plain.get('Alone')?.digest);
    expect(sum(raised.get('Alone'))).toBeLessThan(sum(plain.get('Alone')));
  });

  it('unstable zone: only the pair changes, and half an orbit is refused', async () => {
    await setRules({ unstableZone: 'remove' });
    const removed = await mapsByName();
    const pair = removed.get('Pair');
    // Limits of a 100 au pair with e = 0.2 and μ = 1/3: 25.36 and 307.48 au.
    const zone = (pair?.semiMajorAxisAu ?? []).map((axis) => axis > 25.36 && axis < 307.48);
    const values = [...unpackMap((pair as CompletenessMapRow).nodeValues)];
    values.forEach((value, i) => {
      if (zone[i % zone.length]) expect(value).toBe(0);
    });
    expect(pair?.report.nodesRemovedByStellarCompanion).toBe(
      6 * zone.filter((isIn) => isIn).length,
    );
    const half = await TargetRow.findOne({ where: { name: 'Half' }, rejectOnEmpty: true });
    expect(half.mapState).toBe('failed');
    expect(half.mapFault).toContain('its unstable zone needs both');
    expect(removed.get('Alone')?.report).not.toHaveProperty('nodesRemovedByStellarCompanion');
  });

  it('field age: only the possible member changes', async () => {
    await setRules({ fieldAge: { minMyr: 300, maxMyr: 6000 } });
    const mixed = await mapsByName();
    expect(mixed.get('Member')?.digest).not.toBe(mixed.get('Alone')?.digest);
    expect(mixed.get('Half')?.digest).toBe(mixed.get('Alone')?.digest);
    expect(sum(mixed.get('Member'))).toBeLessThan(sum(mixed.get('Alone')));
  });

  it('candidates: a file of them makes the maps of their stars anew, and settling them again', async () => {
    await setRules({ candidates: 'cut', candidateHalfWidthArcsec: 0.2 });
    const before = await mapsByName();
    const companions = (status: string) =>
      `target,companion,status,separation,contrast,band,mass,semi_major_axis,probability\nAlone,cc1,${status},1,11,H,12,25,0.5\n`;
    await importFile('companions', companions('candidate'));
    await settled();
    const cut = await mapsByName();
    expect(cut.get('Alone')?.digest).not.toBe(before.get('Alone')?.digest);
    expect(sum(cut.get('Alone'))).toBeLessThan(sum(before.get('Alone')));
    expect(cut.get('Pair')?.digest).toBe(before.get('Pair')?.digest);
    await importFile('companions', companions('background').replace('0.5\n', '0\n'));
    await settled();
    expect(digests(await mapsByName())).toEqual(digests(before));
  });

  it('switched off again, the first maps are back', async () => {
    await setRules({});
    expect(digests(await mapsByName())).toEqual(digests(plain));
  });
});
