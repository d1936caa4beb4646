import { formatInterval, formatPercent, formatRate } from '@/lib/quantities/display';
import { flagBoxes } from './bound-flag';
import { valueAt } from './paths';
import { lastCrossing } from './posterior-layout';
import { limitWithLevel, type PosteriorData, savedWords } from './posterior-words';
import { textWidth } from './text-width';

interface PosteriorLabelsProps {
  data: PosteriorData;
  frame: { left: number; right: number; top: number; bottom: number };
  x(rate: number): number;
  y: { (value: number): number; invert(px: number): number };
  flagTop: number;
  isCumulative: boolean;
  isNarrow: boolean;
}

/** Names stand on what they name; those without room on a narrow screen are left to the statement. */
export function PosteriorLabels(props: PosteriorLabelsProps) {
  const { data, isCumulative, isNarrow } = props;
  if (isCumulative) return null;
  return (
    <>
      {data.alternative && <AlternativeName {...props} />}
      {data.second && <PairNames {...props} />}
      {data.saved && <SavedLimit {...props} />}
      {!isNarrow && !data.second && <MedianName {...props} />}
      {!isNarrow && !data.second && <TailName {...props} />}
      {!isNarrow && data.prior && <PriorName {...props} />}
    </>
  );
}

function AlternativeName({ data, frame, x, y, isNarrow }: PosteriorLabelsProps) {
  const other = data.alternative;
  if (!other) return null;
  const level = y.invert(frame.top + 16);
  const crossing = lastCrossing(other.curve, other.curve.density, level);
  const at = x(crossing ?? 0) + 14;
  const limit = limitWithLevel(other.limit, data.credibleLevel, data.quantity);
  const longest = textWidth(isNarrow ? `zero detections: ${limit}` : other.label, 13);
  const start = Math.min(at, frame.right - longest);
  return isNarrow ? (
    <text className="page-halo" x={start} y={frame.top + 14}>
      zero detections: {limit}
    </text>
  ) : (
    <>
      <text className="page-halo" x={start} y={frame.top + 14}>
        {other.label}
      </text>
      <text className="bold page-halo" x={start} y={frame.top + 32}>
        {limit}
      </text>
    </>
  );
}

function SavedLimit({ data, frame, x, y }: PosteriorLabelsProps) {
  const { saved, curve, quantity } = data;
  if (!saved) return null;
  const at = x(saved.limit);
  const goesLeft = saved.limit <= data.limit;
  const room = (goesLeft ? at - frame.left : frame.right - at) - 6;
  const whole = savedWords(saved, quantity);
  const words =
    textWidth(whole, 13) <= room
      ? whole
      : savedWords({ ...saved, hasOtherSettings: false }, quantity);
  // Words to the left of the bar must clear the falling curve under their far end.
  const farEnd = goesLeft ? saved.limit * (1 - (textWidth(words, 13) + 6) / at) : saved.limit;
  const row = Math.min(
    frame.bottom - 120,
    y(Math.max(0, valueAt(curve.rate, curve.density, Math.max(0, farEnd)))) - 12,
  );
  const top = Math.max(row, frame.top + 60);
  return (
    <g>
      <line className="saved-limit" x1={at} x2={at} y1={frame.bottom} y2={top - 10} />
      <text
        className="page-halo"
        x={goesLeft ? at - 6 : at + 6}
        y={top}
        textAnchor={goesLeft ? 'end' : 'start'}
      >
        {words}
      </text>
    </g>
  );
}

function PairNames({ data, frame, x, y, isNarrow }: PosteriorLabelsProps) {
  const { second, curve, name, label } = data;
  if (!second) return null;
  const place = (of: typeof curve, depth: number) =>
    x(lastCrossing(of, of.density, y.invert(frame.top + depth)) ?? 0) + 12;
  const words = (of: string | undefined, what: string | undefined) =>
    isNarrow || !what ? of : `${of}: ${what}`;
  const first = words(name, label);
  const firstAt = frame.top + (frame.bottom - frame.top) * 0.66;
  return (
    <>
      <text className="bold page-halo" x={place(second.curve, 26)} y={frame.top + 30}>
        {words(second.name, second.label)}
      </text>
      {first && (
        <text className="bold page-halo" x={place(curve, firstAt - frame.top)} y={firstAt}>
          {first}
        </text>
      )}
    </>
  );
}

function MedianName({ data, frame, x, y, flagTop }: PosteriorLabelsProps) {
  const { median, interval68, quantity, curve, limit, credibleLevel } = data;
  if (median === undefined) return null;
  const first = `median ${formatRate(median, quantity)}`;
  const second = interval68 ? `68 %: ${formatInterval(...interval68, quantity)}` : '';
  const wide = Math.max(textWidth(first, 13.5), textWidth(second, 13));
  const medianX = x(median);
  const curveY = y(valueAt(curve.rate, curve.density, median));
  // The curve must be left behind at the height of the words, and the bound not yet reached.
  const row = Math.max(curveY - 28, flagTop + 22);
  const clear = x(lastCrossing(curve, curve.density, y.invert(row + 22)) ?? median) + 34;
  const flag = {
    ...{ x: x(limit), top: flagTop, bottom: frame.bottom, left: frame.left, right: frame.right },
    text: `${data.name ? `${data.name} ` : ''}${limitWithLevel(limit, credibleLevel, quantity)}`,
  };
  const [{ left: flagLeft }] = flagBoxes(flag);
  const fitsBefore = clear + wide < Math.min(x(limit), flagLeft) - 10;
  const fitsBehind = x(limit) + 14 + wide <= frame.right;
  // A curve as wide as the plot leaves room below itself alone.
  const fitsBelow =
    medianX + wide < x(limit) - 24 && frame.bottom - curveY > 90 && frame.bottom - flagTop > 130;
  if (!fitsBefore && !fitsBehind && !fitsBelow) return null;
  const at = fitsBefore ? clear : fitsBehind ? x(limit) + 14 : medianX + 10;
  const height = fitsBefore ? row : fitsBehind ? flagTop + 52 : frame.bottom - 40;
  return (
    <g>
      {fitsBefore && (
        <path
          className="leader"
          d={`M${medianX + 2},${Math.max(curveY + 26, height + 10)}L${Math.max(medianX + 2, Math.min(medianX + 40, at - 34))},${height - 4}H${at - 6}`}
        />
      )}
      <text className="bold" x={at} y={height}>
        {first}
      </text>
      <text x={at} y={height + 17}>
        {second}
      </text>
    </g>
  );
}

function TailName({ data, frame, x, y }: PosteriorLabelsProps) {
  const { limit, curve, credibleLevel } = data;
  const at = x(limit) + 14;
  if (at + 140 > frame.right) return null;
  const tailTop = y(valueAt(curve.rate, curve.density, limit));
  const row = Math.min(frame.bottom - 62, tailTop - 30);
  return (
    <g>
      <text className="quiet" x={at} y={row}>
        {formatPercent(1 - credibleLevel, 2).replace('.0', '')} of the probability
      </text>
      <text className="quiet" x={at} y={row + 18}>
        lies above the limit
      </text>
    </g>
  );
}

function PriorName({ data, frame, x, y }: PosteriorLabelsProps) {
  const { prior } = data;
  if (!prior) return null;
  const end = prior.density[prior.density.length - 1];
  if (!Number.isFinite(end)) return null;
  const at = y(end);
  const row = at < frame.top + 14 ? frame.top + 12 : Math.min(at - 8, frame.bottom - 8);
  const words = `prior: ${prior.label}`;
  const bar = x(data.limit);
  const meetsBar = frame.right - textWidth(words, 13) < bar + 6;
  return (
    <text className="quiet page-halo" x={meetsBar ? bar - 8 : frame.right} y={row} textAnchor="end">
      {words}
    </text>
  );
}
