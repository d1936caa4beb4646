'use client';

import { BottomAxis, LeftAxis } from '@/components/charts/axes';
import { BoundFlag } from '@/components/charts/bound-flag';
import { ChartFigure, type ChartTable } from '@/components/charts/chart-figure';
import { areaPath, linePath } from '@/components/charts/paths';
import { scaleLinear, scaleLog } from '@/components/charts/scales';
import type { Tick } from '@/components/charts/ticks';
import type { HelpAxis, HelpCurve, HelpDrawing } from '@/lib/help';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';

const [WIDTH, HEIGHT] = [460, 270];
const plot = { left: 52, right: 444, top: 34, bottom: 218 };

const looks: Record<HelpCurve['look'], string> = {
  data: 'posterior-line',
  bound: 'step-line',
  quiet: 'leader',
  dashed: 'alternative-line',
};

/** Server and browser differ in the last bit of a logarithm: what both write must not show it. */
function scaleOf({ scale, domain }: HelpAxis, range: [number, number]) {
  const make = scale === 'log' ? scaleLog : scaleLinear;
  const place = make([domain[0], domain[1]], range);
  return (value: number) => Math.round(100 * place(value)) / 100;
}

const ticksOf = ({ ticks, times = 1 }: HelpAxis): Tick[] =>
  ticks.map((value) => ({ value, label: formatPlain(value * times), isMajor: true }));

/** Every twelfth point of each curve: what the drawing can be read to. */
function tablesOf({ x, y, curves }: HelpDrawing): ChartTable[] {
  return curves.map((curve) => ({
    caption: curve.label?.text ?? y.name,
    columns: [x.name, y.name],
    rows: curve.x.flatMap((value, at) =>
      curve.x.length > 12 && at % 12 !== 0
        ? []
        : [
            [
              formatPlain(value * (x.times ?? 1)),
              formatSignificant(curve.y[at] * (y.times ?? 1), 3),
            ],
          ],
    ),
  }));
}

/** The drawing of a help entry in the grammar of all charts. */
export function HelpFigure({
  drawing,
  word,
  title,
}: {
  drawing: HelpDrawing;
  word: string;
  title: string;
}) {
  const { x: across, y: up, curves, flag, caption } = drawing;
  const x = scaleOf(across, [plot.left, plot.right]);
  const y = scaleOf(up, [plot.bottom, plot.top]);
  return (
    <ChartFigure
      name={word}
      label={`${title}: ${caption}`}
      width={WIDTH}
      height={HEIGHT}
      caption={caption}
      className="help-figure"
      tables={() => tablesOf(drawing)}
    >
      <LeftAxis
        ticks={ticksOf(up)}
        scale={y}
        x={plot.left}
        y0={plot.top}
        y1={plot.bottom}
        gridTo={plot.right}
      />
      <text className="quiet" x={plot.left} y={16}>
        {up.name}
      </text>
      <BottomAxis
        ticks={ticksOf(across)}
        scale={x}
        y={plot.bottom}
        x0={plot.left}
        x1={plot.right}
        name={across.name}
      />
      {flag && (
        <path
          className="posterior-fill"
          d={areaPath(curves[0].x, curves[0].y, x, y, plot.bottom, undefined, flag.at)}
        />
      )}
      {curves.map((curve) => (
        <path
          key={`${curve.look} ${curve.label?.text ?? curve.y[60]}`}
          className={looks[curve.look]}
          d={linePath(curve.x, curve.y, x, y)}
        />
      ))}
      {curves
        .filter(({ label }) => label !== undefined)
        .map((curve) => (
          <CurveLabel key={curve.label?.text} curve={curve} x={x} y={y} />
        ))}
      {flag && (
        <BoundFlag
          x={x(flag.at)}
          top={plot.top + 40}
          bottom={plot.bottom}
          text={flag.text}
          right={plot.right}
          left={plot.left}
        />
      )}
    </ChartFigure>
  );
}

function CurveLabel({
  curve,
  x,
  y,
}: {
  curve: HelpCurve;
  x(value: number): number;
  y(value: number): number;
}) {
  const { label } = curve;
  if (!label) return null;
  const at = { x: x(curve.x[label.at]), y: y(curve.y[label.at]) };
  const isRight = at.x > (plot.left + plot.right) / 2;
  return (
    <text
      className={`curve-name ${curve.look === 'bound' ? 'bound-text' : ''}`}
      x={at.x + (isRight ? 4 : -4)}
      y={at.y + (label.side === 'above' ? -9 : 19)}
      textAnchor={isRight ? 'end' : 'start'}
    >
      {label.text}
    </text>
  );
}
