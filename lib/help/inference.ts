import { references as paper } from './references';
import { entries } from './types';

const raw = String.raw;

export const inferenceWords = entries('inference', {
  likelihood: {
    title: 'Likelihood',
    kind: 'quantity',
    definition: raw`How probable what was found is, as a function of the rate. Two are offered and ask two questions: the mean number of planets per star, where several planets of one star each count, and the fraction of stars that host at least one. The shown name says which.`,
    formulas: [
      {
        tex: raw`L(F)\propto F^k e^{-FS}`,
        reads: 'mean number: F to the number of detections k times e to the minus F S',
      },
      {
        tex: raw`L(f)=\prod_{\mathrm{det}} f\,\hat C_j\prod_{\mathrm{others}}\left(1-f\,\hat C_j\right)`,
        reads: 'host fraction: product over stars with and without a detection',
      },
    ],
    units: 'none',
    source: `Poisson and Bernoulli; the second as in ${paper.lafreniere2007}.`,
    seeAlso: ['poisson-likelihood', 'host-fraction-likelihood', 'posterior'],
  },
  'poisson-likelihood': {
    title: 'Mean-number likelihood',
    kind: 'quantity',
    definition: raw`Detections as a Poisson count with mean rate times exposure. Only the number of detections inside the ranges and the exposure enter.`,
    formulas: [
      {
        tex: raw`L(F)\propto F^k e^{-FS}`,
        reads: 'F to the number of detections k, times e to the minus F times the exposure S',
      },
    ],
    units: 'F in planets per star',
    source: `Poisson with a known exposure: ${paper.gelman2013}, chapter 2.`,
    seeAlso: ['occurrence-rate', 'exposure', 'false-detections'],
  },
  'host-fraction-likelihood': {
    title: 'Host-fraction likelihood',
    kind: 'quantity',
    definition: raw`One trial for each star: it either hosts a detected planet or it does not. A star with two detections inside the ranges counts once. The completeness of detected stars drops out, since it does not depend on $f$; a detection where the map says nothing can be seen is refused.`,
    formulas: [
      {
        tex: raw`L(f)=\prod_{\mathrm{det}} f\,\hat C_j\prod_{\mathrm{others}}\left(1-f\,\hat C_j\right)`,
        reads:
          'product of f times mean completeness over stars with a detection, and one minus it over the others',
      },
    ],
    units: 'f as a fraction of stars',
    source: `${paper.lafreniere2007}.`,
    seeAlso: ['host-fraction', 'detection-probability', 'classical-limit'],
  },
  prior: {
    title: 'Prior of the rate',
    kind: 'quantity',
    definition: raw`What is held of the rate before these data: a density with a range, stated with every limit. Uniform, uniform in the logarithm, Jeffreys, gamma or beta, or an earlier posterior as a table. Where the limit comes close to the prior's own quantile it is set by the prior and not by the data, and says so.`,
    formulas: [
      {
        tex: raw`p(F\mid\text{data})=\frac{L(F)\,p(F)}{\int L\,p\;dF}`,
        reads: 'posterior: likelihood times prior, normalised',
      },
    ],
    units: 'density per unit of the rate',
    source: 'Normalised on its support; the density is exported with the result.',
    figure: 'priors',
    seeAlso: ['uniform-prior', 'log-uniform-prior', 'jeffreys-prior', 'set-by-the-prior'],
  },
  'uniform-prior': {
    title: 'Uniform prior',
    kind: 'quantity',
    definition: raw`Every rate from 0 to an upper end is held equally likely. For a fraction the end is 1; for the mean number it is stated, by default 1. With nothing found and many stars the 95 % limit is close to $3/S$.`,
    formulas: [
      {
        tex: raw`F_\mathrm{up}=-\frac1S\ln\!\left[1-\mathrm{CL}\left(1-e^{-F_{\max}S}\right)\right]\quad(k=0)`,
        reads: 'upper limit without detections at credible level CL, prior up to F max, exposure S',
      },
    ],
    units: 'planets per star, or fraction of stars',
    source: 'Closed form of the posterior at zero detections.',
    seeAlso: ['prior', 'upper-limit', 'exposure'],
  },
  'log-uniform-prior': {
    title: 'Log-uniform prior and its floor',
    kind: 'quantity',
    definition: raw`Every factor in the rate is held equally likely. With nothing found the posterior would pile up at zero, so a floor is required, and the limit follows the floor as much as the data: at an exposure of 25 stars the 95 % limit is 4.8 % with a floor of $10^{-3}$ and 2.2 % with $10^{-6}$. The limit at a tenth of the floor always stands beside it.`,
    formulas: [
      {
        tex: raw`P(F<x)=\frac{E_1(F_{\min}S)-E_1(xS)}{E_1(F_{\min}S)-E_1(F_{\max}S)}\quad(k=0)`,
        reads: 'probability below x from the exponential integral E1 at floor, x and upper end',
      },
    ],
    units: 'planets per star, or fraction of stars',
    source:
      'Closed form; the numbers are computed for this page’s example, exposure 25, upper end 1.',
    figure: 'floor',
    seeAlso: ['prior', 'set-by-the-prior'],
  },
  'jeffreys-prior': {
    title: 'Jeffreys prior',
    kind: 'quantity',
    definition: raw`The prior that does not depend on how the rate is written, from the information that the data carry. For the mean number it falls as $F^{-1/2}$; for the fraction it depends on every star's completeness. Its limits may cover less often than they say: at an exposure of 8 and a true rate of 0.2 a 90 % limit lies above the truth in 79.8 % of surveys.`,
    formulas: [
      {
        tex: raw`p(F)\propto F^{-1/2},\qquad p(f)\propto\sqrt{\sum_j\frac{\hat C_j}{f\,(1-f\hat C_j)}}`,
        reads: 'Jeffreys prior of the mean number and of the fraction',
      },
    ],
    units: 'density per unit of the rate',
    source: `${paper.jeffreys1946}.`,
    seeAlso: ['prior', 'coverage'],
  },
  'other-priors': {
    title: 'Gamma, beta and tabulated priors',
    kind: 'quantity',
    definition: raw`A gamma prior of the mean number acts like $A-1$ detections in an exposure of $B$ stars seen before; a beta prior does the same for a fraction. A tabulated prior is an earlier posterior, taken straight between its points; the two data sets must share no star.`,
    formulas: [
      {
        tex: raw`p(F)\propto F^{A-1}e^{-BF}\;\to\;\Gamma(A+k,\,B+S)`,
        reads:
          'gamma prior with shape A and rate B becomes a gamma posterior with k detections and exposure S added',
      },
      { tex: raw`p(f)\propto f^{A-1}(1-f)^{B-1}`, reads: 'beta prior of the fraction' },
    ],
    units: 'A none; B in stars',
    source: `${paper.gelman2013}, chapter 2.`,
    seeAlso: ['prior', 'posterior'],
  },
  'set-by-the-prior': {
    title: 'Set by the prior',
    kind: 'quantity',
    definition: raw`A limit that lies within a tenth of what the prior alone would give. It says more about the chosen upper end than about the images, and is marked wherever it appears.`,
    formulas: [
      {
        tex: raw`F_\mathrm{up} > 0.9\;\mathrm{CL}\;F_{\max}`,
        reads: 'the limit exceeds nine tenths of the level times the upper end of the prior',
      },
    ],
    units: 'none',
    source: 'Our rule.',
    seeAlso: ['prior', 'upper-limit', 'limit-map'],
  },
  posterior: {
    title: 'Posterior',
    kind: 'quantity',
    definition: raw`What is held of the rate after these data: likelihood times prior, normalised. Its quantile at the credible level is the upper limit. It is computed by integration, without random numbers.`,
    formulas: [
      {
        tex: raw`p(F\mid k,S)\propto p(F)\,F^k e^{-FS}`,
        reads: 'posterior of the mean number: prior times F to the k times e to the minus F S',
      },
    ],
    units: 'density per unit of the rate',
    source: 'Bayes’ theorem; relative error of limits below 1e-6.',
    figure: 'posterior',
    seeAlso: ['prior', 'upper-limit', 'credible-interval'],
  },
  'credible-level': {
    title: 'Credible level',
    kind: 'quantity',
    definition: raw`Probability, given these data, prior and population, that the rate lies below the upper limit. It is a statement about the rate, not about repeated surveys; how often such limits would cover a true rate is asked by calibration. It is never called confidence.`,
    formulas: [
      {
        tex: raw`P(F<F_\mathrm{up}\mid\text{data})=\mathrm{CL}`,
        reads: 'probability that F lies below the limit equals the level',
      },
    ],
    units: 'per cent; a fraction in files',
    source: 'Definition.',
    seeAlso: ['upper-limit', 'coverage', 'posterior'],
  },
  'upper-limit': {
    title: 'Upper limit',
    kind: 'quantity',
    definition: raw`The rate below which the posterior holds the credible level. It is shown as a sentence with its level, prior, population, ranges, sample and counting rule, because it means nothing without them. With detections an interval stands beside it.`,
    formulas: [
      {
        tex: raw`\int_0^{F_\mathrm{up}} p(F\mid\text{data})\,dF=\mathrm{CL}`,
        reads: 'the posterior integrated from zero to the limit equals the level',
      },
    ],
    units: 'per cent of stars, or planets per 100 stars',
    source:
      'Quantile of the posterior by root finding, to a relative 1e-6; two digits on screen, all in files.',
    figure: 'posterior',
    seeAlso: ['credible-level', 'posterior', 'statement', 'classical-limit'],
  },
  'credible-interval': {
    title: 'Intervals',
    kind: 'quantity',
    definition: raw`Equal-tailed: as much probability below as above. Highest density: the shortest; it depends on whether the rate or its logarithm is measured, here the rate itself. If the density falls from the lower edge, the shortest interval starts there. Screens and the methods paragraph quote the equal-tailed one, and only where something was counted; files hold both.`,
    formulas: [
      {
        tex: raw`P(F<F_1)=P(F>F_2)=\tfrac{1-\mathrm{CL}}2`,
        reads: 'equal-tailed: the same probability below F1 and above F2',
      },
    ],
    units: 'per cent of stars, or planets per 100 stars',
    source: 'Box & Tiao 1973, Bayesian Inference in Statistical Analysis, section 2.8.',
    seeAlso: ['posterior', 'upper-limit'],
  },
  'classical-limit': {
    title: 'Frequentist limits beside',
    kind: 'quantity',
    definition: raw`Limits of the same data that use no prior, shown beside the credible ones and never instead. They promise that, whatever the true rate, at least the stated share of repeated surveys gives a limit above it. For the mean number this is the limit of Garwood; for the fraction it inverts the exact distribution of the number of detections and equals Clopper and Pearson's where every star was searched perfectly. Wilson's is approximate, offered for plain counts only.`,
    formulas: [
      {
        tex: raw`F_\mathrm{up}=\frac1S\,P^{-1}(k+1,\,\mathrm{CL})`,
        reads: 'quantile of the gamma law with shape k plus 1 over the exposure S',
      },
      {
        tex: raw`P(K\le k\mid f_\mathrm{up})=1-\mathrm{CL}`,
        reads: 'the fraction at which k or fewer detections have probability one minus the level',
      },
    ],
    units: 'per cent of stars, or planets per 100 stars',
    source: `${paper.garwood1936}; ${paper.gehrels1986}; ${paper.clopper1934}; ${paper.wilson1927}.`,
    seeAlso: ['feldman-cousins', 'coverage', 'upper-limit'],
  },
  'feldman-cousins': {
    title: 'Feldman–Cousins interval',
    kind: 'quantity',
    definition: raw`A frequentist interval that turns by itself from an upper limit into two sides, for a count with a known background. Counts are taken into the interval by falling likelihood ratio. The upper end is made to not increase with the background, as in the paper.`,
    formulas: [
      {
        tex: raw`R(n)=\frac{P(n\mid\mu+b)}{P\big(n\mid \max(0,n-b)+b\big)}`,
        reads: 'ratio by which counts n are ordered, mu the signal, b the background',
      },
    ],
    units: 'planets per 100 stars, after division by the exposure',
    source: `${paper.feldman1998}, sections III and IV B.`,
    seeAlso: ['classical-limit', 'false-detections'],
  },
  'false-detections': {
    title: 'Expected false detections',
    kind: 'quantity',
    definition: raw`Known mean number $b$ of false detections among those counted. It weakens what a detection says. Only for the mean number; where the candidates themselves were vetted it is 0.`,
    formulas: [
      {
        tex: raw`L(F)\propto e^{-FS}\,(FS+b)^n`,
        reads: 'likelihood with n counted detections of which b are expected to be false',
      },
    ],
    units: 'detections',
    source: `${paper.kraft1991}.`,
    seeAlso: ['poisson-likelihood', 'undecided-candidates', 'feldman-cousins'],
  },
  'undecided-candidates': {
    title: 'Candidates without an answer',
    kind: 'quantity',
    definition: raw`A candidate that nobody settled may be set aside or counted with the probability $r$ that vetting gave it. Fixed: the posterior is the average over which of them are real. Rate-dependent: $r$ was quoted at a reference rate and follows the rate.`,
    formulas: [
      {
        tex: raw`p(F)=\sum_z w_z\,p(F\mid z),\qquad w_z=\prod_i r_i^{z_i}(1-r_i)^{1-z_i}`,
        reads: 'average of posteriors over the choices z of which candidates i are real',
      },
      {
        tex: raw`\prod_i\left[(1-r_i)+r_i\,F/F_0\right]`,
        reads: 'rate-dependent: one factor a candidate, F0 the reference rate',
      },
    ],
    units: 'r as a probability',
    source: 'Mixture over the subsets; at most 12 candidates for the host fraction.',
    seeAlso: ['candidate', 'detection', 'background'],
  },
  'free-indices': {
    title: 'Free indices',
    kind: 'quantity',
    definition: raw`The slopes of the population fitted together with the rate, each with a uniform prior on a stated range. Detections pull the slopes; without any, the answer only says where planets would have been seen. More than 1 % of the probability in the outermost cells means that the range decides, and is told.`,
    formulas: [
      {
        tex: raw`L=e^{-F S(\alpha,\beta)}\prod_i F\,\langle\pi\rangle_i(\alpha,\beta)`,
        reads:
          'likelihood of rate F and indices: exposure at these indices, and the density at each detection averaged over its errors',
      },
    ],
    units: 'indices: none',
    source: `${paper.loredo2004}; ${paper.mandel2019}; samples of detections: ${paper.foremanMackey2014}.`,
    seeAlso: ['index-convention', 'evidence', 'population'],
  },
});
