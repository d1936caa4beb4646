import { normalCumulative } from '@/lib/numerics/normal';
import { smallSampleThreshold } from '@/lib/sensitivity';
import { circularSeparationCumulative, fixedSeparationCumulative } from '@/lib/sensitivity/orbits';
import { along, draw, type HelpDrawing, named, share } from './drawing';

/** Completeness between two working angles, circular orbits: the angles are in units of the distance. */
const between = (a: number, distancePc: number) =>
  circularSeparationCumulative((3 * distancePc) / a) -
  circularSeparationCumulative((0.2 * distancePc) / a);

export function contrast(): HelpDrawing {
  const x = along(0.1, 3, true);
  const limit = (theta: number) => 15 - 9 * Math.exp(-theta / 0.28);
  return {
    caption:
      'An invented curve: fainter companions are found farther out. A companion of contrast 12 mag is found to the right of the crossing.',
    x: { name: 'separation, arcsec', scale: 'log', domain: [0.1, 3], ticks: [0.1, 0.2, 0.5, 1, 2] },
    y: { name: 'contrast, mag', scale: 'linear', domain: [16, 6], ticks: [6, 8, 10, 12, 14, 16] },
    curves: [
      named(draw(x, limit, 'data'), 'limit at 5 σ', 0.72),
      named(
        draw(x, () => 12, 'dashed'),
        'companion',
        0.14,
        'below',
      ),
    ],
  };
}

export function completeness(): HelpDrawing {
  const x = along(1, 1000, true);
  return {
    caption: 'Circular orbits, found between 0.2″ and 3″: a nearer star is searched closer in.',
    x: { name: 'semi-major axis, AU', scale: 'log', domain: [1, 1000], ticks: [1, 10, 100, 1000] },
    y: { name: 'completeness', ...share },
    curves: [
      named(
        draw(x, (a) => between(a, 15), 'data'),
        '15 pc',
        0.22,
      ),
      named(
        draw(x, (a) => between(a, 80), 'dashed'),
        '80 pc',
        0.86,
      ),
    ],
  };
}

export function depth(): HelpDrawing {
  const x = along(1, 1000, true);
  const stars = [15, 25, 40, 80];
  const sum = (count: number) => (a: number) =>
    stars.slice(0, count).reduce((total, distance) => total + between(a, distance), 0);
  return {
    caption:
      'Four stars at 15, 25, 40 and 80 pc, each searched between 0.2″ and 3″, added one by one.',
    x: { name: 'semi-major axis, AU', scale: 'log', domain: [1, 1000], ticks: [1, 10, 100, 1000] },
    y: { name: 'stars', scale: 'linear', domain: [0, 4], ticks: [0, 1, 2, 3, 4] },
    curves: [1, 2, 3]
      .map((count) => draw(x, sum(count), 'quiet'))
      .concat(named(draw(x, sum(4), 'data'), 'depth of search', 0.6)),
  };
}

export function threshold(): HelpDrawing {
  const x = along(-1.5, 1.5);
  return {
    caption:
      'Threshold of 5 σ. At the limit a companion is found half the time by the smooth rule.',
    x: {
      name: 'magnitudes fainter than the limit',
      scale: 'linear',
      domain: [-1.5, 1.5],
      ticks: [-1, 0, 1],
    },
    y: { name: 'probability', ...share },
    curves: [
      { x: [-1.5, 0, 0, 1.5], y: [1, 1, 0, 0], look: 'dashed' },
      named(
        draw(x, (d) => normalCumulative(5 * (10 ** (-0.4 * d) - 1)), 'data'),
        'smooth',
        0.64,
      ),
    ],
  };
}

export function smallSample(): HelpDrawing {
  const x = along(4, 100, true);
  return {
    caption: 'How many times its noise a source must exceed to be as rare a false alarm as 5 σ.',
    x: { name: 'resolution elements', scale: 'log', domain: [4, 100], ticks: [4, 10, 20, 50, 100] },
    y: { name: 'threshold', scale: 'log', domain: [4, 2000], ticks: [5, 20, 100, 500, 2000] },
    curves: [
      named(
        draw(x, (n) => smallSampleThreshold(n, 5), 'data'),
        'few elements',
        0.3,
      ),
      named(
        draw(x, () => 5, 'dashed'),
        '5 σ',
        0.12,
      ),
    ],
  };
}

export function projection(): HelpDrawing {
  const x = along(0, 1.5);
  return {
    caption:
      'Share of the time that an orbit of random orientation is seen within a separation, circular and at eccentricity 0.5.',
    x: {
      name: 'projected separation over semi-major axis',
      scale: 'linear',
      domain: [0, 1.5],
      ticks: [0, 0.5, 1, 1.5],
    },
    y: { name: 'probability', ...share },
    curves: [
      named(draw(x, circularSeparationCumulative, 'data'), 'circular', 0.52, 'below'),
      named(
        draw(x, (rho) => fixedSeparationCumulative(rho, 0.5), 'dashed'),
        'e = 0.5',
        0.86,
        'below',
      ),
    ],
  };
}

/** Density per logarithm of a power law on 2 to 30, index per logarithm. */
const powerDensity = (index: number) => (m: number) =>
  (index * m ** index) / (30 ** index - 2 ** index);

export function population(): HelpDrawing {
  const x = along(2, 30, true);
  return {
    caption:
      'Masses of 2 to 30 Jupiters: density per logarithm for three indices, each with area one.',
    x: { name: 'mass, Jupiters', scale: 'log', domain: [2, 30], ticks: [2, 5, 10, 20, 30] },
    y: { name: 'density', scale: 'linear', domain: [0, 1.2], ticks: [0, 0.4, 0.8, 1.2] },
    curves: [
      named(draw(x, powerDensity(-1), 'data'), 'M to the −2', 0.1),
      named(draw(x, powerDensity(-0.3), 'quiet'), 'M to the −1.3', 0.4),
      named(draw(x, powerDensity(0.5), 'dashed'), 'M to the −0.5', 0.86),
    ],
  };
}

export function index(): HelpDrawing {
  const x = along(1, 30, true);
  return {
    caption: 'One law in two conventions: the index per mass is −1.3, per logarithm of mass −0.3.',
    x: { name: 'mass, Jupiters', scale: 'log', domain: [1, 30], ticks: [1, 2, 5, 10, 20] },
    y: { name: 'density', scale: 'log', domain: [0.01, 2], ticks: [0.01, 0.1, 1] },
    curves: [
      named(
        draw(x, (m) => m ** -1.3, 'data'),
        'per mass',
        0.6,
        'below',
      ),
      named(
        draw(x, (m) => m ** -0.3, 'dashed'),
        'per logarithm',
        0.6,
      ),
    ],
  };
}
