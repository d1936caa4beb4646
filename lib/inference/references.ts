/** A paper that a method rests on, as a list of references prints it. */
export interface Reference {
  /** For a sentence: "Garwood 1936". */
  short: string;
  /** BibTeX fields, ready to be set between braces. */
  fields: Readonly<Record<string, string>>;
}

const article = (
  short: string,
  author: string,
  title: string,
  journal: string,
  [year, volume, pages]: [year: number, volume: number, pages: string],
  doi: string,
): Reference => ({
  short,
  fields: {
    author,
    title: `{${title}}`,
    journal,
    year: String(year),
    volume: String(volume),
    pages,
    doi,
  },
});

/** Papers that a run may rest on, each under the key by which texts cite it. */
export const references = {
  Bowler2020: article(
    'Bowler et al. 2020',
    'Bowler, Brendan P. and Blunt, Sarah C. and Nielsen, Eric L.',
    'Population-level Eccentricity Distributions of Imaged Exoplanets and Brown Dwarf Companions: Dynamical Evidence for Distinct Formation Channels',
    'The Astronomical Journal',
    [2020, 159, '63'],
    '10.3847/1538-3881/ab5b11',
  ),
  Burrows2001: article(
    'Burrows et al. 2001',
    'Burrows, Adam and Hubbard, W. B. and Lunine, J. I. and Liebert, James',
    'The theory of brown dwarfs and extrasolar giant planets',
    'Reviews of Modern Physics',
    [2001, 73, '719--765'],
    '10.1103/RevModPhys.73.719',
  ),
  Clopper1934: article(
    'Clopper & Pearson 1934',
    'Clopper, C. J. and Pearson, E. S.',
    'The Use of Confidence or Fiducial Limits Illustrated in the Case of the Binomial',
    'Biometrika',
    [1934, 26, '404--413'],
    '10.1093/biomet/26.4.404',
  ),
  Feldman1998: article(
    'Feldman & Cousins 1998',
    'Feldman, Gary J. and Cousins, Robert D.',
    'Unified approach to the classical statistical analysis of small signals',
    'Physical Review D',
    [1998, 57, '3873--3889'],
    '10.1103/PhysRevD.57.3873',
  ),
  Garwood1936: article(
    'Garwood 1936',
    'Garwood, F.',
    'Fiducial Limits for the Poisson Distribution',
    'Biometrika',
    [1936, 28, '437--442'],
    '10.1093/biomet/28.3-4.437',
  ),
  Gehrels1986: article(
    'Gehrels 1986',
    'Gehrels, Neil',
    'Confidence Limits for Small Numbers of Events in Astrophysical Data',
    'The Astrophysical Journal',
    [1986, 303, '336--346'],
    '10.1086/164079',
  ),
  Holman1999: article(
    'Holman & Wiegert 1999',
    'Holman, Matthew J. and Wiegert, Paul A.',
    'Long-Term Stability of Planets in Binary Systems',
    'The Astronomical Journal',
    [1999, 117, '621--628'],
    '10.1086/300695',
  ),
  JensenClem2018: article(
    'Jensen-Clem et al. 2018',
    'Jensen-Clem, Rebecca and others',
    'A New Standard for Assessing the Performance of High Contrast Imaging Systems',
    'The Astronomical Journal',
    [2018, 155, '19'],
    '10.3847/1538-3881/aa97e4',
  ),
  Kipping2013: article(
    'Kipping 2013',
    'Kipping, David M.',
    'Parametrizing the exoplanet eccentricity distribution with the beta distribution',
    'Monthly Notices of the Royal Astronomical Society: Letters',
    [2013, 434, 'L51--L55'],
    '10.1093/mnrasl/slt075',
  ),
  Kraft1991: article(
    'Kraft et al. 1991',
    'Kraft, Ralph P. and Burrows, David N. and Nousek, John A.',
    'Determination of Confidence Limits for Experiments with Low Numbers of Counts',
    'The Astrophysical Journal',
    [1991, 374, '344--355'],
    '10.1086/170124',
  ),
  Lafreniere2007: article(
    'Lafrenière et al. 2007',
    'Lafreni{\\`e}re, David and others',
    'The Gemini Deep Planet Survey',
    'The Astrophysical Journal',
    [2007, 670, '1367--1390'],
    '10.1086/522826',
  ),
  Mawet2014: article(
    'Mawet et al. 2014',
    'Mawet, Dimitri and others',
    'Fundamental Limitations of High Contrast Imaging Set by Small Sample Statistics',
    'The Astrophysical Journal',
    [2014, 792, '97'],
    '10.1088/0004-637X/792/2/97',
  ),
  Tokunaga2005: article(
    'Tokunaga & Vacca 2005',
    'Tokunaga, A. T. and Vacca, W. D.',
    'The Mauna Kea Observatories Near-Infrared Filter Set. III. Isophotal Wavelengths and Absolute Calibration',
    'Publications of the Astronomical Society of the Pacific',
    [2005, 117, '421--426'],
    '10.1086/429382',
  ),
  Wilson1927: article(
    'Wilson 1927',
    'Wilson, Edwin B.',
    'Probable Inference, the Law of Succession, and Statistical Inference',
    'Journal of the American Statistical Association',
    [1927, 22, '209--212'],
    '10.1080/01621459.1927.10502953',
  ),
} as const satisfies Record<string, Reference>;

export type ReferenceKey = keyof typeof references;
