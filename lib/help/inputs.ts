import { references as paper } from './references';
import { entries } from './types';
import { uploadLimitWords } from './upload-limits';

const raw = String.raw;

export const inputWords = entries('inputs', {
  star: {
    title: 'Star',
    kind: 'quantity',
    definition: raw`One physical host. It belongs to the collaboration and not to a survey, so that a star which two surveys observed is one trial and counts once. Entries are proposed as one star if they share an identifier, or lie within 5″ of each other at a common epoch after proper motion, with distances within 10 %; a person confirms each pair.`,
    formulas: [
      {
        tex: raw`\Delta\theta < 5''\quad\text{and}\quad \frac{|d_1-d_2|}{\max(d_1,d_2)} < 0.1`,
        reads:
          'two entries are proposed as one star: separation below 5 arcsec, distances d within 10 %',
      },
    ],
    units: 'stars',
    source:
      'Our rule for matching; every star once in the likelihood follows from its product over stars.',
    seeAlso: ['entry', 'shared-stars', 'adopted-values'],
  },
  survey: {
    title: 'Survey',
    kind: 'thing',
    definition:
      'An observing programme with a list of targets, a band and a lead: what was looked at, and how deep. Its files enter checked line by line, all or nothing, and every file that was stored can be traced and taken back.',
    formulas: [],
    units: 'none: a thing, not a number',
    source:
      'The word of this product; the rules of import stand on the pages of each kind of file.',
    seeAlso: ['target', 'entry', 'upload-limits'],
  },
  target: {
    title: 'Target',
    kind: 'thing',
    definition:
      'A star as one survey lists it, with the name, magnitude, distance and age that the survey states. Two surveys may state different values for one star; which of them is used is decided once, in a table of adopted values.',
    formulas: [],
    units: 'distance in pc, age in Myr, magnitudes in mag',
    source: 'The word of this product.',
    seeAlso: ['star', 'entry', 'adopted-values'],
  },
  entry: {
    title: 'Entry',
    kind: 'quantity',
    definition: raw`One pair of star and survey. A sample of $n$ entries holds fewer stars than entries wherever surveys overlap; limits are computed from stars, never from entries. Were every star entered twice, a stated 95 % limit would be a 77.6 % limit.`,
    formulas: [
      {
        tex: raw`1-(1-0.95)^{1/2}=0.776`,
        reads: 'true confidence of a stated 95 % limit when every star is doubled',
      },
    ],
    units: 'entries',
    source: 'Follows from the product of the likelihood over stars.',
    seeAlso: ['star', 'shared-stars', 'host-fraction-likelihood'],
  },
  'contrast-curve': {
    title: 'Contrast curve',
    kind: 'quantity',
    definition: raw`Faintest detectable contrast against angular separation, in magnitudes at $n$ times the noise. Between its points the limit is a straight line in the logarithm of separation; inside the first and outside the last point nothing counts as detected. A curve is taken as given: whoever uploads it states $n$ and whether the few resolution elements near the star were allowed for.`,
    formulas: [
      {
        tex: raw`\Delta m_p = M(m,t) + \mu(d) + A - m_\star`,
        reads:
          'contrast of a companion: absolute magnitude M of mass m at age t, distance modulus mu, extinction A, magnitude of the star',
      },
    ],
    units: 'contrast in mag, separation in arcsec',
    source: 'Interpolation in the logarithm of separation is our rule.',
    figure: 'contrast',
    seeAlso: ['threshold', 'small-sample', 'completeness'],
  },
  'distance-modulus': {
    title: 'Distance and distance modulus',
    kind: 'quantity',
    definition: raw`The distance turns a separation on the sky into astronomical units and an apparent into an absolute magnitude. A parallax $p$ is turned into $1/p$; where its error exceeds a tenth of it that is biased, and the check of a file says so. An uncertain distance is averaged over three nodes.`,
    formulas: [
      {
        tex: raw`\mu = 5\log_{10}\frac{d}{10\,\mathrm{pc}}`,
        reads: 'distance modulus mu of distance d',
      },
      {
        tex: raw`d = \frac{1000\,\mathrm{mas}}{p}\,\mathrm{pc}`,
        reads: 'distance from the parallax p',
      },
    ],
    units: 'pc; mag',
    source: `IAU 2015 resolution B2 for the parsec; ${paper.bailerJones2015}, for the bias of 1/p.`,
    seeAlso: ['adopted-values', 'contrast-curve', 'projected-separation'],
  },
  age: {
    title: 'Age of a star',
    kind: 'quantity',
    definition: raw`Median with its 16 % and 84 % points. Between them the logarithm of age is taken as two halves of a normal law, which has exactly the quoted percentiles. Errors of ages are taken as independent between stars; a shared age, of a moving group, is a systematic that is varied and never averaged away.`,
    formulas: [
      {
        tex: raw`t(z)=\begin{cases} t_0\,(t_+/t_0)^z & z\ge 0\\ t_0\,(t_0/t_-)^z & z<0\end{cases}`,
        reads: 'age at standard normal z from the median t0 and the points t minus and t plus',
      },
    ],
    units: 'Myr',
    source: 'Our rule: the law with the quoted percentiles.',
    seeAlso: ['adopted-values', 'cooling-model', 'systematics'],
  },
  'age-shift': {
    title: 'Age shift',
    kind: 'quantity',
    definition: raw`Every star made younger or older at once, by so many sigma of its own age: what if the ages are wrong together, as a shared scale of ages would make them. Its spread stays. Maps are kept for whole sigma; between two of them the maps are interpolated linearly, which moved limits of an invented survey by at most 0.15 %.`,
    formulas: [
      {
        tex: raw`t_0\;
ightarrow\;t_0\,(t_\pm/t_0)^{|s|}`,
        reads:
          'the median, and with it all of the law, times the ratio of its upper or lower point to the power of the shift s',
      },
    ],
    units: 'σ of each star’s own age',
    source: 'Our rule; interpolation measured against maps made for the shift itself.',
    seeAlso: ['age', 'cooling-model', 'systematics'],
  },
  'adopted-values': {
    title: 'Tables of ages and distances',
    kind: 'thing',
    definition:
      'A numbered set of adopted values, each with its source, that never changes: adopting another value makes a new table. A run names the table it used, so “which ages did you use?” has one answer. Without an adopted value each survey’s own stands for its entry.',
    formulas: [],
    units: 'Myr; pc',
    source: 'The rule of this product: nothing changes under a result.',
    seeAlso: ['age', 'distance-modulus', 'run'],
  },
  'upload-limits': {
    title: 'Limits of uploads',
    kind: 'thing',
    definition: `What one file may hold at most: ${uploadLimitWords()}. A larger file is refused whole with the limit that it met; nothing of it is stored.`,
    formulas: [],
    units: 'as stated',
    source: 'The one table in the code that the readers of files obey; this text is made from it.',
    seeAlso: ['survey', 'contrast-curve', 'completeness-map'],
  },
  sample: {
    title: 'Sample',
    kind: 'thing',
    definition:
      'A saved selection of stars as a question: spectral types, ages, distances, groups. A star that a survey listed because a companion was already known is no fair draw and is left out unless it is kept on purpose. A version of a sample never changes.',
    formulas: [],
    units: 'stars',
    source: 'The word of this product.',
    seeAlso: ['star', 'entry', 'analysis'],
  },
});
