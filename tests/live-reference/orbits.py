"""Orbits: Kepler's equation by bracketing, projected separation by quadrature over E and e."""
import numpy as np
from scipy import stats
from scipy.integrate import quad
from scipy.optimize import brentq


def kepler(mean, e):
    excess = lambda anomaly: anomaly - e * np.sin(anomaly) - mean
    anomaly = brentq(excess, mean - 1.5, mean + 1.5, xtol=1e-15, rtol=1e-15)
    radius = 1 - e * np.cos(anomaly)
    return [
        anomaly,
        (np.cos(anomaly) - e) / radius,
        np.sqrt(1 - e * e) * np.sin(anomaly) / radius,
    ]


def beyond(x, e):
    """P(rho > x) at one eccentricity: the mean of sqrt(r^2 - x^2) over the eccentric anomaly."""
    if e == 0:
        return np.sqrt(max(0.0, 1 - x * x))
    first = np.arccos(np.clip((1 - x) / e, -1, 1))
    if first >= np.pi:
        return 0.0
    width = np.pi - first
    # E = first + width s^2 takes out the square root at the end.
    root = lambda s: 2 * s * width * np.sqrt(
        max(0.0, (1 - e * np.cos(first + width * s * s)) ** 2 - x * x)
    )
    return quad(root, 0, 1, epsabs=1e-12, epsrel=1e-11, limit=200)[0] / np.pi


def separation(row):
    x, law = row['x'], row['law']
    name = law['law']
    if name == 'circular':
        return 1 - beyond(x, 0.0)
    if name == 'fixed':
        return 1 - beyond(x, law['eccentricity'])
    top = law.get('max', 1.0)
    density = {
        'uniform': lambda e: 1 / top,
        'beta': lambda e: stats.beta.pdf(e, law['alpha'], law['beta']),
        'rayleigh': lambda e: e / law['sigma'] ** 2 * np.exp(-0.5 * (e / law['sigma']) ** 2)
        / -np.expm1(-0.5 / law['sigma'] ** 2),
    }[name]
    kink = abs(1 - x)
    edges = [0.0, kink, top] if 0 < kink < top else [0.0, top]
    mean = 0.0
    for low, high in zip(edges[:-1], edges[1:]):
        # e = low + (high - low) sin^2(t): the ends may be singular.
        scale = high - low
        at = lambda t: low + scale * np.sin(t) ** 2
        mean += quad(
            lambda t: beyond(x, at(t)) * density(at(t)) * scale * np.sin(2 * t),
            0, np.pi / 2, epsabs=1e-10, epsrel=1e-9, limit=200,
        )[0]
    return 1 - mean
