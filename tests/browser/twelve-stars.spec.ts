import { readFileSync } from 'node:fs';
import path from 'node:path';
import { type APIRequestContext, expect, test } from '@playwright/test';

/**
 * Twelve invented stars as files, by HTTP and a token alone: maps and limits as they were computed
 * outside, within the tolerances stated there (tests/reference/checks, survey-maps and
 * survey-inference; SciPy).
 */
interface Check {
  name: string;
  inputs: Record<string, unknown>;
  expected: unknown;
  tolerance: { abs?: number; rel?: number; rms?: number };
}
interface Star {
  name: string;
  band: string;
  magnitude: number;
  distance_pc: number;
  distance_error_pc: number;
  age_myr: number;
  age_lo_myr: number;
  age_hi_myr: number;
  curve: string;
  offset_mag?: number;
}
interface Curve {
  separation_arcsec: number[];
  contrast_mag: number[];
  coverage?: { separation_arcsec: number[]; fraction: number[] };
}

const checksOf = (file: string): Check[] =>
  JSON.parse(readFileSync(path.resolve(__dirname, `../reference/checks/${file}.json`), 'utf8'))
    .checks;
const maps = checksOf('survey-maps');
const inference = checksOf('survey-inference');
const setup = maps[0].inputs as { stars: Star[]; curves: Record<string, Curve> };

/** Linear in ln θ, as both the curve and its coverage are read. */
function between(x: number, xs: number[], ys: number[]): number {
  const i = Math.max(0, Math.min(xs.length - 2, xs.findIndex((edge) => edge > x) - 1));
  if (x >= xs[xs.length - 1]) return ys[ys.length - 1];
  return ys[i] + ((ys[i + 1] - ys[i]) * Math.log(x / xs[i])) / Math.log(xs[i + 1] / xs[i]);
}

function curveRows(star: Star): string[] {
  const curve = setup.curves[star.curve];
  const places = [
    ...new Set([...curve.separation_arcsec, ...(curve.coverage?.separation_arcsec ?? [])]),
  ];
  return places
    .sort((a, b) => a - b)
    .map((x) => {
      const contrast =
        between(x, curve.separation_arcsec, curve.contrast_mag) + (star.offset_mag ?? 0);
      const share = curve.coverage
        ? between(x, curve.coverage.separation_arcsec, curve.coverage.fraction)
        : 1;
      return `${star.name},${x},${contrast},${star.band},${share}`;
    });
}

function files(): Record<string, string> {
  const bands = [...new Set(setup.stars.map((star) => star.band))];
  const targets = setup.stars.map((star) =>
    [
      star.name,
      star.distance_pc,
      star.distance_error_pc,
      star.age_myr,
      star.age_myr - star.age_lo_myr,
      star.age_hi_myr - star.age_myr,
      ...bands.map((band) => (band === star.band ? star.magnitude : '')),
    ].join(),
  );
  const heading = `name,distance [pc],distance_error,age [Myr],age_error_lower,age_error_upper,${bands.map((band) => `mag_${band} [mag]`).join()}`;
  return {
    targets: [heading, ...targets, ''].join('\n'),
    'contrast-curves': [
      'target,separation [arcsec],contrast [mag],band,coverage',
      ...setup.stars.flatMap(curveRows),
      '',
    ].join('\n'),
    companions: 'target,companion,status,mass [Mjup],semi_major_axis [AU]\n',
  };
}

const folder = process.env.RAREBOUND_DATA_DIR ?? '';
const headers = () => ({
  authorization: `Bearer ${readFileSync(path.join(folder, 'demo-token'), 'utf8').trim()}`,
});
const api = (rest: string) => `/api/v1/collaborations/breakwater/${rest}`;

async function get(request: APIRequestContext, rest: string) {
  const response = await request.get(api(rest), { headers: headers() });
  expect(response.status()).toBe(200);
  return response.json();
}

async function post(request: APIRequestContext, rest: string, data?: unknown) {
  const response = await request.post(api(rest), { headers: headers(), data });
  expect(response.status(), await response.text()).toBeLessThan(300);
  return response.json();
}

const expectedOf = (name: string) => {
  const check = inference.find((one) => one.name === name);
  if (!check) throw new Error(`no check is called ${name}`);
  return check.expected as { upper_limit_95: number };
};

/** uint16 storage may move a value by this much more than the engine alone is allowed. */
const STORED = 7.7e-6;

test('twelve stars as files give the maps and limits computed outside', async ({ request }) => {
  const survey = await post(request, 'surveys', {
    name: 'Twelve stars',
    band: 'H',
    mapSettings: {
      eccentricity: { law: 'beta', alpha: 0.867, beta: 3.03 },
      threshold: 'smooth',
      // The outside values carry the error of five age nodes a side.
      ageNodesPerSide: 5,
      massMjup: { min: 1, max: 60, count: 20 },
      semiMajorAxisAu: { min: 3, max: 600, count: 20 },
    },
  });
  for (const [kind, text] of Object.entries(files())) {
    const address = api(`uploads?kind=${kind}&survey=${survey.slug}&name=${kind}.csv`);
    const read = await request.post(address, {
      headers: { ...headers(), 'content-type': 'text/csv' },
      data: Buffer.from(text),
    });
    expect(read.status(), await read.text()).toBe(201);
    const stored = await post(request, `uploads/${(await read.json()).id}/store`);
    expect(stored.state).toBe('stored');
  }
  await expect
    .poll(async () => (await get(request, `surveys/${survey.slug}`)).maps.ready, {
      timeout: 60_000,
    })
    .toBe(12);

  const listed: { target: string; mapId: string }[] = (
    await get(request, `surveys/${survey.slug}/maps`)
  ).maps;
  for (const check of maps.filter(({ name }) => name.startsWith('map full'))) {
    const id = listed.find(({ target }) => target === check.inputs.star)?.mapId;
    const { completeness } = (await get(request, `maps/${id}`)) as { completeness: number[][] };
    const expected = check.expected as number[][];
    const errors = completeness.flatMap((row, i) =>
      row.map((value, j) => Math.abs(value - expected[i][j])),
    );
    expect(errors).toHaveLength(400);
    expect(Math.max(...errors)).toBeLessThanOrEqual((check.tolerance.abs ?? 0) + STORED);
    const rms = Math.sqrt(errors.reduce((sum, error) => sum + error * error, 0) / errors.length);
    expect(rms).toBeLessThanOrEqual(check.tolerance.rms ?? 0);
  }

  const population = await post(request, 'populations', {
    name: 'Power law A',
    convention: 'log',
    definition: {
      form: 'power-law',
      massMinMjup: 3,
      massMaxMjup: 40,
      semiMajorAxisMinAu: 10,
      semiMajorAxisMaxAu: 200,
      massIndex: -0.31,
      semiMajorAxisIndex: 0.39,
    },
  });
  for (const [likelihood, max, name] of [
    ['mean-number', 2, 'poisson power-law A 0 detections uniform'],
    ['host-fraction', 1, 'bernoulli power-law A 0 detections uniform'],
  ] as const) {
    const analysis = await post(request, 'analyses', {
      name,
      recipe: {
        surveyIds: [survey.id],
        populationId: population.id,
        likelihood,
        prior: { law: 'uniform', max },
      },
    });
    const run = await post(request, `analyses/${analysis.key}/runs`);
    await expect
      .poll(async () => (await get(request, `runs/${run.id}`)).job.status, { timeout: 60_000 })
      .toBe('done');
    const { result } = await get(request, `runs/${run.id}`);
    const limit = expectedOf(name).upper_limit_95;
    // The mean completeness of the check may move by 0.5 %, and the limit with it.
    expect(Math.abs(result.answer.limit / limit - 1)).toBeLessThan(5e-3);
    const csv = await request.get(api(`runs/${run.id}/exports/limits.csv`), { headers: headers() });
    expect(await csv.text()).toContain(String(result.answer.limit));
  }
});
