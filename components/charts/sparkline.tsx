import { areaPath, linePath } from './paths';
import { scaleLinear, scaleLog } from './scales';

interface SparklineProps {
  xs: Float64Array;
  ys: Float64Array;
  /** What it shows, in a few words. */
  label: string;
  width?: number;
  height?: number;
  isLogX?: boolean;
  /** Larger values lie lower, as contrast does. */
  isDownward?: boolean;
  /** A common scale where several stand under each other. */
  yMax?: number;
  yMin?: number;
}

/** A curve at the size of a word. */
export function Sparkline(props: SparklineProps) {
  const { xs, ys, label, width = 84, height = 22, isLogX = false, isDownward = false } = props;
  const finite = Array.from(ys).filter(Number.isFinite);
  const low = props.yMin ?? (isDownward ? Math.min(...finite) : 0);
  const high = props.yMax ?? Math.max(...finite);
  const ends: [number, number] = [xs[0], xs[xs.length - 1]];
  const x = isLogX ? scaleLog(ends, [1, width - 1]) : scaleLinear(ends, [1, width - 1]);
  const span: [number, number] = isDownward ? [1.5, height - 1.5] : [height - 1.5, 1.5];
  const y = scaleLinear([low, high === low ? low + 1 : high], span);
  return (
    <svg
      className="chart"
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={label}
    >
      <path className="spark-area" d={areaPath(xs, ys, x, y, isDownward ? 0.5 : height - 0.5)} />
      <path className="spark-line" d={linePath(xs, ys, x, y)} />
    </svg>
  );
}
