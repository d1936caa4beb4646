import type { Query } from '@/components/runs/live-setting';
import { type AxisShape, fromLogIndex, mapIndices, toLogIndex } from '@/lib/population';
import { populationDefinitionSchema } from '@/lib/schemas/populations';
import {
  definitionOf,
  isSameLaw,
  type LawAxis,
  type LawDefinition,
  type LawPart,
  type LawParts,
  partsOf,
} from './law-parts';

const tidy = (value: number, digits = 6) => Number(value.toPrecision(digits));
/** A table beyond this length stays out of the address: servers cut long ones. */
const LONGEST = 1500;

const keys = {
  mass: { range: 'mass', index: 'alpha', law: 'massLaw' },
  semiMajorAxis: { range: 'axis', index: 'beta', law: 'axisLaw' },
} as const;

/** "broken:5:-1.3:-2": the law, then its numbers, indices linear as the screen shows them. */
function shapeToText(shape: AxisShape): string {
  const linear = mapIndices(shape, (index) => tidy(fromLogIndex(index, 'linear')));
  switch (linear.shape) {
    case 'power-law':
      return String(linear.index);
    case 'broken-power-law':
      return `broken:${tidy(linear.breakAt)}:${linear.innerIndex}:${linear.outerIndex}`;
    case 'log-normal':
      return `log-normal:${tidy(linear.median)}:${tidy(linear.sigmaDex)}`;
    case 'tabulated':
      return `table:${linear.at.map((at, i) => `${tidy(at)}~${tidy(linear.perLog[i])}`).join(',')}`;
  }
}

function shapeFromText(text: string): AxisShape | undefined {
  const [law, ...rest] = text.split(':');
  const log = (index: string) => tidy(toLogIndex(Number(index), 'linear'), 9);
  if (law === 'broken' && rest.length === 3) {
    const [breakAt, inner, outer] = rest;
    return {
      shape: 'broken-power-law',
      breakAt: Number(breakAt),
      innerIndex: log(inner),
      outerIndex: log(outer),
    };
  }
  if (law === 'log-normal' && rest.length === 2) {
    return { shape: 'log-normal', median: Number(rest[0]), sigmaDex: Number(rest[1]) };
  }
  if (law === 'table' && rest.length === 1) {
    const rows = rest[0].split(',').map((row) => row.split('~').map(Number));
    return { shape: 'tabulated', at: rows.map(([at]) => at), perLog: rows.map(([, d]) => d) };
  }
  return undefined;
}

/** What differs from the saved definition, for the address. */
export function lawToQuery(now: LawDefinition, saved: LawDefinition): Record<string, string> {
  if (isSameLaw(now, saved)) return {};
  const [parts, before] = [partsOf(now), partsOf(saved)];
  const query: Record<string, string> = {};
  for (const axis of ['mass', 'semiMajorAxis'] as const) {
    const { range, shape } = parts[axis];
    const isRatio = axis === 'mass' && parts.isRatio;
    const same = (a: unknown, b: unknown) => JSON.stringify(a) === JSON.stringify(b);
    if (!same(range, before[axis].range) || (axis === 'mass' && isRatio !== before.isRatio)) {
      query[isRatio ? 'ratio' : keys[axis].range] = range.map((end) => tidy(end)).join('-');
    }
    const text = shapeToText(shape);
    if (text === shapeToText(before[axis].shape) || text.length > LONGEST) continue;
    query[shape.shape === 'power-law' ? keys[axis].index : keys[axis].law] = text;
  }
  if (JSON.stringify(parts.hostScaling) !== JSON.stringify(before.hostScaling)) {
    query.host = parts.hostScaling
      ? `${tidy(parts.hostScaling.index)}:${tidy(parts.hostScaling.referenceMsun)}`
      : 'none';
  }
  return query;
}

/** Reads a definition from an address; one that cannot be used keeps the saved one. */
export function lawFromQuery(query: Query, saved: LawDefinition): LawDefinition {
  const before = partsOf(saved);
  const ratio = readRange(query.ratio);
  const isRatio = ratio !== undefined || (before.isRatio && query.mass === undefined);
  const mass = readPart(query, 'mass', before.mass);
  const parts: LawParts = {
    isRatio,
    mass: isRatio && ratio ? { ...mass, range: ratio } : mass,
    semiMajorAxis: readPart(query, 'semiMajorAxis', before.semiMajorAxis),
  };
  const scaling = readScaling(query.host, before.hostScaling);
  if (scaling) parts.hostScaling = scaling;
  if (isRatio && parts.mass.shape.shape !== 'power-law') return saved;
  const read = populationDefinitionSchema.safeParse(definitionOf(parts));
  return read.success && read.data.form !== 'systems' ? read.data : saved;
}

function readPart(query: Query, axis: LawAxis, saved: LawPart): LawPart {
  const index = query[keys[axis].index];
  const law = query[keys[axis].law];
  const isIndex = index !== undefined && index.trim() !== '' && Number.isFinite(Number(index));
  return {
    range: readRange(query[keys[axis].range]) ?? saved.range,
    shape:
      (law === undefined ? undefined : shapeFromText(law)) ??
      (isIndex
        ? { shape: 'power-law', index: tidy(toLogIndex(Number(index), 'linear'), 9) }
        : saved.shape),
  };
}

function readScaling(text: string | undefined, saved: LawParts['hostScaling']) {
  if (text === undefined) return saved;
  const [index, referenceMsun] = text.split(':').map(Number);
  if (!Number.isFinite(index) || !(referenceMsun > 0)) return text === 'none' ? undefined : saved;
  return { index, referenceMsun };
}

function readRange(text: string | undefined): [number, number] | undefined {
  const [min, max] = (text ?? '').split('-').map(Number);
  return min > 0 && max > min && Number.isFinite(max) ? [min, max] : undefined;
}
