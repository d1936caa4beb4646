"""Completeness: the mean of a map by quadrature, and maps by drawing companions."""
import numpy as np
from scipy import special
from scipy.integrate import dblquad
from scipy.interpolate import RegularGridInterpolator


def mean_completeness(row):
    x, y = np.log(row['massMjup']), np.log(row['semiMajorAxisAu'])
    grid = np.array(row['completeness']).reshape(len(x), len(y))
    look = RegularGridInterpolator((x, y), grid)
    m1, m2, a1, a2 = np.log(row['box'])
    alpha, beta = row['massIndex'], row['axisIndex']
    total = (np.exp(alpha * m2) - np.exp(alpha * m1)) / alpha
    total *= (np.exp(beta * a2) - np.exp(beta * a1)) / beta
    law = lambda b, a: look((a, b)) * np.exp(alpha * a + beta * b)
    pieces = lambda nodes, low, high: np.unique(np.clip([*nodes, low, high], max(low, nodes[0]), min(high, nodes[-1])))
    mass, axis = pieces(x, m1, m2), pieces(y, a1, a2)
    inside = 0.0
    for low, high in zip(mass[:-1], mass[1:]):
        for near, far in zip(axis[:-1], axis[1:]):
            inside += dblquad(law, low, high, near, far, epsabs=1e-11, epsrel=1e-10)[0]
    return inside / total


def solve_kepler(mean, e):
    low, high = mean - e, mean + e
    for _ in range(50):
        middle = 0.5 * (low + high)
        over = middle - e * np.sin(middle) > mean
        low, high = np.where(over, low, middle), np.where(over, middle, high)
    return 0.5 * (low + high)


def simulate(row):
    """Draws companions, places them in space, and looks for them: shape [mass, semi-major axis]."""
    random = np.random.default_rng(row['seed'])
    n = row['draws']
    e = random.beta(*row['eccentricity'], n)
    anomaly = solve_kepler(random.uniform(0, 2 * np.pi, n), e)
    node = random.uniform(0, 2 * np.pi, n)
    cos_i = random.uniform(-1, 1, n)
    along, across = np.cos(anomaly) - e, np.sqrt(1 - e * e) * np.sin(anomaly)
    x = along * np.cos(node) - across * np.sin(node)
    y = (along * np.sin(node) + across * np.cos(node)) * cos_i
    rho = np.hypot(x, y)
    lower, median, upper = row['ageMyr']
    z = random.standard_normal(n)
    age = median * np.where(z > 0, upper / median, median / lower) ** z
    distance = row['distancePc'] + row['errorPc'] * random.standard_normal(n)
    table = row['table']
    shape = len(table['massMjup']), len(table['ageMyr'])
    cooling = RegularGridInterpolator(
        (np.log(table['massMjup']), np.log(table['ageMyr'])),
        np.array(table['magnitudes']).reshape(shape),
    )
    log_age = np.clip(np.log(age), *np.log([table['ageMyr'][0], table['ageMyr'][-1]]))
    separation = np.log(row['separationArcsec'])
    values, errors = [], []
    for mass in row['massMjup']:
        absolute = cooling(np.column_stack([np.full(n, np.log(mass)), log_age]))
        contrast = absolute + 5 * np.log10(distance / 10) - row['hostMag']
        for axis in row['semiMajorAxisAu']:
            at = np.log(rho * axis / distance)
            limit = np.interp(at, separation, row['contrastMag'], left=-np.inf, right=-np.inf)
            gain = limit - contrast
            if row['threshold'] == 'smooth':
                signal = 10 ** (0.4 * np.minimum(gain, 25.0))
                seen = np.where(gain > -np.inf, special.ndtr(row['nSigma'] * (signal - 1)), 0.0)
            else:
                seen = (gain >= 0).astype(float)
            covered = np.interp(at, separation, row['coverage'], left=0.0, right=0.0)
            found = random.uniform(size=n) < seen * covered
            p = found.mean()
            values.append(p)
            errors.append(np.sqrt(max(p * (1 - p), 1 / n) / n))
    return {'value': values, 'standardError': errors}
