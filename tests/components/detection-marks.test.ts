import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { mapTables } from '@/components/charts/completeness-map-chart';
import { DetectionMarks } from '@/components/charts/detection-marks';
import { mapFrame } from '@/components/charts/map-frame';

const map = {
  massMjup: Float64Array.of(0.5, 5, 50),
  semiMajorAxisAu: Float64Array.of(1, 30, 1000),
  completeness: new Float64Array(9),
};
const frame = mapFrame(map, 700, 340, { left: 46, right: 16, top: 8, bottom: 46 });
const found = { name: 'NTY 1024+0447 b', massMjup: 5, semiMajorAxisAu: 30 };
const [x, y] = [frame.x(30), frame.y(5)];

const draw = (
  range: { left: number; right: number; top: number; bottom: number },
  isAside = false,
) =>
  renderToStaticMarkup(
    createElement(
      'svg',
      null,
      createElement(DetectionMarks, {
        detections: [{ ...found, isAside }],
        frame,
        taken: [],
        range,
      }),
    ),
  );

describe('marks of companions', () => {
  it('keep their names clear of the edges of the range', () => {
    const wide = { left: x - 200, right: x + 200, top: y - 100, bottom: y + 100 };
    expect(draw(wide)).toContain('text-anchor="middle"');
    expect(draw({ ...wide, right: x + 30 })).toContain('text-anchor="end"');
  });

  it('are open rings where they do not count, and are listed apart', () => {
    const wide = { left: x - 200, right: x + 200, top: y - 100, bottom: y + 100 };
    expect(draw(wide)).toContain('class="detection"');
    expect(draw(wide, true)).toContain('class="detection is-aside"');
    const captions = mapTables(map, 'mean', [found, { ...found, name: 'c', isAside: true }]);
    expect(captions.slice(1).map(({ caption }) => caption)).toEqual([
      'detections',
      'companions that do not count',
    ]);
  });
});
