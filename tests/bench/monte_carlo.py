"""Completeness maps by plain Monte Carlo in NumPy: the yardstick of the benchmark.

  python3 monte_carlo.py --survey FILE --maps-out FILE [--draws N]   maps of a survey file
  python3 monte_carlo.py --survey FILE --serve [--draws N]           measured on demand: each line of
      standard input, "FIRST END", answers one line of JSON with the processor time

Each draw is one orbit, age, distance and noise, used in every cell. The cooling relation is inverted
once: by age and magnitude it holds the number of the lightest mass that is bright enough.
"""
import argparse
import json
import sys
import time

import numpy as np

MAGNITUDE_STEP = 0.01
SEPARATION_STEP = 0.002
# Draws at once, so that what belongs to them stays in the cache.
BLOCK = 500
AGES = 241


def solve_kepler(mean, e):
    anomaly = mean + e * np.sin(mean) / (1 - np.sin(mean + e) + np.sin(mean))
    for _ in range(6):
        anomaly = anomaly - (anomaly - e * np.sin(anomaly) - mean) / (1 - e * np.cos(anomaly))
    return anomaly


def draw_eccentricity(random, law, n):
    name = law['law']
    if name == 'beta':
        return random.beta(law['alpha'], law['beta'], n)
    if name == 'uniform':
        return law['max'] * random.random(n)
    return np.full(n, law.get('eccentricity', 0.0))


def draw_age(random, law, n):
    median = law['medianMyr']
    if 'lowerMyr' not in law:
        return np.full(n, median)
    age = np.empty(0)
    while len(age) < n:
        z = random.standard_normal(n)
        drawn = median * np.where(z > 0, law['upperMyr'] / median, median / law['lowerMyr']) ** z
        inside = (drawn >= law.get('minMyr', 0)) & (drawn <= law.get('maxMyr', np.inf))
        age = np.concatenate([age, drawn[inside]])
    return age[:n]


class Survey:
    def __init__(self, path, draws):
        with open(path) as file:
            survey = json.load(file)
        self.stars, self.settings, self.draws = survey['stars'], survey['settings'], draws
        self.masses = np.array(survey['grid']['massMjup'])
        self.log_axis = np.log(survey['grid']['semiMajorAxisAu'])
        if survey['cooling'] == 'built-in':
            sys.exit('a survey file for another engine gives its cooling relation as a table')
        self.inverse = {
            band: self.invert(survey['cooling'], np.array(magnitudes))
            for band, magnitudes in survey['cooling']['magnitudes'].items()
        }

    def invert(self, table, magnitudes):
        """By age and magnitude, the number of the lightest mass of the grid that is as bright."""
        log_mass, log_age = np.log(table['massMjup']), np.log(table['ageMyr'])
        magnitudes = magnitudes.reshape(len(log_mass), len(log_age))
        ages = np.linspace(log_age[0], log_age[-1], AGES)
        by_age = np.array([np.interp(ages, log_age, row) for row in magnitudes])
        on_grid = np.array([np.interp(np.log(self.masses), log_mass, column) for column in by_age.T])
        first = on_grid.min()
        steps = np.arange(int(np.ptp(on_grid) / MAGNITUDE_STEP) + 2)
        places = first + MAGNITUDE_STEP * (steps + 0.5)
        # In front of the table stands the magnitude at which no mass is bright enough.
        places = np.concatenate([[-np.inf], places])
        lightest = [len(row) - np.searchsorted(row[::-1], places, side='right') for row in on_grid]
        return ages[0], ages[1] - ages[0], first, np.array(lightest, dtype=np.int32)

    def map(self, number):
        """Completeness of one star, shape [mass, semi-major axis]."""
        star, n = self.stars[number], self.draws
        curve, = star['curves']
        random = np.random.default_rng([1, number])
        e = draw_eccentricity(random, self.settings['eccentricity'], n)
        anomaly = solve_kepler(2 * np.pi * random.random(n), e)
        cosine = random.random(n)
        rho = (1 - e * np.cos(anomaly)) * np.sqrt(1 - cosine**2)
        law = star['distance']
        distance = law['distancePc'] + law['errorPc'] * random.standard_normal(n)
        age = draw_age(random, star['age'], n)
        bright = star['hostMag'] - 5 * np.log10(distance / 10)
        if self.settings['threshold'] == 'smooth':
            # Found when signal and noise together exceed n sigma.
            noise = np.maximum(1 + random.standard_normal(n) / curve['nSigma'], 1e-30)
            bright = bright - 2.5 * np.log10(noise)
        separation = np.log(curve['separationArcsec'])
        y = np.log(rho / distance) - separation[0]
        # The curve on a fine grid of separations: a look-up costs less than a search.
        fine = np.arange(separation[0], separation[-1], SEPARATION_STEP) + 0.5 * SEPARATION_STEP
        reach = np.interp(fine, separation, curve['contrastMag'])
        reach = np.concatenate([[-np.inf], reach, [-np.inf]])
        share = None
        if 'coverage' in curve:
            share = np.concatenate([[0], np.interp(fine, separation, curve['coverage']), [0]])
        start, step, first, lightest = self.inverse[curve['band']]
        # An age between two of the table takes one or the other, by how near they are.
        k = np.clip((np.log(age) - start) / step + random.random(n), 0, AGES - 1).astype(np.int32)
        turn = random.random(n)
        columns, width = len(self.log_axis), lightest.shape[1]
        counts = np.zeros((len(self.masses) + 1) * columns, dtype=np.int64)
        for low in range(0, n, BLOCK):
            now = slice(low, low + BLOCK)
            at = (y[now, None] + self.log_axis) / SEPARATION_STEP + 1
            here = np.clip(at, 0, len(fine) + 1).astype(np.int32)
            limit = reach[here] + (bright[now, None] - first)
            if share is not None:
                limit[turn[now, None] > share[here]] = -np.inf
            place = np.clip(limit / MAGNITUDE_STEP + 1, 0, width - 1).astype(np.int32)
            mass = lightest.ravel()[place + k[now, None] * width]
            cells = mass * columns + np.arange(columns, dtype=np.int32)
            counts += np.bincount(cells.ravel(), minlength=len(counts))
        return np.cumsum(counts.reshape(-1, columns)[:-1], axis=0) / n


def main():
    parser = argparse.ArgumentParser()
    parser.add_argument('--survey', required=True)
    parser.add_argument('--maps-out')
    parser.add_argument('--serve', action='store_true')
    parser.add_argument('--time', action='store_true')
    parser.add_argument('--draws', type=int, default=10_000)
    asked = parser.parse_args()
    survey = Survey(asked.survey, asked.draws)
    if asked.maps_out:
        maps = [survey.map(star).astype('<f4') for star in range(len(survey.stars))]
        with open(asked.maps_out, 'wb') as file:
            np.save(file, np.stack(maps))
    if asked.time:
        print(1000 * time.process_time())
    if asked.serve:
        print(json.dumps({'numpy': np.__version__}), flush=True)
        for line in sys.stdin:
            first, end = map(int, line.split())
            start = time.process_time()
            total = sum(survey.map(star).sum() for star in range(first, end))
            seconds = time.process_time() - start
            print(json.dumps({'ms': 1000 * seconds, 'sum': total}), flush=True)


main()
