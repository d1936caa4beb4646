import {
  type AxisShape,
  axisLaw,
  axisShapes,
  checkPopulation,
  type HostScaling,
  massOfRatioMjup,
} from '@/lib/population';
import type { PopulationDefinition } from '@/lib/schemas/populations';

/** A population of laws along both axes: everything but tabulated systems. */
export type LawDefinition = Exclude<PopulationDefinition, { form: 'systems' }>;
export type LawAxis = 'mass' | 'semiMajorAxis';
/** What may be chosen along an axis; the mass ratio is a power law and for the mass alone. */
export type AxisForm = AxisShape['shape'] | 'mass-ratio';

export interface LawPart {
  range: [number, number];
  shape: AxisShape;
}

/** The parts of a population that the controls change one by one. */
export interface LawParts {
  /** Whether the range and the index of `mass` are those of the mass ratio. */
  isRatio: boolean;
  mass: LawPart;
  semiMajorAxis: LawPart;
  hostScaling?: HostScaling;
}

export function partsOf(definition: LawDefinition): LawParts {
  const shapes = axisShapes(definition);
  const isRatio = definition.form === 'mass-ratio';
  return {
    isRatio,
    mass: {
      shape: shapes.mass,
      range: isRatio
        ? [definition.massRatioMin, definition.massRatioMax]
        : [definition.massMinMjup, definition.massMaxMjup],
    },
    semiMajorAxis: {
      shape: shapes.semiMajorAxis,
      range: [definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu],
    },
    ...(definition.hostScaling && { hostScaling: definition.hostScaling }),
  };
}

/** The plainest form that holds the parts: two power laws are stored as such. */
export function definitionOf(parts: LawParts): LawDefinition {
  const { isRatio, mass, semiMajorAxis, hostScaling } = parts;
  const shared = {
    semiMajorAxisMinAu: semiMajorAxis.range[0],
    semiMajorAxisMaxAu: semiMajorAxis.range[1],
    ...(hostScaling && { hostScaling }),
  };
  if (isRatio) {
    if (mass.shape.shape !== 'power-law') throw new TypeError('a mass ratio follows a power law');
    return {
      form: 'mass-ratio',
      massRatioMin: mass.range[0],
      massRatioMax: mass.range[1],
      massRatioIndex: mass.shape.index,
      ...shared,
      semiMajorAxis: semiMajorAxis.shape,
    };
  }
  const masses = { massMinMjup: mass.range[0], massMaxMjup: mass.range[1] };
  if (mass.shape.shape === 'power-law' && semiMajorAxis.shape.shape === 'power-law') {
    return {
      form: 'power-law',
      ...masses,
      ...shared,
      massIndex: mass.shape.index,
      semiMajorAxisIndex: semiMajorAxis.shape.index,
    };
  }
  return {
    form: 'shaped',
    ...masses,
    ...shared,
    mass: mass.shape,
    semiMajorAxis: semiMajorAxis.shape,
  };
}

export function axisFormOf(parts: LawParts, axis: LawAxis): AxisForm {
  return axis === 'mass' && parts.isRatio ? 'mass-ratio' : parts[axis].shape.shape;
}

const tidy = (value: number, digits: number) => Number(value.toPrecision(digits));
const PLACES = 7;

/** A shape to begin with, as near to the present one as the form allows. */
function startShape(form: AxisShape['shape'], { range, shape }: LawPart): AxisShape {
  const [min, max] = range;
  const middle = tidy(Math.sqrt(min * max), 2);
  const index = 'index' in shape ? shape.index : 'innerIndex' in shape ? shape.innerIndex : 0;
  switch (form) {
    case 'power-law':
      return { shape: form, index };
    case 'broken-power-law':
      return { shape: form, breakAt: middle, innerIndex: index, outerIndex: tidy(index - 1, 6) };
    case 'log-normal':
      return { shape: form, median: middle, sigmaDex: 0.5 };
    case 'tabulated': {
      const at = Array.from({ length: PLACES }, (_, i) =>
        i === 0 ? min : i === PLACES - 1 ? max : tidy(min * (max / min) ** (i / (PLACES - 1)), 3),
      );
      const law = axisLaw(shape);
      const heights = at.map((x) => law.shape(x));
      const tallest = Math.max(...heights);
      return { shape: form, at, perLog: heights.map((height) => tidy(height / tallest, 3)) };
    }
  }
}

export function withForm(parts: LawParts, axis: LawAxis, form: AxisForm): LawParts {
  if (form === axisFormOf(parts, axis)) return parts;
  if (form === 'mass-ratio') {
    const shape = startShape('power-law', parts.mass);
    return { ...parts, isRatio: true, mass: { shape, range: rescale(parts.mass.range, true) } };
  }
  const leavesRatio = axis === 'mass' && parts.isRatio;
  const part = leavesRatio
    ? { ...parts.mass, range: rescale(parts.mass.range, false) }
    : parts[axis];
  return {
    ...parts,
    isRatio: parts.isRatio && !leavesRatio,
    [axis]: { range: part.range, shape: startShape(form, part) },
  };
}

/** The same masses around a star of one solar mass, to two digits. */
function rescale(range: [number, number], toRatio: boolean): [number, number] {
  const perRatio = massOfRatioMjup(1, 1);
  const of = (value: number) =>
    toRatio ? Math.min(1, tidy(value / perRatio, 2)) : tidy(value * perRatio, 2);
  return [of(range[0]), of(range[1])];
}

/** A number of a law that a slider can move. */
export interface LawParameter {
  part: LawAxis | 'host';
  field: 'index' | 'breakAt' | 'innerIndex' | 'outerIndex' | 'median' | 'sigmaDex';
}

export function readParameter(parts: LawParts, { part, field }: LawParameter): number | undefined {
  const holder: object | undefined = part === 'host' ? parts.hostScaling : parts[part].shape;
  return holder && (holder as Record<string, number | undefined>)[field];
}

/** The same parts with one number changed; parts that do not hold it stay as they are. */
export function withParameter(parts: LawParts, parameter: LawParameter, value: number): LawParts {
  const { part, field } = parameter;
  if (readParameter(parts, parameter) === undefined) return parts;
  if (part === 'host') {
    return { ...parts, hostScaling: { referenceMsun: 1, ...parts.hostScaling, index: value } };
  }
  const shape = { ...parts[part].shape, [field]: value } as AxisShape;
  return { ...parts, [part]: { ...parts[part], shape } };
}

const DIGITS = 9;

/** Whether two definitions say the same; what dragging leaves in the last bits does not count. */
export function isSameLaw(one: LawDefinition, other: LawDefinition): boolean {
  const text = (definition: LawDefinition) =>
    JSON.stringify(sorted(partsOf(definition)), (_, value) =>
      typeof value === 'number' ? tidy(value, DIGITS) : value,
    );
  return text(one) === text(other);
}

/** Keys in the order of the alphabet at every depth: stored JSON keeps no order. */
function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .sort(([a], [b]) => a.localeCompare(b))
      .map(([key, held]) => [key, sorted(held)]),
  );
}

/** Why a population cannot be used, or null. */
export function faultOf(definition: PopulationDefinition): string | null {
  try {
    checkPopulation(definition);
    return null;
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return error.message;
  }
}

/** Whether the population has an index along each axis, and so a plane of both. */
export function hasIndexPlane(definition: LawDefinition): boolean {
  const { mass, semiMajorAxis } = partsOf(definition);
  return mass.shape.shape === 'power-law' && semiMajorAxis.shape.shape === 'power-law';
}
