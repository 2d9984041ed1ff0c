"""An outside judge of the digital options: mpmath, and nothing of the product.

Needs Debian's python3-mpmath:  /usr/bin/python3 tests/reference/generate/digital.py

1. Computes the values of digital.json again and fails when a digit differs.
2. Writes digital-sample.json: random requests with a fixed seed. The values are expectations in closed
   form; every Greek is a numerical derivative of them (mpmath.diff), so that no formula is shared. It
   works with 320 digits, since the derivative of a value near 1 may be 1e-200.
"""
import json
import random
from pathlib import Path

from mpmath import diff, erfc, exp, log, mp, mpf, nstr, sqrt

mp.dps = 320
folder = Path(__file__).resolve().parent.parent


def cdf(x):
    return erfc(-x / sqrt(mpf(2))) / 2


def value_of(contract, future, spot, rate, carry, vol, expiry):
    if future:
        carry = rate
    sign = 1 if contract['kind'] == 'call' else -1
    s = vol * sqrt(expiry)
    d1 = (log(spot / mpf(contract['strike'])) + (rate - carry) * expiry) / s + s / 2
    if contract['payoff'] == 'cash-or-nothing':
        return mpf(contract['cash']) * exp(-rate * expiry) * cdf(sign * (d1 - s))
    return spot * exp(-carry * expiry) * cdf(sign * d1)


ORDERS = {
    'delta': (1, 0, 0, 0, 0),
    'gamma': (2, 0, 0, 0, 0),
    'vega': (0, 0, 0, 1, 0),
    'theta': (0, 0, 0, 0, 1),
    'rho': (0, 1, 0, 0, 0),
    'yieldRho': (0, 0, 1, 0, 0),
    'vanna': (1, 0, 0, 1, 0),
    'volga': (0, 0, 0, 2, 0),
}


def computed(request, greeks):
    contract, market = request['contract'], request['market']
    future = 'carry' in market
    at = tuple(
        mpf(number)
        for number in (
            market['spot'],
            market['rate'],
            0 if future else market['yield'],
            market['volatility'],
            contract['expiry'],
        )
    )

    def function(*point):
        return value_of(contract, future, *point)

    result = {'value': function(*at)}
    for name in greeks:
        if name == 'yieldRho' and future:
            continue
        derivative = diff(function, at, ORDERS[name], h=mpf(10) ** -22)
        result[name] = -derivative if name == 'theta' else derivative
    return result


stored = json.loads((folder / 'digital.json').read_text())
for case in stored['cases']:
    expected = mpf(case['expected']['value'])
    assert abs(computed(case['request'], [])['value'] / expected - 1) < mpf('1e-26'), case['id']
print(f'digital: {len(stored["cases"])} cases agree')

rng = random.Random(19911001)


def sample(payoff, family, region):
    spot = 10 ** rng.uniform(-2, 4)
    vol = rng.uniform(0.05, 0.9)
    expiry = 10 ** rng.uniform(-2, 0.7)
    rate, other = rng.uniform(-0.02, 0.12), rng.uniform(-0.02, 0.1)
    deviations = rng.uniform(-2.5, 2.5)
    if region == 'tails':
        deviations = rng.uniform(4, 30) * rng.choice((1, -1))
        vol = rng.uniform(0.05, 0.4)
    if region == 'small':
        vol, expiry = 10 ** rng.uniform(-4, -2), 10 ** rng.uniform(-4, 0)
    if region == 'long':
        expiry, vol = rng.uniform(5, 60), rng.uniform(0.1, 1.5)
    future = family == 'future'
    carry = rate if future else other
    forward = spot * 2.718281828459045 ** ((rate - carry) * expiry)
    strike = forward * 2.718281828459045 ** (deviations * vol * expiry**0.5)
    if not 1e-12 <= strike <= 1e12:
        return sample(payoff, family, region)
    contract = {'payoff': payoff, 'exercise': 'european', 'kind': rng.choice(('call', 'put')),
                'strike': strike, 'expiry': expiry}
    if payoff == 'cash-or-nothing':
        contract['cash'] = 10 ** rng.uniform(-2, 4)
    market = {'spot': spot, 'rate': rate, 'volatility': vol}
    market |= {'carry': 'future'} if future else {'yield': other}
    return {'contract': contract, 'market': market}


rows = []
for payoff in ('cash-or-nothing', 'asset-or-nothing'):
    for family in ('spot', 'future'):
        for region in ('ordinary', 'tails', 'small', 'long'):
            for _ in range(25):
                request = sample(payoff, family, region)
                expected = {k: nstr(v, 20) for k, v in computed(request, ORDERS).items()}
                rows.append({'region': region, 'request': request, 'expected': expected})
lines = ',\n'.join('  ' + json.dumps(row) for row in rows)
note = 'mpmath, 320 digits; made by generate/digital.py'
(folder / 'digital-sample.json').write_text(
    f'{{\n"note": "{note}",\n"cases": [\n{lines}\n]\n}}\n')
