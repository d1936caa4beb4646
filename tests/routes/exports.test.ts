import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as getExport } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/exports/[file]/route';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { bundleWorker, killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();
let lab: FinishedLab;
let headers: Record<string, string>;

beforeAll(async () => {
  await startWorker(await bundleWorker('route-exports'), { threads: 1 });
  lab = await buildFinishedLab();
  headers = bearer(await tokenOf(lab.people.student, lab.collaboration));
});
afterAll(killWorkers);

async function fetchFile(file: string, search = '') {
  const params = { collaboration: lab.collaboration.slug, run: lab.run.id, file };
  const response = await call(getExport, { headers, params, path: `/${search}` });
  return { response, text: await response.text() };
}

/** What every file of a run has to say beside its numbers. */
function expectConditions(text: string): void {
  expect(text).toContain(lab.run.resultDigest as string);
  expect(text.toLowerCase()).toContain('draft');
  expect(text).toMatch(/uniform in host fraction f/);
  expect(text).toMatch(/0\.95|95/);
  expect(text).toMatch(/confirmed companions inside the ranges|1 inside the ranges/);
}

describe('limits.csv', () => {
  it('has one header, a row per quantity, rule and level, and every condition', async () => {
    const { response, text } = await fetchFile('limits.csv');
    expect(response.headers.get('content-type')).toBe('text/csv; charset=utf-8');
    expect(response.headers.get('content-disposition')).toBe(
      `attachment; filename="${lab.key}-run-1-limits.csv"`,
    );
    expectConditions(text);
    const rows = parse(text, { columns: true }) as Record<string, string>[];
    expect(Object.keys(rows[0]).slice(0, 21)).toEqual(
      (
        'analysis,subset,likelihood,population,rate_prior,mass_min,mass_max,semi_major_axis_min,' +
        'semi_major_axis_max,quantity,interval,credible_level,lower,estimate,upper,mcse,' +
        'n_targets,n_companions,effective_targets,run,engine_version'
      ).split(','),
    );
    const limits = rows.filter(({ interval }) => interval === 'upper_limit');
    expect(limits).toHaveLength(20);
    const own = limits.find(
      (row) =>
        row.quantity === 'host_fraction' &&
        row.credible_level === '0.95' &&
        row.n_companions === '1',
    );
    const { answer, zero } = lab.run.result as NonNullable<typeof lab.run.result>;
    expect(Number(own?.upper)).toBe(answer.limit);
    expect(Number(own?.estimate)).toBe(answer.median);
    expect(own?.lower).toBe('');
    const aside = limits.find(
      (row) =>
        row.quantity === 'host_fraction' &&
        row.credible_level === '0.95' &&
        row.counting_rule === 'all detections set aside',
    );
    expect(Number(aside?.upper)).toBe(zero.limit);
    expect(rows.filter(({ interval }) => interval === 'central')).toHaveLength(4);
    expect(new Set(rows.map(({ state }) => state))).toEqual(new Set(['draft']));
  });
});

describe('posterior.csv', () => {
  it('holds the curve to the last digit, and integrates to one', async () => {
    const { text } = await fetchFile('posterior.csv');
    expectConditions(text);
    const rows = parse(text, { columns: true }) as Record<string, string>[];
    expect(Object.keys(rows[0]).slice(0, 4)).toEqual([
      'quantity',
      'value',
      'density',
      'cumulative',
    ]);
    const { value, density } = (lab.run.result as NonNullable<typeof lab.run.result>).answer.curve;
    expect(rows.map((row) => Number(row.value))).toEqual(value);
    expect(rows.map((row) => Number(row.density))).toEqual(density);
    expect(Number(rows.at(-1)?.cumulative)).toBeGreaterThan(0.998);
  });
});

describe('run.json', () => {
  it('holds everything', async () => {
    const { text } = await fetchFile('run.json');
    expectConditions(text);
    const all = JSON.parse(text);
    expect(all.result).toEqual(JSON.parse(JSON.stringify(lab.run.result)));
    expect(all.inputs).toEqual(JSON.parse(JSON.stringify(lab.run.inputs)));
    expect(all.state).toBe('draft');
  });
});

describe('limits.tex', () => {
  it('is a deluxetable, and a plain tabular by choice', async () => {
    const { text } = await fetchFile('limits.tex');
    expect(text).toContain('\\begin{deluxetable}');
    expect(text).toMatch(/95\\,\\% & \$<[\d.]+\$ & \$<[\d.]+\$/);
    expectConditions(text);
    const plain = await fetchFile('limits.tex', '?style=tabular');
    expect(plain.text).toContain('\\begin{tabular}');
    expect((await fetchFile('limits.tex', '?style=word')).response.status).toBe(400);
  });
});

describe('posterior.svg', () => {
  it('is a figure with its text as text, and says what it rests on', async () => {
    const { response, text } = await fetchFile('posterior.svg', '?width=180');
    expect(response.headers.get('content-type')).toContain('image/svg+xml');
    expect(response.headers.get('content-security-policy')).toContain('sandbox');
    expect(text).toContain('<title>');
    expect(text).toContain('draft, run 1');
    const words = text.replace(/<[^>]*>/g, ' ').replace(/\s+/g, ' ');
    expect(words).toContain((lab.run.resultDigest as string).slice(0, 12));
    expect(text).not.toContain('var(');
  });

  it('comes as PDF too, with its fonts inside', async () => {
    const { response, text } = await fetchFile('posterior.pdf', '?width=88');
    expect(response.headers.get('content-type')).toBe('application/pdf');
    expect(text.startsWith('%PDF-1.')).toBe(true);
    expect(text).toMatch(/\/FontName \/[A-Z]{6}\+SourceSans3/);
  });
});

describe('exports', () => {
  it('are noted in the log', async () => {
    const rows = await query<{ summary: string }>(
      `select distinct summary from audit_entry where action = 'export' order by 1`,
    );
    expect(rows.map(({ summary }) => summary)).toContain(`exported ${lab.key}-run-1-posterior.svg`);
  });

  it('are not there for a stranger, nor under another name', async () => {
    const other = await createCollaborationWith(['owner']);
    const response = await call(getExport, {
      headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
      params: { collaboration: other.collaboration.slug, run: lab.run.id, file: 'limits.csv' },
    });
    expect(response.status).toBe(404);
    expect((await fetchFile('constructor')).response.status).toBe(404);
  });
});
