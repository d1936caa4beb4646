"""Posterior of a rate by adaptive quadrature of prior times likelihood."""
import numpy as np
from scipy.integrate import quad
from scipy.optimize import brentq

PIECES = 60


def log_density(x, likelihood, completeness, k, prior):
    exposure = completeness.sum()
    law = prior['law']
    log_prior = {
        'uniform': lambda: 0.0,
        'log-uniform': lambda: -np.log(x),
        'gamma': lambda: (prior['shape'] - 1) * np.log(x) - prior['rate'] * x,
        'beta': lambda: (prior['a'] - 1) * np.log(x) + (prior['b'] - 1) * np.log1p(-x),
        'jeffreys': lambda: -0.5 * np.log(x)
        if likelihood == 'mean-number'
        else 0.5 * np.log(np.sum(completeness / (x * (1 - x * completeness)))),
    }[law]()
    if likelihood == 'mean-number':
        return log_prior + k * np.log(x) - x * exposure
    return log_prior + k * np.log(x) + np.sum(np.log1p(-x * completeness[k:]))


def support(likelihood, completeness, k, prior):
    if prior['law'] == 'log-uniform':
        return prior['min'], prior['max']
    if likelihood == 'host-fraction':
        return 0.0, prior.get('max', 1.0)
    shape = k + prior.get('shape', 1.0)
    far = (shape + 80 + 12 * np.sqrt(shape + 80)) / (completeness.sum() + prior.get('rate', 0.0))
    return 0.0, prior.get('max', far)


def summary(row):
    completeness = np.array(row['completeness'])
    question = (row['likelihood'], completeness, row['detections'], row['prior'])
    low, high = support(*question)
    # x = low + (high - low) sin^2(t) takes out the square-root singularities at both ends.
    place = lambda t: low + (high - low) * np.sin(t) ** 2
    slope = lambda t: (high - low) * np.sin(2 * t)
    log_of = lambda t: log_density(place(t), *question) + np.log(slope(t))
    grid = np.linspace(0, np.pi / 2, 4001)[1:-1]
    heights = np.array([log_of(t) for t in grid])
    peak = heights.max()
    seen = grid[heights > peak - 45]
    first = 0.0 if seen[0] == grid[0] else seen[0]
    last = np.pi / 2 if seen[-1] == grid[-1] else seen[-1]
    edges = np.linspace(first, last, PIECES + 1)
    density = lambda t: np.exp(log_of(t) - peak)
    area = lambda a, b, f=density: quad(f, a, b, epsabs=0, epsrel=1e-11, limit=200)[0]
    areas = np.array([area(a, b) for a, b in zip(edges[:-1], edges[1:])])
    cumulative = np.concatenate([[0], np.cumsum(areas)])

    def quantile(p):
        wanted = p * cumulative[-1]
        i = min(np.searchsorted(cumulative, wanted, side='right') - 1, PIECES - 1)
        excess = lambda t: cumulative[i] + area(edges[i], t) - wanted
        return place(brentq(excess, edges[i], edges[i + 1], xtol=1e-15, rtol=1e-14))

    weighted = lambda t: place(t) * density(t)
    mean = sum(area(a, b, weighted) for a, b in zip(edges[:-1], edges[1:])) / cumulative[-1]
    level = row['level']
    return [quantile(level), quantile(0.5 * (1 - level)), quantile(0.5 * (1 + level)), mean]
