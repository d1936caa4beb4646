"""Answers questions [{what, rows}] from standard input as JSON, one answer a row.

Written from the formulas alone, with SciPy's quadrature, root finding and random numbers and
Astropy's constants: nothing here follows the project's code.
"""
import json
import sys

import numpy as np
from scipy import special, stats

import completeness
import orbits
import photometry
import posterior


def binomial_interval(k, n, level):
    found = stats.binomtest(int(k), int(n)).proportion_ci(level, method='exact')
    return [found.low, found.high]


def poisson_interval(k, level):
    tail = 0.5 * (1 - level)
    lower = 0.0 if k == 0 else stats.chi2.ppf(tail, 2 * k) / 2
    return [lower, stats.chi2.isf(tail, 2 * k + 2) / 2]


SPREAD = {
    'gamma-lower': special.gammainc,
    'gamma-upper': special.gammaincc,
    'gamma-quantile': lambda p, shape, rate: special.gammaincinv(shape, p) / rate,
    'gamma-quantile-upper': lambda q, shape, rate: special.gammainccinv(shape, q) / rate,
    'beta-lower': lambda x, a, b: special.betainc(a, b, x),
    'beta-quantile': lambda p, a, b: special.betaincinv(a, b, p),
    'log-gamma': special.gammaln,
    'log-beta': special.betaln,
    'normal-density': stats.norm.pdf,
    'normal-lower': special.ndtr,
    'normal-quantile': special.ndtri,
    'error-function-upper': special.erfc,
    'exponential-integral': special.exp1,
    'poisson-at-most': stats.poisson.cdf,
    'binomial-at-most': stats.binom.cdf,
    'binomial-counts': lambda n, p: stats.binom.pmf(np.arange(n + 1), n, p),
    'poisson-interval': poisson_interval,
    'clopper-pearson': binomial_interval,
    'kepler': orbits.kepler,
    'photometry': photometry.photometry,
    'period': photometry.period,
    'planck': photometry.planck,
    'cooled-body': photometry.cooled_body,
}
WHOLE = {
    'posterior': posterior.summary,
    'separation': orbits.separation,
    'constants': photometry.constants,
    'mean-completeness': completeness.mean_completeness,
    'simulated-completeness': completeness.simulate,
}


def answer(what, row):
    value = SPREAD[what](*row) if what in SPREAD else WHOLE[what](row)
    if isinstance(value, dict):
        return {name: np.atleast_1d(numbers).tolist() for name, numbers in value.items()}
    return {'value': np.atleast_1d(value).tolist()}


json.dump(
    [[answer(asked['what'], row) for row in asked['rows']] for asked in json.load(sys.stdin)],
    sys.stdout,
)
