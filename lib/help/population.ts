import { references as paper } from './references';
import { entries } from './types';

const raw = String.raw;

export const populationWords = entries('population', {
  population: {
    title: 'Population',
    kind: 'quantity',
    definition: raw`Shape of the planet distribution inside the ranges: how often each mass and semi-major axis occurs relative to the others, and how that depends on the star. It holds no rate; the rate is what the limit is about. A version of a population never changes.`,
    formulas: [
      {
        tex: raw`\frac{d^2N}{d\ln m\,d\ln a}\propto m^{\alpha'}a^{\beta'},\qquad \iint_B\pi\;d\ln m\,d\ln a=1`,
        reads:
          'power laws per logarithm of mass and semi-major axis, normalised to one over the box B',
      },
    ],
    units: 'density per ln mass and ln semi-major axis',
    source: 'Power law, broken power law, log-normal, mass ratio, table, or listed systems.',
    figure: 'population',
    seeAlso: ['index-convention', 'range', 'mass-ratio'],
  },
  range: {
    title: 'Range',
    kind: 'quantity',
    definition: raw`Lower and upper cutoff in mass and in semi-major axis. A limit speaks only of planets inside; a detection counts only if its best mass and semi-major axis lie inside, edges included. Edges need not be nodes of the maps.`,
    formulas: [
      {
        tex: raw`B=[m_1,m_2]\times[a_1,a_2]`,
        reads: 'the box B of masses and semi-major axes',
      },
    ],
    units: 'Jupiter masses; AU',
    source: 'Chosen with the population, stated with every limit.',
    seeAlso: ['population', 'share-outside', 'sweep'],
  },
  'index-convention': {
    title: 'Indices and their convention',
    kind: 'quantity',
    definition: raw`An index is quoted per unit of mass and of semi-major axis on screen, $dN/dM\propto M^{\alpha}$ and $dN/da\propto a^{\beta}$, and stored per natural logarithm, which is larger by one. A paper may use either, or a period; the form asks which and shows the stored value. A reported $dN/dM\propto M^{-1.31}$ is $-0.31$ per logarithm.`,
    formulas: [
      {
        tex: raw`\alpha_{\ln m}=\alpha+1,\qquad \beta_{\ln a}=\beta+1,\qquad \beta_{\ln a}=\tfrac32\,\beta_{\ln P}`,
        reads:
          'indices per logarithm are the linear ones plus one; from period: three halves of the index per logarithm of period',
      },
    ],
    units: 'none',
    source: `Worked example: ${paper.cumming2008}: α = −0.31 and, from the period, β = 0.39 per logarithm; beyond 3 AU it is an extrapolation.`,
    figure: 'index',
    seeAlso: ['population', 'free-indices', 'sweep'],
  },
  'mass-ratio': {
    title: 'Mass ratio',
    kind: 'quantity',
    definition: raw`A population in the mass of the planet over that of its star. The box in mass then differs from star to star, and each star needs a host mass: stars without one are named and refused.`,
    formulas: [
      {
        tex: raw`q=\frac{m}{M_j},\qquad m=1047.57\,q\,\frac{M_j}{M_\odot}\,M_\mathrm{Jup}`,
        reads:
          'mass ratio q of planet mass m and host mass M of star j; the Sun is 1047.57 Jupiters',
      },
    ],
    units: 'none',
    source: 'Nominal solar and Jovian mass parameters of IAU 2015 resolution B3.',
    seeAlso: ['population', 'host-mass-scaling'],
  },
  'host-mass-scaling': {
    title: 'Scaling with host mass',
    kind: 'quantity',
    definition: raw`The rate may rise or fall with the mass of the host as a power. A fraction of stars must stay below one for every star, so its prior is cut there, and the cut is told with the limit.`,
    formulas: [
      {
        tex: raw`F_j=F\left(\frac{M_j}{M_0}\right)^{\gamma},\qquad f\le\min_j\left(\frac{M_j}{M_0}\right)^{-\gamma}`,
        reads:
          'rate of star j scales with its mass over a reference mass to the power gamma; upper end of f',
      },
    ],
    units: 'none',
    source: 'Our rule for the cut; it keeps every probability at most one.',
    seeAlso: ['mass-ratio', 'prior', 'host-fraction'],
  },
  'host-fraction': {
    title: 'Host fraction f',
    kind: 'quantity',
    definition: raw`Fraction of stars that host at least one planet of the population inside the ranges. It is not the number of planets per star: two planets of one star make that number larger and the fraction not. The two are never converted silently.`,
    formulas: [
      {
        tex: raw`f=1-e^{-F}`,
        reads:
          'fraction f from the mean number F, only if companions are Poisson-distributed over stars',
      },
    ],
    units: 'per cent of stars',
    source: `Likelihood as in ${paper.lafreniere2007}.`,
    seeAlso: ['occurrence-rate', 'host-fraction-likelihood', 'upper-limit'],
  },
  'occurrence-rate': {
    title: 'Occurrence rate F',
    kind: 'quantity',
    definition: raw`Mean number of planets of the population per star inside the ranges, written as planets per 100 stars. It may exceed one per star, and several planets of one star each count.`,
    formulas: [
      {
        tex: raw`F=\frac{\text{planets in }B}{\text{stars}}`,
        reads: 'mean number F of planets in the box B per star',
      },
    ],
    units: 'planets per 100 stars',
    source: 'Poisson likelihood of the mean number.',
    seeAlso: ['host-fraction', 'poisson-likelihood', 'upper-limit'],
  },
  systems: {
    title: 'Listed systems',
    kind: 'quantity',
    definition: raw`A population given as systems, each with a weight and any number of planets; empty systems count. It stands for a simulation of planet formation. The chance to see one planet of a system or more follows from the maps at each planet; the planets of one system are taken as independent in orientation.`,
    formulas: [
      {
        tex: raw`P_j=\sum_y w_y\Big[1-\prod_k\big(1-C_j(m_k,a_k)\big)\Big]`,
        reads: 'probability to see a planet of star j: weights w of systems y, planets k of each',
      },
    ],
    units: 'probability, 0 to 1',
    source: 'Independent orientations within a system are our rule.',
    seeAlso: ['population', 'host-fraction'],
  },
});
