import { linearAxis } from '@/lib/numerics/grid';
import { findRoot } from '@/lib/numerics/roots';
import { exponentialIntegral, gammaP, gammaQuantile, logGamma } from '@/lib/numerics/special';
import { along, draw, type HelpDrawing, named, share } from './drawing';

const LEVEL = 0.95;

export function priors(): HelpDrawing {
  const x = along(0.001, 1, true);
  return {
    caption: 'Three priors of a fraction between 0.1 % and 100 %, each with area one.',
    x: {
      name: 'rate, %',
      scale: 'log',
      domain: [0.001, 1],
      ticks: [0.001, 0.01, 0.1, 1],
      times: 100,
    },
    y: { name: 'density', scale: 'log', domain: [0.1, 200], ticks: [0.1, 1, 10, 100] },
    curves: [
      named(
        draw(x, () => 1 / 0.999, 'data'),
        'uniform',
        0.25,
      ),
      named(
        draw(x, (f) => 0.5 / Math.sqrt(f) / (1 - Math.sqrt(0.001)), 'quiet'),
        'Jeffreys, mean number',
        0.3,
      ),
      named(
        draw(x, (f) => 1 / (f * Math.log(1000)), 'dashed'),
        'log-uniform',
        0.18,
      ),
    ],
  };
}

export function floor(): HelpDrawing {
  const x = along(1e-6, 1e-2, true);
  const exposure = 25;
  const limitAt = (lowest: number) => {
    const from = exponentialIntegral(lowest * exposure);
    const all = from - exponentialIntegral(exposure);
    return findRoot((f) => (from - exponentialIntegral(f * exposure)) / all - LEVEL, lowest, 1);
  };
  return {
    caption:
      'Nothing found in an exposure of 25 stars: the 95 % limit against the floor of the prior.',
    x: {
      name: 'floor of the prior',
      scale: 'log',
      domain: [1e-6, 1e-2],
      ticks: [1e-6, 1e-5, 1e-4, 1e-3, 1e-2],
    },
    y: {
      name: 'limit, %',
      scale: 'linear',
      domain: [0, 0.15],
      ticks: [0, 0.05, 0.1, 0.15],
      times: 100,
    },
    curves: [
      named(draw(x, limitAt, 'bound'), 'log-uniform prior', 0.62),
      named(
        draw(x, () => -Math.log(1 - LEVEL * (1 - Math.exp(-exposure))) / exposure, 'dashed'),
        'uniform prior',
        0.14,
      ),
    ],
  };
}

export function posterior(): HelpDrawing {
  const [k, exposure] = [2, 60];
  const x = along(0, 0.16);
  const density = (f: number) =>
    f === 0
      ? 0
      : Math.exp((k + 1) * Math.log(exposure) + k * Math.log(f) - f * exposure - logGamma(k + 1));
  const limit = gammaQuantile(LEVEL, k + 1, exposure);
  return {
    caption:
      'Two detections in an exposure of 60 stars, uniform prior of the mean number: 95 % of the area lies left of the limit.',
    x: {
      name: 'planets per 100 stars',
      scale: 'linear',
      domain: [0, 0.16],
      ticks: [0, 0.04, 0.08, 0.12, 0.16],
      times: 100,
    },
    y: {
      name: 'density per planet per star',
      scale: 'linear',
      domain: [0, 20],
      ticks: [0, 5, 10, 15, 20],
    },
    curves: [draw(x, density, 'data')],
    flag: { at: limit, text: `<${(100 * limit).toPrecision(2)} per 100 (95 %)` },
  };
}

export function influence(): HelpDrawing {
  const exposure = 8;
  const x = along(0, 1);
  const limit = (s: number) => -Math.log(1 - LEVEL * (1 - Math.exp(-s))) / s;
  return {
    caption:
      'Nothing found in an exposure of 8 stars: how far the limit rises when one star is left out.',
    x: { name: 'detection probability of the star', ...share },
    y: {
      name: 'rise of the limit, %',
      scale: 'linear',
      domain: [0, 0.16],
      ticks: [0, 0.05, 0.1, 0.15],
      times: 100,
    },
    curves: [draw(x, (c) => limit(exposure - c) / limit(exposure) - 1, 'data')],
  };
}

export function stars(): HelpDrawing {
  const x = along(10, 1000, true);
  const limit = (k: number) => (n: number) => gammaQuantile(LEVEL, k + 1) / (0.4 * n);
  return {
    caption:
      'Stars with a mean completeness of 40 %: the 95 % limit with none and with two detections.',
    x: { name: 'stars', scale: 'log', domain: [10, 1000], ticks: [10, 100, 1000] },
    y: {
      name: 'planets per 100 stars',
      scale: 'log',
      domain: [0.005, 2],
      ticks: [0.01, 0.1, 1],
      times: 100,
    },
    curves: [
      named(draw(x, limit(0), 'bound'), 'nothing found', 0.44, 'below'),
      named(draw(x, limit(2), 'dashed'), '2 found', 0.5),
    ],
  };
}

/** Share of surveys whose limit lies above the truth: the counts for which it does, in one sum. */
function coverageOf(shape: number, level: number, exposure: number) {
  const limits = Array.from({ length: 40 }, (_, k) => gammaQuantile(level, k + shape) / exposure);
  return (rate: number) => {
    const first = limits.findIndex((limit) => limit >= rate);
    // P(K >= first) of a Poisson count is the lower incomplete gamma function.
    return first <= 0 ? 1 : gammaP(first, rate * exposure);
  };
}

export function coverage(): HelpDrawing {
  const [level, exposure] = [0.9, 8];
  const x = Array.from(linearAxis(0.02, 1, 491));
  return {
    caption:
      'Exposure of 8 stars, limits of 90 %: the uniform prior never covers less often, the Jeffreys prior may.',
    x: {
      name: 'true planets per star',
      scale: 'linear',
      domain: [0, 1],
      ticks: [0, 0.25, 0.5, 0.75, 1],
    },
    y: {
      name: 'surveys with the limit above the truth, %',
      scale: 'linear',
      domain: [0.7, 1],
      ticks: [0.7, 0.8, 0.9, 1],
      times: 100,
    },
    curves: [
      { x: [0, 1], y: [level, level], look: 'quiet' },
      named(draw(x, coverageOf(1, level, exposure), 'data'), 'uniform', 0.3, 'above'),
      named(draw(x, coverageOf(0.5, level, exposure), 'dashed'), 'Jeffreys', 0.2, 'below'),
    ],
  };
}
