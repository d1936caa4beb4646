import { execFile } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { expect, test } from '@playwright/test';
import { buildGuide, type GuideOperation } from '@/lib/schemas/api-guide';
import { buildOpenApi } from '@/lib/schemas/openapi';

const run = promisify(execFile);
let folder: string;

test.beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'rarebound-examples-'));
});
test.afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** The examples of the guide's pages, for the collaboration and the token of the seed. */
function examplesOf(
  baseURL: string,
): { operation: GuideOperation; curl: string; python: string }[] {
  return buildGuide(buildOpenApi(baseURL), baseURL)
    .flatMap(({ operations }) => operations)
    .flatMap((operation) => {
      const { example } = operation;
      if (!example) return [];
      const here = (text: string) =>
        text.replaceAll('my-team', 'breakwater').replaceAll('plover', 'halyard');
      return [{ operation, curl: here(example.curl), python: here(example.python) }];
    });
}

async function outcome(program: string, words: string[]): Promise<{ ok: boolean; output: string }> {
  const token = path.join(process.env.RAREBOUND_DATA_DIR ?? '', 'demo-token');
  const env = { ...process.env, RAREBOUND_TOKEN: readFileSync(token, 'utf8').trim() };
  try {
    const { stdout } = await run(program, words, { cwd: folder, env, timeout: 60_000 });
    return { ok: true, output: stdout };
  } catch (error) {
    const { stdout, stderr } = error as { stdout: string; stderr: string };
    return { ok: false, output: `${stdout}${stderr}` };
  }
}

// Debian has uuidgen in a package of its own.
const inBash = (text: string) =>
  outcome('/bin/bash', ['-c', `uuidgen() { cat /proc/sys/kernel/random/uuid; }\n${text}`]);
const inPython = (text: string) => outcome('/usr/bin/python3', ['-c', text]);

/** An id of an example belongs to nothing here, and some lists are an owner's alone. */
const isRightlyRefused = (output: string) =>
  /"status":\s*404|returned error: 40[34]|"needed":\[/.test(output);

test('every example that reads is answered as it stands, in curl', async ({ baseURL }) => {
  test.setTimeout(300_000);
  const reads = examplesOf(baseURL ?? '').filter(({ operation }) => operation.method === 'GET');
  const wrong: string[] = [];
  let answered = 0;
  for (const { operation, curl } of reads) {
    const { ok, output } = await inBash(curl);
    if (ok) answered++;
    else if (!isRightlyRefused(output)) wrong.push(`${operation.path}: ${output.slice(0, 300)}`);
  }
  expect(wrong).toEqual([]);
  expect(answered).toBeGreaterThan(30);
});

test('examples that read and write run as they stand, in Python and in curl', async ({
  baseURL,
}) => {
  const examples = examplesOf(baseURL ?? '');
  for (const end of ['/surveys', '/analyses/{analysis}', '/stars', '/releases/{release}']) {
    const read = examples.find(
      ({ operation: { method, path: address } }) =>
        method === 'GET' && address.endsWith(`{collaboration}${end}`),
    );
    const { ok, output } = await inPython(read?.python ?? '');
    expect(ok, output).toBe(true);
    expect(output.length).toBeGreaterThan(20);
  }
  const create = examples.find(
    ({ operation: { method, path: address } }) =>
      method === 'POST' && address.endsWith('{collaboration}/populations'),
  );
  for (const { ok, output } of [
    await inPython(create?.python ?? ''),
    await inBash(create?.curl ?? ''),
  ]) {
    expect(ok, output).toBe(true);
    expect(output).toContain('Flat in both logarithms');
  }
});
