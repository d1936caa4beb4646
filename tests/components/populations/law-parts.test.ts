import { describe, expect, it } from 'vitest';
import { builderFromQuery } from '@/components/populations/asked-setting';
import { builderToQuery, defaultSetting } from '@/components/populations/builder-setting';
import {
  definitionOf,
  isSameLaw,
  type LawDefinition,
  partsOf,
  withForm,
} from '@/components/populations/law-parts';
import { readColumns, writeColumns } from '@/components/populations/read-columns';
import { changesBetween } from '@/components/populations/version-changes';
import { populationDefinitionSchema } from '@/lib/schemas/populations';
import { definition } from '../runs/sample';

const forms = ['broken-power-law', 'log-normal', 'tabulated'] as const;

describe('forms of a law', () => {
  it.each(forms)('%s along both axes is a definition that can be stored', (form) => {
    const parts = withForm(withForm(partsOf(definition), 'mass', form), 'semiMajorAxis', form);
    const changed = definitionOf(parts);
    expect(changed.form).toBe('shaped');
    expect(populationDefinitionSchema.safeParse(changed).success).toBe(true);
    expect(isSameLaw(definitionOf(partsOf(changed)), changed)).toBe(true);
  });

  it('goes to the mass ratio of a star of one solar mass and back', () => {
    const parts = withForm(partsOf(definition), 'mass', 'mass-ratio');
    expect(definitionOf(parts)).toMatchObject({ form: 'mass-ratio', massRatioMin: 0.0019 });
    const back = definitionOf(withForm(parts, 'mass', 'power-law'));
    expect(back).toMatchObject({ form: 'power-law', massMinMjup: 2, massMaxMjup: 30 });
  });

  it('stores two power laws in the plain form again', () => {
    const shaped = withForm(partsOf(definition), 'mass', 'log-normal');
    expect(definitionOf(withForm(shaped, 'mass', 'power-law')).form).toBe('power-law');
  });
});

describe('the address of a builder', () => {
  const saved = defaultSetting(definition);
  const throughAddress = (changed: LawDefinition) =>
    builderFromQuery(builderToQuery({ ...saved, definition: changed }, saved), saved).definition;

  it.each(forms)('carries %s', (form) => {
    const changed = definitionOf(withForm(partsOf(definition), 'semiMajorAxis', form));
    expect(isSameLaw(throughAddress(changed), changed)).toBe(true);
  });

  it('carries a mass ratio with a rate that scales with the host mass', () => {
    const parts = withForm(partsOf(definition), 'mass', 'mass-ratio');
    const changed = definitionOf({ ...parts, hostScaling: { index: 1.2, referenceMsun: 0.5 } });
    expect(isSameLaw(throughAddress(changed), changed)).toBe(true);
  });

  it('keeps the saved population where an address cannot be used', () => {
    const query = { massLaw: 'broken:-5:1:2', mass: '30-2' };
    expect(isSameLaw(builderFromQuery(query, saved).definition, definition)).toBe(true);
  });
});

describe('two columns', () => {
  it('are read as a person pastes them', () => {
    const read = readColumns('mass density\n1 0.5 # first\n\n2; 1\n5,\t0\n');
    expect(read).toEqual({ shape: { shape: 'tabulated', at: [1, 2, 5], perLog: [0.5, 1, 0] } });
    if ('shape' in read) expect(readColumns(writeColumns(read.shape))).toEqual(read);
  });

  it.each([
    ['1 2\nx 3', 'Line 2'],
    ['1 2\n1 3', 'above the one before it'],
    ['1 2\n3 -1', 'must not be below 0'],
    ['1 2', 'two lines'],
    ['1 0\n2 0', 'Every density is 0'],
  ])('%j is refused with the place', (text, words) => {
    expect(readColumns(text)).toMatchObject({ fault: expect.stringContaining(words) });
  });
});

describe('changesBetween', () => {
  const conventions = { mass: 'linear', semiMajorAxis: 'period' } as const;

  it('names each number that differs, in the convention of its axis, with that change alone', () => {
    const now = { ...definition, massMinMjup: 3, semiMajorAxisIndex: 0.7 };
    const changes = changesBetween(definition, now, conventions);
    expect(changes.map(({ name }) => name)).toEqual(['mass range', 'index β']);
    // 0.4 per ln a is 0.267 per ln P: the index of the period counts 3/2 times.
    expect(changes[1].before).toBe('0.267');
    expect(changes[1].alone).toEqual({ ...definition, semiMajorAxisIndex: 0.7 });
  });

  it('compares forms, host scaling and tables', () => {
    const parts = withForm(partsOf(definition), 'semiMajorAxis', 'tabulated');
    const now = definitionOf({ ...parts, hostScaling: { index: 1, referenceMsun: 1 } });
    const names = changesBetween(definition, now, conventions).map(({ name }) => name);
    expect(names).toEqual(['axis law', 'stars']);
  });

  it('compares tables of systems by what they hold', () => {
    const box = { massMinMjup: 1, massMaxMjup: 9, semiMajorAxisMinAu: 5, semiMajorAxisMaxAu: 50 };
    const before = { form: 'systems' as const, systems: 4, companions: 6, ...box };
    const changes = changesBetween(before, { ...before, companions: 7 }, conventions);
    expect(changes).toEqual([{ name: 'companions', before: '6', now: '7', alone: null }]);
  });
});
