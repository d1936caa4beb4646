import type { Query } from '@/components/runs/live-setting';
import { type AxisShape, toLogIndex } from '@/lib/population';
import { populationDefinitionSchema } from '@/lib/schemas/populations';
import { keys, tidy } from './law-address';
import {
  definitionOf,
  type LawAxis,
  type LawDefinition,
  type LawPart,
  type LawParts,
  partsOf,
} from './law-parts';

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
