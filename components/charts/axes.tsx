import type { ReactNode } from 'react';
import type { Tick } from './ticks';

interface AxisProps {
  ticks: Tick[];
  /** Value to px. */
  scale(value: number): number;
}

/** Server and browser differ in the last bit of a logarithm: what both write must not show it. */
const rounded = (scale: (value: number) => number) => (value: number) =>
  Math.round(100 * scale(value)) / 100;

interface BottomAxisProps extends AxisProps {
  y: number;
  x0: number;
  x1: number;
  /** Stands under the right end. */
  name?: ReactNode;
  /** The first number begins at the axis' end instead of standing under its middle. */
  isFirstAtEdge?: boolean;
  isLastAtEdge?: boolean;
}

export function BottomAxis(props: BottomAxisProps) {
  const { ticks, y, x0, x1, name, isFirstAtEdge = false, isLastAtEdge = false } = props;
  const scale = rounded(props.scale);
  const labelled = ticks.filter((tick) => tick.label !== undefined);
  const anchor = (tick: Tick) => {
    if (isFirstAtEdge && tick === labelled[0] && scale(tick.value) - x0 < 8) return 'start';
    if (isLastAtEdge && tick === labelled.at(-1) && x1 - scale(tick.value) < 14) return 'end';
    return 'middle';
  };
  return (
    <g>
      <line className="axis" x1={x0} x2={x1} y1={y} y2={y} />
      {ticks.map((tick) => (
        <line
          key={tick.value}
          className="tick"
          x1={scale(tick.value)}
          x2={scale(tick.value)}
          y1={y}
          y2={y + (tick.isMajor ? 7 : 4)}
        />
      ))}
      {labelled.map((tick) => (
        <text key={tick.value} x={scale(tick.value)} y={y + 21} textAnchor={anchor(tick)}>
          {tick.label}
        </text>
      ))}
      {name !== undefined && (
        <text className="quiet" x={x1} y={y + 40} textAnchor="end">
          {name}
        </text>
      )}
    </g>
  );
}

interface LeftAxisProps extends AxisProps {
  x: number;
  y0: number;
  y1: number;
  /** Stands inside at the top left: nothing is ever rotated. */
  name?: ReactNode;
  nameClassName?: string;
  /** Grid lines to this x, where values are read across. */
  gridTo?: number;
  hasLine?: boolean;
}

export function LeftAxis(props: LeftAxisProps) {
  const { ticks, x, y0, y1, name, nameClassName = 'quiet', gridTo, hasLine = true } = props;
  const scale = rounded(props.scale);
  return (
    <g>
      {gridTo !== undefined &&
        ticks
          .filter((tick) => tick.label !== undefined)
          .map((tick) => (
            <line
              key={tick.value}
              className="grid-line"
              x1={x}
              x2={gridTo}
              y1={scale(tick.value)}
              y2={scale(tick.value)}
            />
          ))}
      {hasLine && <line className="axis" x1={x} x2={x} y1={y0} y2={y1} />}
      {hasLine &&
        ticks.map((tick) => (
          <line
            key={tick.value}
            className="tick"
            x1={x - (tick.isMajor ? 7 : 4)}
            x2={x}
            y1={scale(tick.value)}
            y2={scale(tick.value)}
          />
        ))}
      {ticks.map(
        (tick) =>
          tick.label !== undefined && (
            <text key={tick.value} x={x - 10} y={scale(tick.value) + 4} textAnchor="end">
              {tick.label}
            </text>
          ),
      )}
      {name !== undefined && (
        <text className={nameClassName} x={x + 8} y={Math.min(y0, y1) + 18}>
          {name}
        </text>
      )}
    </g>
  );
}

/** M with a lowered J inside a drawing. */
export function JupiterMassText() {
  return (
    <>
      M
      <tspan className="sub" dy="3">
        J
      </tspan>
    </>
  );
}
