import { hostScalingOf, type SystemsSummary } from '@/lib/population';
import { formatPlain, formatRange } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { Conventions } from './builder-setting';
import { quoteIndex } from './law-notation';
import {
  definitionOf,
  type LawAxis,
  type LawDefinition,
  type LawParts,
  partsOf,
} from './law-parts';

export interface VersionChange {
  name: string;
  before: string;
  now: string;
  /** The version with this change alone; null where no part can be changed by itself. */
  alone: LawDefinition | null;
}

/** Each part in which two definitions differ, whatever their forms. */
export function changesBetween(
  before: ListedDefinition,
  now: ListedDefinition,
  conventions: Conventions,
): VersionChange[] {
  if (before.form === 'systems' && now.form === 'systems') return ofSystems(before, now);
  if (before.form === 'systems' || now.form === 'systems') {
    const words = (of: ListedDefinition) =>
      of.form === 'systems' ? 'systems from a table' : 'laws along both axes';
    return [{ name: 'made of', before: words(before), now: words(now), alone: null }];
  }
  return ofLaws(before, now, conventions);
}

function ofSystems(before: SystemsSummary, now: SystemsSummary): VersionChange[] {
  const show: [string, (of: SystemsSummary) => string][] = [
    ['systems', (of) => formatPlain(of.systems)],
    ['companions', (of) => formatPlain(of.companions)],
    ['masses', (of) => formatRange(of.massMinMjup, of.massMaxMjup, 'MJ')],
    ['semi-major axes', (of) => formatRange(of.semiMajorAxisMinAu, of.semiMajorAxisMaxAu, 'AU')],
  ];
  return show
    .map(([name, words]) => ({ name, before: words(before), now: words(now), alone: null }))
    .filter((change) => change.before !== change.now);
}

const shapeNames = {
  'power-law': 'power law',
  'broken-power-law': 'broken power law',
  'log-normal': 'log-normal',
  tabulated: 'table',
} as const;

const axisNames = { mass: 'mass', semiMajorAxis: 'axis' } as const;
const letters = { mass: 'α', semiMajorAxis: 'β' } as const;

function ofLaws(
  before: LawDefinition,
  now: LawDefinition,
  conventions: Conventions,
): VersionChange[] {
  const [old, next] = [partsOf(before), partsOf(now)];
  const changes: VersionChange[] = [];
  const add = (name: string, was: string, is: string, alone: LawParts) =>
    changes.push({ name, before: was, now: is, alone: definitionOf(alone) });

  for (const axis of ['mass', 'semiMajorAxis'] as const) {
    if (axis === 'mass' && old.isRatio !== next.isRatio) {
      const words = (parts: LawParts) =>
        `${parts.isRatio ? 'mass ratio' : 'mass'} ${rangeText(parts, axis)}`;
      const { isRatio, mass } = next;
      add('masses', words(old), words(next), { ...old, isRatio, mass });
      continue;
    }
    const [was, is] = [old[axis], next[axis]];
    if (was.range[0] !== is.range[0] || was.range[1] !== is.range[1]) {
      const name = axis === 'mass' && old.isRatio ? 'ratio range' : `${axisNames[axis]} range`;
      add(name, rangeText(old, axis), rangeText(next, axis), {
        ...old,
        [axis]: { ...was, range: is.range },
      });
    }
    for (const [name, wasText, isText, shape] of shapeChanges(axis, was, is, conventions)) {
      add(name, wasText, isText, { ...old, [axis]: { ...was, shape } });
    }
  }
  const scaling = (of: LawDefinition) => {
    const held = hostScalingOf(of);
    return held === null
      ? 'same for all'
      : `γ ${formatPlain(held.index)} at ${formatPlain(held.referenceMsun)} solar masses`;
  };
  if (scaling(before) !== scaling(now)) {
    const { hostScaling: _, ...rest } = old;
    const { hostScaling } = next;
    add('stars', scaling(before), scaling(now), hostScaling ? { ...rest, hostScaling } : rest);
  }
  return changes;
}

function rangeText(parts: LawParts, axis: LawAxis): string {
  const unit = axis === 'mass' ? (parts.isRatio ? '' : 'MJ') : 'AU';
  return formatRange(parts[axis].range[0], parts[axis].range[1], unit);
}

type Shape = LawParts[LawAxis]['shape'];
type ShapeChange = [name: string, before: string, now: string, shape: Shape];

function shapeChanges(
  axis: LawAxis,
  { shape: was }: LawParts[LawAxis],
  { shape: is }: LawParts[LawAxis],
  conventions: Conventions,
): ShapeChange[] {
  if (was.shape !== is.shape) {
    return [[`${axisNames[axis]} law`, shapeNames[was.shape], shapeNames[is.shape], is]];
  }
  if (is.shape === 'tabulated' && was.shape === 'tabulated') {
    if (JSON.stringify(was) === JSON.stringify(is)) return [];
    const words = (of: typeof is) => `${of.at.length} places`;
    const isAlike = words(was) === words(is);
    return [
      [
        `${axisNames[axis]} table`,
        words(was),
        isAlike ? `${words(is)}, other values` : words(is),
        is,
      ],
    ];
  }
  const [held, changed] = [was, is] as unknown as Record<string, number>[];
  return fields.flatMap(({ field, name, isIndex }): ShapeChange[] => {
    if (held[field] === changed[field] || changed[field] === undefined) return [];
    const quote = (value: number) =>
      isIndex ? quoteIndex(value, conventions[axis]) : formatPlain(value);
    const shape = { ...was, [field]: changed[field] } as Shape;
    return [[name(axis), quote(held[field]), quote(changed[field]), shape]];
  });
}

const fields: { field: string; name(axis: LawAxis): string; isIndex: boolean }[] = [
  { field: 'index', name: (axis) => `index ${letters[axis]}`, isIndex: true },
  { field: 'breakAt', name: (axis) => `${axisNames[axis]} break`, isIndex: false },
  { field: 'innerIndex', name: (axis) => `${letters[axis]} below the break`, isIndex: true },
  { field: 'outerIndex', name: (axis) => `${letters[axis]} above the break`, isIndex: true },
  { field: 'median', name: (axis) => `${axisNames[axis]} median`, isIndex: false },
  { field: 'sigmaDex', name: (axis) => `${axisNames[axis]} spread`, isIndex: false },
];
