import { references as paper } from './references';
import { entries } from './types';

const raw = String.raw;

export const checkWords = entries('checks', {
  'zero-detections': {
    title: 'Zero detections',
    kind: 'quantity',
    definition: raw`The same sample, population, prior and level with every detection set aside. It is what the images alone would have said had nothing been found, and so separates what detections do from what depth does. It is an exercise, not a result: the detections are there.`,
    formulas: [{ tex: raw`k=0`, reads: 'the number of detections is set to zero' }],
    units: 'per cent of stars, or planets per 100 stars',
    source: 'Computed with each run.',
    seeAlso: ['upper-limit', 'detection', 'exercise'],
  },
  influence: {
    title: 'Influence',
    kind: 'quantity',
    definition: raw`How the limit would move without one star, or without one survey whose shared stars are then combined from the rest. A star that moves the limit by more than 20 % is named: the limit then rests on one star.`,
    formulas: [
      {
        tex: raw`I_j=\frac{F_\mathrm{up}(S-\hat C_j)}{F_\mathrm{up}(S)}-1`,
        reads: 'relative change of the limit when star j is left out',
      },
    ],
    units: 'per cent of the limit',
    source: 'Exact, from the posterior without the star; the 20 % is our rule.',
    figure: 'influence',
    seeAlso: ['detection-probability', 'systematics', 'shared-stars'],
  },
  systematics: {
    title: 'What moves the limit',
    kind: 'quantity',
    definition: raw`One assumption changed at a time against the run: all ages at their lower or upper end, distances by their error, another cooling table, the threshold, the eccentricity law, the rule of shared stars. Each row gives the limit and its ratio. Rows are never added in quadrature: they are choices, not random errors.`,
    formulas: [
      {
        tex: raw`r=\frac{F_\mathrm{up}(\text{changed})}{F_\mathrm{up}(\text{run})}`,
        reads: 'ratio of the limit with the change to the limit of the run',
      },
    ],
    units: 'ratio',
    source: 'Our rule: one at a time, sorted by size.',
    seeAlso: ['cooling-model', 'age', 'sweep'],
  },
  sweep: {
    title: 'Limit against a choice',
    kind: 'quantity',
    definition: raw`The limit as a function of an outer cutoff or an index, everything else as in the run. The stored maps do not change, only the weights with which they are averaged.`,
    formulas: [
      {
        tex: raw`F_\mathrm{up}(a_2),\quad F_\mathrm{up}(\beta)`,
        reads: 'the limit against the outer cutoff a2 or the index beta',
      },
    ],
    units: 'per cent of stars, or planets per 100 stars',
    source: 'One pass over the stored maps.',
    seeAlso: ['range', 'index-convention', 'limit-map'],
  },
  'limit-map': {
    title: 'Limit map',
    kind: 'quantity',
    definition: raw`At each mass and semi-major axis: the limit if all companions were there, with nothing found. It shows where data speak. It is no joint statement about all nodes, and where companions were detected it holds for planets unlike those. Hatched nodes are set by the prior.`,
    formulas: [
      {
        tex: raw`F_\mathrm{up}(m,a)\ \text{with}\ S(m,a)=\sum_j C_j(m,a),\ k=0`,
        reads:
          'the limit at each node, with the summed completeness there as exposure and no detection',
      },
    ],
    units: 'per cent of stars, or planets per 100 stars',
    source: 'The uniform-prior limit, node by node.',
    seeAlso: ['depth-of-search', 'set-by-the-prior', 'upper-limit'],
  },
  evidence: {
    title: 'Evidence and Bayes factor',
    kind: 'quantity',
    definition: raw`How well a population predicted what was found, averaged over the rate with its prior. The ratio of two is the Bayes factor. Both need the same data, the same proper prior of the rate, and ranges that hold the detections; the factor depends on the range of the prior, which is stated with it.`,
    formulas: [
      {
        tex: raw`Z=\int p(F)\,e^{-FS}\prod_i F\langle\pi\rangle_i\,dF,\qquad \ln B_{12}=\ln\frac{Z_1}{Z_2}`,
        reads: 'evidence Z and the logarithm of the Bayes factor of populations 1 and 2',
      },
    ],
    units: 'ln B: none',
    source: `${paper.kass1995}; its verbal scale, 2 ln B at 2, 6 and 10, is only quoted with this source.`,
    seeAlso: ['population', 'free-indices', 'prior'],
  },
  'detection-counts': {
    title: 'Number of detections expected',
    kind: 'quantity',
    definition: raw`How many detections a rate predicts for these stars, and how many a repeat would find given what is known. For a fraction the stars differ, so the counts follow the Poisson-binomial law, computed exactly.`,
    formulas: [
      {
        tex: raw`P(K=n)\ \text{of}\ \sum_j \mathrm{Bernoulli}(f\hat C_j)`,
        reads: 'distribution of the number of stars with a detection',
      },
      {
        tex: raw`P(n)=\frac{\Gamma(n+A)}{n!\,\Gamma(A)}\left(\frac{B}{B+S'}\right)^{A}\left(\frac{S'}{B+S'}\right)^{n}`,
        reads:
          'negative binomial prediction for an exposure S prime from a gamma posterior with A and B',
      },
    ],
    units: 'detections',
    source: `Exact convolution over stars; prediction: ${paper.gelman2013}, section 2.6 (from memory).`,
    seeAlso: ['forecast', 'host-fraction-likelihood'],
  },
  forecast: {
    title: 'Forecast',
    kind: 'quantity',
    definition: raw`What planned stars would bring: the expected number of detections at a stated rate or with what is known, and the limit if nothing is found. It rests on curves that nobody has taken yet, is marked as a forecast wherever it stands, and cannot be frozen.`,
    formulas: [
      {
        tex: raw`\mathrm{E}[n]=F\,S',\qquad P(n\ge1)=1-P(0)`,
        reads: 'expected detections from the rate and the planned exposure S prime; chance of any',
      },
    ],
    units: 'detections; per cent of stars',
    source: 'Posterior of the run, extended by the planned stars.',
    figure: 'stars',
    seeAlso: ['stars-needed', 'gain', 'detection-counts'],
  },
  'stars-needed': {
    title: 'Stars needed',
    kind: 'quantity',
    definition: raw`Smallest number of stars like these with which the limit falls to a target, if nothing or a stated number is found.`,
    formulas: [
      {
        tex: raw`N=\left\lceil\frac{P^{-1}(k+1,\mathrm{CL})}{\bar C\,F_\mathrm{target}}\right\rceil`,
        reads: 'stars N from the gamma quantile, the mean completeness and the target',
      },
    ],
    units: 'stars',
    source: 'Inversion of the limit; for the mean number in closed form.',
    figure: 'stars',
    seeAlso: ['forecast', 'upper-limit'],
  },
  gain: {
    title: 'Gain of a planned star',
    kind: 'quantity',
    definition: raw`How much one planned star alone would lower the limit if nothing is found around it. The star with the larger detection probability always gains more, so the best twenty are the first twenty of the order.`,
    formulas: [
      {
        tex: raw`g_j=1-\frac{F_\mathrm{up}(S+\hat C_j)}{F_\mathrm{up}(S)}`,
        reads: 'relative fall of the limit when star j is added',
      },
    ],
    units: 'per cent of the limit',
    source: 'Exact, from the posterior with the star added.',
    seeAlso: ['forecast', 'detection-probability', 'influence'],
  },
  coverage: {
    title: 'Coverage',
    kind: 'quantity',
    definition: raw`Share of invented surveys, at a fixed true rate, whose limit lies above the truth. A credible limit need not cover at each rate as often as its level says; averaged over its own prior it does exactly. The same is asked with a truth from another population.`,
    formulas: [
      {
        tex: raw`c(F)=\sum_k P(k\mid F)\;\mathbf 1\!\left[F_\mathrm{up}(k)\ge F\right]`,
        reads:
          'coverage at a true rate F: probability of all counts k whose limit lies at or above F',
      },
    ],
    units: 'per cent of surveys',
    source: 'Exact sum; a simulated study must agree within four standard errors.',
    figure: 'coverage',
    seeAlso: ['calibration', 'credible-level', 'jeffreys-prior'],
  },
  calibration: {
    title: 'Calibration',
    kind: 'quantity',
    definition: raw`Surveys like this one are invented from prior and population and analysed as the run was. If the engine is right, the truth is as likely to have any rank among draws from its posterior. The test is attached to the run, and a run that fails it cannot be frozen without a reason.`,
    formulas: [
      {
        tex: raw`\chi^2=\sum_{b=1}^{20}\frac{(n_b-n/20)^2}{n/20},\qquad p\ge0.001`,
        reads:
          'chi-squared of ranks over 20 bins must have a probability of at least one in a thousand',
      },
    ],
    units: 'ranks of 99 draws',
    source: `${paper.talts2018}.`,
    seeAlso: ['coverage', 'posterior', 'frozen'],
  },
  candidate: {
    title: 'Candidate',
    kind: 'thing',
    definition:
      'A point source beside a star as one survey lists it, before or after somebody decided what it is. Its epochs hold the measured positions; each decision is a verdict that is added and never overwritten. An undecided candidate inside the ranges is named beside the limit.',
    formulas: [],
    units: 'none: a thing, not a number',
    source: 'The word of this product.',
    seeAlso: ['companion', 'background', 'undecided-candidates'],
  },
  companion: {
    title: 'Companion',
    kind: 'quantity',
    definition: raw`A candidate that shares the star's motion: bound. Mass follows from its brightness, the age and the cooling model; semi-major axis from its separation, since one separation allows many orbits. Only companions can be detections.`,
    formulas: [
      {
        tex: raw`\ln a=\ln s-\ln\rho`,
        reads: 'semi-major axis a from the projected separation s and the law of rho',
      },
    ],
    units: 'Jupiter masses; AU',
    source: 'Isotropic orientation and random time, semi-major axis flat in its logarithm.',
    seeAlso: ['candidate', 'detection', 'projected-separation'],
  },
  background: {
    title: 'Background source',
    kind: 'quantity',
    definition: raw`A source behind the star, which stays where it is while the star moves across the sky by its proper motion and parallax. All epochs are held against that track and against common proper motion by a $\chi^2$ that allows for the shared error of the first epoch. Orbital motion is not modelled: a companion that moves within the years of observation raises its $\chi^2$.`,
    formulas: [
      {
        tex: raw`\chi^2=\mathbf r^{\mathsf T}\,\mathsf C^{-1}\,\mathbf r`,
        reads:
          'chi-squared of measured minus predicted offsets r with their covariance C, two coordinates an epoch after the first',
      },
    ],
    units: 'none; two degrees of freedom an epoch after the first',
    source: 'Explanatory Supplement to the Astronomical Almanac for the parallax factors.',
    seeAlso: ['candidate', 'companion', 'false-detections'],
  },
  detection: {
    title: 'Detection',
    kind: 'quantity',
    definition: raw`A companion that an analysis counts: vetted, with its best mass and semi-major axis inside the ranges, edges included. Others are listed as outside the population and do not count. One companion found by two surveys counts once; for the host fraction a star with two counts once.`,
    formulas: [
      {
        tex: raw`(m_i,a_i)\in B`,
        reads: 'mass and semi-major axis of the detection lie in the box B',
      },
    ],
    units: 'detections',
    source: 'Our rule for edges; counted once by the match of stars.',
    seeAlso: ['companion', 'range', 'zero-detections'],
  },
});
