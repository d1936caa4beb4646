import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { CompletenessMapChart, mapTables } from '@/components/charts/completeness-map-chart';
import { DepthChart } from '@/components/charts/depth-chart';
import { isobands, isolines, type MapData } from '@/components/charts/map-contours';
import { MassLimitChart } from '@/components/charts/mass-limit-chart';
import { areaPath, linePath, valueAt } from '@/components/charts/paths';
import { halfOfTheSum, stackDots } from '@/components/charts/star-dots';
import { evenTicks, linearTicks, logTicks, withUnit } from '@/components/charts/ticks';

const logAxis = (min: number, max: number, n: number) =>
  Float64Array.from({ length: n }, (_, index) => min * (max / min) ** (index / (n - 1)));

/** Completeness that rises with mass alone: 0 at the lowest node, 1 at the highest. */
function buildMap(): MapData {
  const massMjup = logAxis(1, 100, 21);
  const semiMajorAxisAu = logAxis(1, 1000, 31);
  const completeness = new Float64Array(21 * 31);
  for (let row = 0; row < 21; row += 1) completeness.fill(row / 20, row * 31, (row + 1) * 31);
  return { massMjup, semiMajorAxisAu, completeness };
}

describe('the chart of detectable masses', () => {
  it('names the lower line above its axis', () => {
    const map = buildMap();
    map.completeness.fill(0.6, 0, 31);
    const markup = renderToStaticMarkup(createElement(MassLimitChart, { map, subject: 'a star' }));
    const axis = Number(markup.match(/class="axis" x1="[\d.]+" x2="[\d.]+" y1="([\d.]+)"/)?.[1]);
    const name = Number(markup.match(/y="([\d.]+)" text-anchor="middle">seen/)?.[1]);
    expect(name).toBeLessThan(axis);
  });
});

describe('isolines', () => {
  it('put each level at the mass where the map reaches it', () => {
    const map = buildMap();
    const projection = { x: Math.log10, y: Math.log10 };
    for (const line of isolines(map, [0.1, 0.5, 0.9], projection)) {
      expect(line.points.length).toBeGreaterThan(20);
      for (const [, log10Mass] of line.points) expect(log10Mass).toBeCloseTo(2 * line.level, 9);
    }
  });

  it('leave out the stretches along the edge of the grid', () => {
    const [line] = isolines(buildMap(), [0.5], { x: Math.log10, y: Math.log10 });
    const rows = [...line.path.matchAll(/,(-?[\d.]+)/g)].map((match) => Number(match[1]));
    expect(Math.max(...rows)).toBeLessThan(1.2);
  });

  it('fill 19 bands above the ground', () => {
    const bands = isobands(buildMap(), { x: Math.log10, y: Math.log10 });
    expect(bands.map(({ level }) => level)).toHaveLength(19);
    expect(bands[0].level).toBeCloseTo(0.05);
  });
});

describe('CompletenessMapChart', () => {
  const range = {
    massMinMjup: 2,
    massMaxMjup: 30,
    semiMajorAxisMinAu: 20,
    semiMajorAxisMaxAu: 300,
  };

  it('says its range and detections, and has a handle on each side', () => {
    const markup = renderToStaticMarkup(
      createElement(CompletenessMapChart, {
        map: buildMap(),
        subject: 'mean detection probability, 12 stars',
        range,
        onRangeChange: () => {},
        detections: [{ name: 'NTY 1 b', massMjup: 9, semiMajorAxisAu: 60 }],
      }),
    );
    const label = /role="img" aria-label="([^"]*)"/.exec(markup)?.[1];
    expect(label).toContain('12 stars');
    expect(label).toContain('2–30\u2009Jupiter masses at 20–300\u2009AU');
    expect(label).toContain('NTY 1 b');
    expect(markup.match(/class="handle"/g)).toHaveLength(4);
    expect(markup).toContain('aria-valuetext="300 AU"');
    expect(markup).not.toMatch(/NaN/);
  });

  it('gives the values of its nodes as a table, highest mass first', () => {
    const [table] = mapTables(buildMap(), 'one star', []);
    expect(table.rows[0][0]).toBe('100');
    expect(table.rows[0][1]).toBe('100.0');
    expect(table.rows.at(-1)?.[1]).toBe('0.0');
  });
});

describe('DepthChart', () => {
  it('names every survey and the greatest depth of all together', () => {
    const markup = renderToStaticMarkup(
      createElement(DepthChart, {
        semiMajorAxisAu: Float64Array.of(1, 10, 100),
        series: [
          { name: 'HALYARD', seriesIndex: 0, depth: Float64Array.of(0, 20, 5) },
          { name: 'PETREL', seriesIndex: 1, depth: Float64Array.of(0, 12, 4) },
        ],
      }),
    );
    expect(markup).toContain('32.0 stars at 10 AU');
    expect(markup).toContain('>HALYARD</text>');
    expect(markup).toContain('>PETREL</text>');
  });
});

describe('StarDots', () => {
  const stars = [0.1, 0.2, 0.3, 0.6].map((probability, index) => ({
    name: `star ${index}`,
    probability,
  }));

  it('finds where half of the sum lies to the right', () => {
    expect(halfOfTheSum(stars)).toEqual({ probability: 0.6, stars: 1 });
    expect(halfOfTheSum([...stars, { name: 'more', probability: 0.5 }]).stars).toBe(2);
  });

  it('lays no two dots of one row on each other', () => {
    const many = Array.from({ length: 300 }, (_, index) => ({
      name: `star ${index}`,
      probability: ((index * 37) % 100) / 100,
    }));
    const placed = stackDots(many, (value) => 800 * value, 12);
    const rows = new Map<number, number[]>();
    for (const { x, row } of placed) rows.set(row, [...(rows.get(row) ?? []), x]);
    for (const xs of rows.values()) {
      const sorted = xs.sort((a, b) => a - b);
      for (let index = 1; index < sorted.length; index += 1) {
        expect(sorted[index] - sorted[index - 1]).toBeGreaterThanOrEqual(12);
      }
    }
    expect(placed).toHaveLength(300);
  });
});

describe('ticks', () => {
  const labels = (ticks: { label?: string }[]) =>
    ticks.map(({ label }) => label).filter((label) => label !== undefined);

  it('number 1 2 5 10 on a long logarithmic axis and decades on a short one', () => {
    expect(labels(logTicks(0.5, 50, 400))).toEqual(['0.5', '1', '2', '5', '10', '20', '50']);
    expect(labels(logTicks(1, 1000, 170))).toEqual(['1', '10', '100', '1000']);
  });

  it('carry the unit behind the last number only', () => {
    expect(labels(withUnit(linearTicks(0, 12, 400), '\u2009%')).at(-1)).toMatch(/\d\u2009%$/);
    expect(
      labels(withUnit(linearTicks(0, 12, 400), '\u2009%'))
        .join(' ')
        .match(/%/g),
    ).toHaveLength(1);
  });

  it('include both ends of a control', () => {
    expect(labels(evenTicks(-2.5, 0.5))).toEqual(['−2.5', '−1.5', '−0.5', '0.5']);
    expect(labels(evenTicks(-1.8, 0.6))).toEqual(['−1.8', '−1.2', '−0.6', '0', '0.6']);
  });
});

describe('paths', () => {
  it('are written to hundredths of a px', () => {
    const ys = [0, -0.004, -0.126, 0.1, 0.05, 7, -12.5, 99.999, 759.994, 1234.56];
    const wanted = ys.map((y, i) => `${i === 0 ? 'M' : 'L'}${i},${Math.round(y * 100) / 100 + 0}`);
    expect(
      linePath(
        ys.map((_, i) => i),
        ys,
        identity,
        identity,
      ),
    ).toBe(wanted.join(''));
  });

  const identity = (value: number) => value;

  it('break a line where it has no value', () => {
    expect(linePath([0, 1, 2, 3], [0, Number.NaN, 2, 3], identity, identity)).toBe('M0,0M2,2L3,3');
  });

  it('cut an area at the wanted ends by interpolation', () => {
    expect(areaPath([0, 10], [0, 10], identity, identity, 0, 2, 4)).toBe('M2,0L2,2L4,4L4,0Z');
  });

  it('hold the end values beyond the ends', () => {
    expect(valueAt([1, 2], [5, 7], 0)).toBe(5);
    expect(valueAt([1, 2], [5, 7], 1.5)).toBe(6);
    expect(valueAt([1, 2], [5, 7], 9)).toBe(7);
  });
});
