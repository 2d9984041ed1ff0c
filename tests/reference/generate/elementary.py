"""Makes tests/reference/elementary.json: correctly rounded values of the elementary functions.

Needs Debian's python3-mpmath:  /usr/bin/python3 tests/reference/generate/elementary.py [cases per region]

Each case is [argument, ..., value, rest]: `value` is the double nearest to the function at exactly
that argument, and `rest` is what the true value has beyond it, in units in the last place of `value`, so
that an error can be measured in fractions of such a unit. The seed is fixed; every function is sampled in regions: tiny
arguments, the neighbourhood of roots and of the borders where a method changes, ordinary and large
arguments, tails, subnormal arguments and results.
"""
import json
import math
import random
import struct
import sys
from fractions import Fraction
from pathlib import Path

from mpmath import cos, erfc, exp, expm1, fabs, log, log1p, mp, mpf, ncdf, pi, power, sin, sqrt

mp.prec = 400
per_region = int(sys.argv[1]) if len(sys.argv) > 1 else 30
rng = random.Random(20260112)


def uniform(low, high):
    return lambda: rng.uniform(low, high)


def logarithmic(low, high, signs=(1,)):
    """Exponents of two spread evenly from 2^low to 2^high."""
    return lambda: rng.choice(signs) * 2.0 ** rng.uniform(low, high)


def subnormal(signs=(1,)):
    return lambda: rng.choice(signs) * rng.randrange(1, 2**52) * 2.0**-1074


def near(points, spread):
    return lambda: rng.choice(points) * (1 + rng.uniform(-spread, spread))


def steps_from(points, steps):
    """A few doubles away from each point, where reductions cancel most."""

    def draw():
        bits = struct.unpack('<q', struct.pack('<d', rng.choice(points)))[0]
        return struct.unpack('<d', struct.pack('<q', bits + rng.randint(-steps, steps)))[0]

    return draw


both = (1, -1)
multiples = [float(k * pi / 2) for k in range(1, 400)]
# The double that comes nearest to a multiple of pi/2 (Muller, Elementary Functions, 3rd ed., 11.3).
hardest = 6381956970095103.0 * 2.0**797

erfc_regions = [
    uniform(-6.5, 27.3), uniform(0, 0.5), uniform(-0.5, 0), uniform(0.4, 1.6), uniform(1, 6),
    uniform(26.4, 27.23), logarithmic(-60, -3, both), near([0.5, 3.0, 1.0, 2.142857142857143], 1e-3),
    uniform(-6, -0.5),
]
regions = {
    'exp': [
        uniform(-1, 1), uniform(-20, 20), uniform(-708, 709.78), uniform(-745.1, -708),
        logarithmic(-60, -2, both), near([0.34657359027997264, 1.0397207708399179], 1e-9),
    ],
    'expm1': [
        uniform(-1, 1), uniform(-0.31, 0.31), uniform(-45, 60), uniform(60, 709.78),
        logarithmic(-1070, -2, both), near([0.3, -0.3, 0.34657359027997264], 1e-6), subnormal(both),
    ],
    'log': [
        uniform(0.5, 2), uniform(0.99, 1.01), near([1.0], 1e-12), logarithmic(-1022, 1023.9),
        subnormal(), uniform(1, 100), near([1.4142135623730951, 0.7071067811865476], 1e-6),
    ],
    'log1p': [
        uniform(-0.999, 2), uniform(-0.3, 0.42), logarithmic(-1070, -2, both), logarithmic(0, 1023),
        near([-0.29, 0.41, 0.4142135623730951], 1e-6), lambda: -1 + 2.0 ** rng.uniform(-53, -1),
    ],
    'sin': [
        uniform(-0.8, 0.8), uniform(-50, 50), uniform(-1.7e6, 1.7e6), logarithmic(21, 1023.9, both),
        logarithmic(-1070, -2, both), steps_from(multiples, 3), steps_from([hardest], 1),
    ],
    'erfc': erfc_regions,
    'erfcx': [
        uniform(-6, 30), uniform(-26.6, -6), uniform(-0.5, 0.5), logarithmic(-60, 12),
        uniform(0.5, 6), near([30.0], 1e-3),
    ],
    'normalCdf': [
        uniform(-38.5, 8.5), uniform(-2, 2), uniform(-38.5, -37.4), logarithmic(-80, -3, both),
        near([-0.7071067811865476, -4.24], 1e-2), uniform(-38, -20),
    ],
    'normalDensity': [uniform(-38.5, 38.5), uniform(-2, 2), logarithmic(-200, -3, both),
                      uniform(37.6, 38.6)],
    'millsRatio': [uniform(-37, 40), uniform(-2, 2), logarithmic(-60, 12)],
}
regions['cos'] = regions['sin']

pow_regions = [
    (uniform(0.5, 2), uniform(-500, 500)),
    (logarithmic(-1022, 1023.9), uniform(-1, 1)),
    (subnormal(), uniform(-0.9, 1)),
    (near([1.0], 1e-6), logarithmic(0, 29, both)),
    (near([1.0], 1e-15), logarithmic(30, 58, both)),
    (uniform(0.1, 10), lambda: float(rng.randint(-40, 40) or 3)),
    (lambda: float(rng.randint(2, 9)), lambda: float(rng.randint(3, 20))),
    (lambda: -rng.uniform(0.1, 10), lambda: float(rng.randint(-40, 40) or 3)),
    (uniform(0.001, 0.9), lambda: rng.uniform(0.5, 107)),
    (lambda: 2.0 ** -rng.uniform(10, 100), lambda: 10.5),
]
ratio_regions = [
    (uniform(50, 150), uniform(50, 150)),
    (logarithmic(-30, 40), logarithmic(-30, 40)),
    (lambda: 100.0, near([100.0], 1e-9)),
    (lambda: 1e6, near([0.7, 1.4142135, 0.70710678], 0.01)),
]

exact = {
    'exp': exp, 'expm1': expm1, 'log': log, 'log1p': log1p, 'sin': sin, 'cos': cos, 'erfc': erfc,
    'erfcx': lambda x: exp(x * x) * erfc(x),
    'normalCdf': lambda x: erfc(-x / sqrt(mpf(2))) / 2,
    'normalDensity': lambda x: exp(-x * x / 2) / sqrt(2 * pi),
    'millsRatio': lambda x: sqrt(pi / 2) * exp(x * x / 2) * erfc(x / sqrt(mpf(2))),
    'pow': power,
    'logRatio': lambda a, b: log(a / b),
}


def evaluate(name, arguments):
    largest = max(abs(a) for a in arguments)
    smallest = min(abs(a) for a in arguments if a != 0)
    mp.prec = 400
    if name in ('sin', 'cos') and largest > 2**20:
        mp.prec = 1500
    if smallest < 1e-60:
        mp.prec = 2600
    return exact[name](*[mpf(a) for a in arguments])


def fraction_of(x):
    sign, mantissa, exponent, _ = x._mpf_
    value = Fraction(int(mantissa)) * Fraction(2) ** exponent
    return -value if sign else value


def case(name, arguments):
    truth = evaluate(name, arguments)
    if fabs(truth) > mpf(2) ** 1024 * (1 - mpf(2) ** -54) or fabs(truth) < mpf(2) ** -1075:
        return None
    value = fraction_of(truth)
    nearest = value.numerator / value.denominator
    rest = (value - Fraction(nearest)) / Fraction(math.ulp(nearest))
    return [*arguments, nearest, round(float(rest), 6)]


cases = {}
for name, samplers in regions.items():
    rows = [case(name, [draw()]) for draw in samplers for _ in range(per_region)]
    cases[name] = [row for row in rows if row]
for name, samplers in (('pow', pow_regions), ('logRatio', ratio_regions)):
    rows = [case(name, [x(), y()]) for x, y in samplers for _ in range(per_region)]
    cases[name] = [row for row in rows if row]

target = Path(__file__).resolve().parent.parent / 'elementary.json'
if len(sys.argv) > 2:
    target = Path(sys.argv[2])
note = 'mpmath; [argument, ..., nearest double, what the true value has beyond it]'
lines = [f'  "note": "{note}"']
for name in sorted(cases):
    rows = ',\n'.join('    ' + json.dumps(row) for row in cases[name])
    lines.append(f'  "{name}": [\n{rows}\n  ]')
target.write_text('{\n' + ',\n'.join(lines) + '\n}\n')
