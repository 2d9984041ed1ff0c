"""An outside judge of the closed form: mpmath at 60 digits, and nothing of the product.

Needs Debian's python3-mpmath:  /usr/bin/python3 tests/reference/generate/closed-forms.py

1. Computes every case of european.json, black76.json and garman-kohlhagen.json again and fails when a
   digit of the stored value differs. With the argument `write` it writes its own digits into them.
2. Writes closed-form-sample.json: random requests with a fixed seed, three families by five regions,
   and their values, so that accuracy and error estimates are judged on more than hand-picked cases.
"""
import json
import random
import sys
from pathlib import Path

from mpmath import erfc, exp, fabs, log, mp, mpf, nstr, pi, sqrt

mp.dps = 60
folder = Path(__file__).resolve().parent.parent


def cdf(x):
    return erfc(-x / sqrt(mpf(2))) / 2


def density(x):
    return exp(-x * x / 2) / sqrt(2 * pi)


def closed_form(request):
    contract, market = request['contract'], request['market']
    future = 'carry' in market
    strike, expiry = mpf(contract['strike']), mpf(contract['expiry'])
    spot, rate, vol = mpf(market['spot']), mpf(market['rate']), mpf(market['volatility'])
    carry = rate if future else mpf(market['yield'])
    sign = 1 if contract['kind'] == 'call' else -1
    s = vol * sqrt(expiry)
    d1 = (log(spot / strike) + (rate - carry) * expiry) / s + s / 2
    d2 = d1 - s
    leg_a, leg_b = spot * exp(-carry * expiry), strike * exp(-rate * expiry)
    value = sign * (leg_a * cdf(sign * d1) - leg_b * cdf(sign * d2))
    result = {
        'value': value,
        'delta': sign * leg_a / spot * cdf(sign * d1),
        'gamma': leg_a * density(d1) / (spot**2 * s),
        'vega': leg_a * density(d1) * sqrt(expiry),
        'theta': -leg_a * density(d1) * vol / (2 * sqrt(expiry))
        - sign * (rate * leg_b * cdf(sign * d2) - carry * leg_a * cdf(sign * d1)),
        'rho': -expiry * value if future else sign * expiry * leg_b * cdf(sign * d2),
        'vanna': -leg_a / spot * density(d1) * d2 / vol,
        'volga': leg_a * density(d1) * sqrt(expiry) * d1 * d2 / vol,
    }
    if not future:
        result['yieldRho'] = -sign * expiry * leg_a * cdf(sign * d1)
    return result


def check_family(name):
    path = folder / f'{name}.json'
    data = json.loads(path.read_text())
    worst = mpf(0)
    for case in data['cases']:
        computed = closed_form(case['request'])
        for quantity, stored in case['expected'].items():
            gap = fabs(mpf(stored) - computed[quantity])
            worst = max(worst, gap / fabs(computed[quantity]) if computed[quantity] else gap)
            if 'write' in sys.argv:
                case['expected'][quantity] = nstr(computed[quantity], 30)
    if 'write' in sys.argv:
        path.write_text(json.dumps(data, indent=1) + '\n')
    print(f'{name}: {len(data["cases"])} cases, worst relative gap {nstr(worst, 3)}')
    assert worst < mpf('1e-26'), name


rng = random.Random(19730501)


def sample(family, region):
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
    if region == 'round':
        spot, rate, other = float(rng.randint(1, 300)), round(rate, 2), round(other, 2)
        vol, expiry = round(vol, 2), rng.choice((0.25, 0.5, 1.0, 2.0, 5.0))
    carry = rate if family == 'black76' else other
    forward = spot * 2.718281828459045 ** ((rate - carry) * expiry)
    strike = forward * 2.718281828459045 ** (deviations * vol * expiry**0.5)
    if region == 'round':
        strike = float(rng.randint(max(1, int(spot * 0.7)), int(spot * 1.3) + 1))
    if not 1e-12 <= strike <= 1e12:
        return sample(family, region)
    market = {'spot': spot, 'rate': rate, 'yield': other, 'volatility': vol}
    if family == 'black76':
        market = {'spot': spot, 'rate': rate, 'carry': 'future', 'volatility': vol}
    contract = {'payoff': 'vanilla', 'exercise': 'european', 'kind': rng.choice(('call', 'put')),
                'strike': strike, 'expiry': expiry}
    return {'contract': contract, 'market': market}


for name in ('european', 'black76', 'garman-kohlhagen'):
    check_family(name)

rows = []
for family in ('european', 'black76', 'garman-kohlhagen'):
    for region in ('ordinary', 'round', 'tails', 'small', 'long'):
        for _ in range(60):
            request = sample(family, region)
            expected = {k: nstr(v, 25) for k, v in closed_form(request).items()}
            rows.append({'family': family, 'region': region, 'request': request, 'expected': expected})
lines = ',\n'.join('  ' + json.dumps(row) for row in rows)
note = 'mpmath, 60 digits; made by generate/closed-forms.py'
(folder / 'closed-form-sample.json').write_text(
    f'{{\n"note": "{note}",\n"cases": [\n{lines}\n]\n}}\n')
