import type { Box } from './map-contours';
import { textWidth } from './text-width';

interface BoundFlagProps {
  x: number;
  /** Top of the flag and of the bar. */
  top: number;
  /** Foot of the bar: the axis. */
  bottom: number;
  /** "<5.8 % (95 %)". */
  text: string;
  /** Right end of the plot: a flag without room hangs to the left. */
  right: number;
  left?: number;
  /** The other of two limits is outlined. */
  isOpen?: boolean;
}

const flagHeight = 26;

function placeFlag({ x, text, right, left = 0 }: Omit<BoundFlagProps, 'top' | 'bottom'>) {
  const width = textWidth(text, 16) + 24;
  const hangsLeft = x + width > right + 4 && x - width > left - 4;
  return { width, flagX: hangsLeft ? x + 1.5 - width : x - 1.5 };
}

/** What the flag and its bar cover, for what must keep clear of them. */
export function flagBoxes(flag: Omit<BoundFlagProps, 'isOpen'>): Box[] {
  const { width, flagX } = placeFlag(flag);
  const { x, top, bottom } = flag;
  return [
    { left: flagX, right: flagX + width, top, bottom: top + flagHeight },
    { left: x - 1.5, right: x + 1.5, top, bottom },
  ];
}

/** The bound: a bar from the axis up and a flag with the limit and its level. */
export function BoundFlag({
  x,
  top,
  bottom,
  text,
  right,
  left = 0,
  isOpen = false,
}: BoundFlagProps) {
  const { width, flagX } = placeFlag({ x, text, right, left });
  const suffix = isOpen ? '-open' : '';
  return (
    <g>
      <rect className={`bar${suffix}`} x={x - 1.5} y={top} width="3" height={bottom - top} />
      <rect className={`flag${suffix}`} x={flagX} y={top} width={width} height={flagHeight} />
      <text className={`flag-text${suffix}`} x={flagX + width / 2} y={top + 18} textAnchor="middle">
        {text}
      </text>
    </g>
  );
}
