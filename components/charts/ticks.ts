import { formatPlain, type RateQuantity } from '@/lib/quantities/display';

export interface Tick {
  value: number;
  /** Undefined for a tick without a number. */
  label?: string;
  isMajor: boolean;
}

/**
 * Ticks at 1 to 9 of each decade; numbers at 1 2 5 10 where there is room, else at the decades.
 *
 * @param min lower end of the axis, > 0
 * @param max upper end of the axis, > min
 * @param lengthPx length of the axis [px]
 */
export function logTicks(min: number, max: number, lengthPx: number): Tick[] {
  const perDecade = lengthPx / Math.log10(max / min);
  const labelled = perDecade >= 86 ? [1, 2, 5] : [1];
  const ticks: Tick[] = [];
  const slack = 1e-9;
  for (let power = Math.floor(Math.log10(min)); power <= Math.ceil(Math.log10(max)); power += 1) {
    for (let digit = 1; digit <= 9; digit += 1) {
      const value = digit * 10 ** power;
      if (value < min * (1 - slack) || value > max * (1 + slack)) continue;
      ticks.push({
        value,
        isMajor: digit === 1,
        label: labelled.includes(digit) ? formatPlain(value) : undefined,
      });
    }
  }
  return labelled.length > 1 ? ticks : withEnds(ticks, min, max, perDecade);
}

/** Where only decades are numbered, the ends are too, if a number fits beside the next one. */
function withEnds(ticks: Tick[], min: number, max: number, perDecade: number): Tick[] {
  const labelled = ticks.filter((tick) => tick.label !== undefined);
  const isFree = (value: number) =>
    labelled.every((tick) => Math.abs(Math.log10(tick.value / value)) * perDecade > 26);
  return ticks.map((tick) =>
    tick.label === undefined &&
    (near(tick.value, min) || near(tick.value, max)) &&
    isFree(tick.value)
      ? { ...tick, label: formatPlain(tick.value) }
      : tick,
  );
}

function near(a: number, b: number): boolean {
  return Math.abs(a / b - 1) < 1e-6;
}

/**
 * Ticks at 1, 2 or 5 times a power of ten, all numbered, with minors between them.
 *
 * @param spacingPx least distance between numbers [px], default 64
 */
export function linearTicks(min: number, max: number, lengthPx: number, spacingPx = 64): Tick[] {
  const wanted = Math.max(1, Math.floor(lengthPx / spacingPx));
  const rough = (max - min) / wanted;
  const power = 10 ** Math.floor(Math.log10(rough));
  const factor = [1, 2, 5, 10].find((candidate) => candidate * power >= rough * 0.999) ?? 10;
  const step = factor * power;
  const half = step / 2;
  const ticks: Tick[] = [];
  const first = Math.ceil(min / half - 1e-9);
  for (let index = first; index * half <= max + half * 1e-6; index += 1) {
    const value = index * half;
    const isMajor = index % 2 === 0;
    ticks.push({ value, isMajor, label: isMajor ? formatPlain(value) : undefined });
  }
  return ticks;
}

/** Ticks that include both ends of a control's range, three to six of them, at round steps. */
export function evenTicks(min: number, max: number): Tick[] {
  const isRound = (value: number, digits: number) =>
    Math.abs(Number(value.toPrecision(digits)) / value - 1) < 1e-6;
  const counts = [4, 3, 5, 2];
  const parts =
    counts.find((count) => isRound((max - min) / count, 1)) ??
    counts.find((count) => isRound((max - min) / count, 2)) ??
    2;
  return Array.from({ length: parts + 1 }, (_, index) => {
    const value = Number((min + ((max - min) * index) / parts).toFixed(9));
    return { value, isMajor: true, label: formatPlain(value) };
  });
}

/** The unit stands behind the last number of an axis and nowhere else. */
export function withUnit(ticks: Tick[], unit: string): Tick[] {
  const last = ticks.map((tick) => tick.label !== undefined).lastIndexOf(true);
  return ticks.map((tick, index) =>
    index === last ? { ...tick, label: `${tick.label}${unit}` } : tick,
  );
}

/** The unit of an axis of rates, whose ticks stand in percent; planets per 100 stars need a name. */
export const withRateUnit = (ticks: Tick[], quantity: RateQuantity): Tick[] =>
  withUnit(ticks, quantity === 'host_fraction' ? '\u2009%' : '');
