import { references as paper } from './references';
import { entries } from './types';

const raw = String.raw;

export const sensitivityWords = entries('sensitivity', {
  completeness: {
    title: 'Completeness',
    kind: 'quantity',
    definition: raw`Probability of detection if the star had a companion of mass $m$ at semi-major axis $a$. The orbit's orientation and phase are random, its projected separation is averaged over them, and an uncertain age or distance is averaged over its law. It describes the vetted list: where candidates were never followed up, coverage is 0.`,
    formulas: [
      {
        tex: raw`C_j(m,a)=\int c(\theta)\,p(\theta;\Delta m_p)\,dF_\rho(\theta d/a)`,
        reads:
          'completeness of star j: coverage c times detection probability p at separation theta, over the law of the projected separation rho in units of a, d the distance',
      },
    ],
    units: 'probability, 0 to 1',
    source: `Computed as differences of the distribution function over bins, without random numbers; the detection probability follows ${paper.jensenClem2018}.`,
    figure: 'completeness',
    seeAlso: ['completeness-map', 'threshold', 'projected-separation', 'detection-probability'],
  },
  'completeness-map': {
    title: 'Completeness map',
    kind: 'quantity',
    definition: raw`The completeness of one star on nodes of planet mass and semi-major axis. Between nodes it is read bilinearly in the logarithms of both; outside its nodes it is 0 and never extrapolated, and the share of a population that lies there is told with the limit. A map may also be uploaded, as values at nodes or means over cells.`,
    formulas: [
      {
        tex: raw`C_j(m_i,a_k)\in[0,1]`,
        reads: 'a value between 0 and 1 at each node of mass and semi-major axis',
      },
    ],
    units: 'probability over Jupiter masses and AU',
    source: 'Stored to 1 part in 65 535; interpolation in both logarithms is our rule.',
    seeAlso: ['completeness', 'depth-of-search', 'share-outside'],
  },
  'depth-of-search': {
    title: 'Depth of search',
    kind: 'quantity',
    definition: raw`Sum of the maps over stars: how many stars' worth of sensitivity there is for a planet of one mass and semi-major axis. Stacked by survey, each star stands with the survey that lists it, and a star in several surveys counts once.`,
    formulas: [
      {
        tex: raw`D(m,a)=\sum_j C_j(m,a)`,
        reads: 'depth of search: sum over stars j of the completeness',
      },
    ],
    units: 'stars',
    source: 'Sum of the maps as stored with the run.',
    figure: 'depth',
    seeAlso: ['completeness-map', 'exposure', 'limit-map'],
  },
  'detection-probability': {
    title: 'Detection probability of a star',
    kind: 'quantity',
    definition: raw`The star's map averaged over the population inside the ranges: the probability that a planet drawn from this population around this star would have been detected. It changes with the population and the ranges, not only with the images.`,
    formulas: [
      {
        tex: raw`\hat C_j=\iint_B C_j(m,a)\,\pi(m,a)\;d\ln m\,d\ln a`,
        reads:
          'mean completeness of star j: its map times the density pi of the population over the box B',
      },
    ],
    units: 'probability, 0 to 1',
    source:
      'Integral of the bilinear interpolant against the population, in closed form for power laws.',
    seeAlso: ['exposure', 'population', 'influence'],
  },
  exposure: {
    title: 'Exposure',
    kind: 'quantity',
    definition: raw`Sum of the detection probabilities of all stars: as many stars as would do if each were searched perfectly. A limit depends on the images through it alone for the mean number, and almost so for the host fraction.`,
    formulas: [
      { tex: raw`S=\sum_j \hat C_j`, reads: 'exposure S: sum over stars of the mean completeness' },
    ],
    units: 'stars',
    source: 'The sufficient statistic of the Poisson likelihood.',
    seeAlso: ['detection-probability', 'depth-of-search', 'poisson-likelihood'],
  },
  threshold: {
    title: 'Detection threshold',
    kind: 'quantity',
    definition: raw`How a companion's contrast is held against the curve. Hard: detected where the curve is at least as deep. Smooth: Gaussian noise with a threshold of $n$ times its $\sigma$, so that a companion exactly at the limit is detected half the time.`,
    formulas: [
      {
        tex: raw`p=\Phi\!\left(n\left[10^{\,0.4(\Delta m_{\lim}-\Delta m_p)}-1\right]\right)`,
        reads:
          'detection probability: normal distribution function of n times the signal over its limit minus one',
      },
    ],
    units: 'probability, 0 to 1',
    source: `True-positive fraction as in ${paper.jensenClem2018}.`,
    figure: 'threshold',
    seeAlso: ['contrast-curve', 'small-sample', 'completeness'],
  },
  'small-sample': {
    title: 'n sigma near the star',
    kind: 'quantity',
    definition: raw`Near the star few resolution elements fit on a ring, and noise that is known from few of them exceeds $n\sigma$ more often than Gaussian noise does. Where a survey asks for it, the threshold is raised until a false alarm is as rare as $n\sigma$ promises: at $N=6$ elements 5 σ becomes 62 times the noise. $N$ is not rounded, and fewer than three elements detect nothing.`,
    formulas: [
      {
        tex: raw`N=\frac{2\pi\theta}{\mathrm{FWHM}},\qquad \tau=t_{N-2}^{-1}\!\left(\Phi(n)\right)\sqrt{1+\frac{1}{N-1}}`,
        reads:
          'N resolution elements at separation theta; threshold tau from the Student quantile with N minus 2 degrees of freedom at the tail of n sigma',
      },
      {
        tex: raw`\mathrm{FPF}=1-\Phi(n)`,
        reads: 'false-positive fraction of n sigma for Gaussian noise',
      },
    ],
    units: 'multiples of the noise',
    source: `${paper.mawet2014}, section 3.4; N as a real number is our rule.`,
    figure: 'small-sample',
    seeAlso: ['threshold', 'contrast-curve'],
  },
  'projected-separation': {
    title: 'Projected separation',
    kind: 'quantity',
    definition: raw`What the sky shows of an orbit: its separation across the line of sight. For isotropic orientation and random time the direction to the companion is isotropic whatever the eccentricity, so the projected separation in units of the semi-major axis has one law for each law of eccentricity. For circular orbits half of all are seen beyond 0.87 of the semi-major axis.`,
    formulas: [
      {
        tex: raw`\rho=\frac{r}{a}\sqrt{1-u^2},\qquad P(\rho<x)=1-\sqrt{1-x^2}\ \ (e=0)`,
        reads:
          'rho: radius over semi-major axis times the sine of the angle to the line of sight, u uniform in 0 to 1; distribution for circular orbits',
      },
    ],
    units: 'AU, or units of the semi-major axis',
    source: `Geometry; Kepler's equation is held against the examples of ${paper.meeus1998}.`,
    figure: 'projection',
    seeAlso: ['eccentricity', 'completeness', 'range'],
  },
  eccentricity: {
    title: 'Eccentricity law',
    kind: 'quantity',
    definition: raw`How eccentric orbits are taken to be when the projected separation is averaged: circular, fixed, uniform, a beta law or a truncated Rayleigh law. It moves the limit little inside the ranges and more at their edges.`,
    formulas: [
      {
        tex: raw`\langle\rho\rangle=\frac{\pi}{4}\left(1+\tfrac12\langle e^2\rangle\right)`,
        reads: 'mean projected separation: pi over 4 times one plus half the mean of e squared',
      },
    ],
    units: 'none',
    source: `Presets: beta(0.867, 3.03) of ${paper.kipping2013} for radial-velocity planets; beta(30, 200) of ${paper.bowler2020} for imaged planets (numbers from memory).`,
    seeAlso: ['projected-separation', 'systematics'],
  },
  'cooling-model': {
    title: 'Cooling model',
    kind: 'quantity',
    definition: raw`Relation from mass and age to absolute magnitude. A table is read bilinearly in the logarithms of mass and age and never extrapolated; a mass outside it counts as undetectable, an age outside it is refused. Detection is evaluated from mass to magnitude and never backwards, because magnitudes are not monotonic in mass where deuterium burns. The built-in law is approximate and marked so: below 5 Jupiter masses it is too faint, and for Jupiter itself it gives 36 K where 107 K follow from the measured internal flux.`,
    formulas: [
      {
        tex: raw`T_\mathrm{eff}=1550\,\mathrm{K}\left(\frac{1000\,\mathrm{Myr}}{t}\right)^{0.32}\!\left(\frac{m}{0.05\,M_\odot}\right)^{0.83}`,
        reads: 'effective temperature of the built-in law from age t and mass m',
      },
    ],
    units: 'mag over Jupiter masses and Myr',
    source: `Built-in law: ${paper.burrows2001}; bands: ${paper.tokunaga2005}; flux of Jupiter: ${paper.li2018}. No publication should rest on the built-in law.`,
    seeAlso: ['cooling-start', 'age', 'systematics'],
  },
  'cooling-start': {
    title: 'Hot, warm and cold start',
    kind: 'thing',
    definition:
      'How much of the heat of its formation a planet keeps: a hot start keeps all and begins bright, a cold start has radiated most of it and begins faint, warm lies between. The younger the star, the more the choice matters; after some hundred million years it is forgotten. A table carries the start that whoever imported it stated, or “unstated”.',
    formulas: [],
    units: 'initial entropy, as stated by the table',
    source: 'Stated by each cooling table; the built-in law is a hot start.',
    seeAlso: ['cooling-model', 'systematics'],
  },
  'shared-stars': {
    title: 'Rule of shared stars',
    kind: 'quantity',
    definition: raw`How the maps of a star in several surveys become one. Same position: the companion did not move between epochs, each survey had its own chance. Deepest: the larger value at each node, always a lower bound. Independent: as if positions were unrelated, which is optimistic because the inclination is shared. Whatever the correlation, the truth lies between the two bounds, and the limit at both ends is the bracket of the choice.`,
    formulas: [
      {
        tex: raw`p_\mathrm{eff}=1-\prod_s\left(1-c_s\,p_s\right)`,
        reads:
          'same position: one minus the product over surveys s of missing it, inside the integral over separation',
      },
      {
        tex: raw`\max_s C_s\le C\le \min\!\Big(1,\sum_s C_s\Big)`,
        reads: 'bounds that hold whatever the correlation',
      },
    ],
    units: 'probability, 0 to 1',
    source: `Bounds: ${paper.frechet1935} (from memory). Which rule stands by default is our rule.`,
    seeAlso: ['star', 'entry', 'completeness-map'],
  },
  'share-outside': {
    title: 'Share outside the maps',
    kind: 'quantity',
    definition: raw`Part of the population that lies beyond the nodes of the maps, or where a cooling table has no value. Nothing counts as detectable there, so the limit stays valid and gets weaker; above 20 % a large part of the limit rests on that, and the statement says so.`,
    formulas: [
      {
        tex: raw`\epsilon=1-\iint_{B\,\cap\,\text{maps}}\pi\;d\ln m\,d\ln a`,
        reads: 'share epsilon of the population pi that lies in the box B but beyond the maps',
      },
    ],
    units: 'per cent of the population',
    source: 'Our rule: zero outside, never extrapolated, always told.',
    seeAlso: ['completeness-map', 'range', 'population'],
  },
});
