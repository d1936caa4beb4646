import { type AxisShape, fromLogIndex, mapIndices } from '@/lib/population';
import { isSameLaw, type LawDefinition, partsOf } from './law-parts';

export const tidy = (value: number, digits = 6) => Number(value.toPrecision(digits));
/** A table beyond this length stays out of the address: servers cut long ones. */
const LONGEST = 1500;

/** Names of the parts in an address. */
export const keys = {
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
