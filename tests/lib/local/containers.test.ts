import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { validate } from 'dockerfile-utils';
import { expect, it } from 'vitest';
import { parse } from 'yaml';

const root = path.resolve(import.meta.dirname, '../../..');
const read = (name: string) => readFileSync(path.join(root, name), 'utf8');
const dockerfile = read('Dockerfile');
const compose = parse(read('compose.yaml'), { merge: true });
const settings = new Set(
  [...read('.env.example').matchAll(/^# ?([A-Z_]+)=/gm)].map(([, name]) => name),
);
const scripts: Record<string, string> = JSON.parse(read('package.json')).scripts;

it('the Dockerfile has nothing that its checker warns of', () => {
  expect(validate(dockerfile).map(({ message }) => message)).toEqual([]);
  expect(validate('FROM node\nRUNN npm ci\n')).toHaveLength(1);
});

it('every setting of the container files is one that the example explains', () => {
  const inImage = [...dockerfile.matchAll(/^\s*(?:ENV )?([A-Z_]+)=/gm)].map(([, name]) => name);
  const ofNode = ['NODE_ENV', 'NEXT_TELEMETRY_DISABLED'];
  expect(inImage.filter((name) => !settings.has(name) && !ofNode.includes(name))).toEqual([]);
  const { web, worker } = compose.services;
  for (const name of Object.keys({ ...web.environment, ...worker.environment }))
    expect(settings).toContain(name);
});

it('each service waits for services that exist, and starts by a script that exists', () => {
  const services: Record<string, { depends_on?: object; command?: string[] }> = compose.services;
  for (const { depends_on: needed = {}, command } of Object.values(services)) {
    for (const name of Object.keys(needed)) expect(Object.keys(services)).toContain(name);
    if (command) expect(scripts).toHaveProperty(command[2]);
  }
  const [, port] = dockerfile.match(/^EXPOSE (\d+)$/m) ?? [];
  expect(compose.services.web.ports).toEqual([`127.0.0.1:${port}:${port}`]);
  expect(compose.services.database.volumes[0].split(':')[0]).toBe('database');
  expect(Object.keys(compose.volumes)).toEqual(['database', 'files']);
});

it('the health of a container is asked at an address that exists', () => {
  const [address] = dockerfile.match(/\/api\/\w+/) ?? [];
  expect(existsSync(path.join(root, `app${address}/route.ts`))).toBe(true);
});
