"""Trees with three branches by an exact roll-back: mpmath at 60 digits, and nothing of the product.

Needs Debian's python3-mpmath:  /usr/bin/python3 tests/reference/generate/trinomial.py

Writes trinomial.json. With g = vol sqrt(3 T/n) and y = (rate - yield - vol^2/2)(T/n)/g, up and down
together have the probability 1/3 + y^2 and are shared so that the forward is met:
p exp(g) + m + d exp(-g) = exp((rate - yield) T/n).
"""
import json
from pathlib import Path

from mpmath import exp, mp, mpf, nstr, sqrt

mp.dps = 60
target = Path(__file__).resolve().parent.parent / 'trinomial.json'

CASES = [
    ('put', 100, 110, 0.05, 0.0, 0.3, 1.0),
    ('call', 100, 95, 0.03, 0.07, 0.2, 0.5),
    ('put', 36, 40, 0.06, 0.0, 0.2, 1.0),
    ('call', 100, 100, -0.01, 0.02, 0.6, 5.0),
]


def roll_back(kind, spot, strike, rate, carry, vol, expiry, steps):
    spot, strike, rate, carry = mpf(spot), mpf(strike), mpf(rate), mpf(carry)
    dt = mpf(expiry) / steps
    vol = mpf(vol)
    g = vol * sqrt(3 * dt)
    y = (rate - carry - vol * vol / 2) * dt / g
    moves = mpf(1) / 3 + y * y
    up = (exp((rate - carry) * dt) - 1 + moves * (1 - exp(-g))) / (exp(g) - exp(-g))
    down = moves - up
    discount = exp(-rate * dt)
    sign = 1 if kind == 'call' else -1

    def payoff(level, k):
        return max(sign * (spot * exp((k - level) * g) - strike), mpf(0))

    values = {}
    for american in (False, True):
        row = [payoff(steps, k) for k in range(2 * steps + 1)]
        for level in range(steps - 1, -1, -1):
            row = [
                discount * (down * row[k] + (1 - moves) * row[k + 1] + up * row[k + 2])
                for k in range(2 * level + 1)
            ]
            if american:
                row = [max(value, payoff(level, k)) for k, value in enumerate(row)]
        values['american' if american else 'european'] = row[0]
    return {**values, 'p': up, 'up': exp(g), 'down': exp(-g)}


cases = []
for steps in (1, 3, 25, 50):
    for case in CASES:
        expected = roll_back(*case, steps)
        names = ('kind', 'spot', 'strike', 'rate', 'yield', 'vol', 'T')
        cases.append(
            {
                'id': f'trinomial-{len(cases) + 1:03d}',
                'inputs': {'tree': 'trinomial', **dict(zip(names, case)), 'steps': steps},
                'expected': {name: nstr(value, 30) for name, value in expected.items()},
                'source': 'computed: mpmath 60 digits, exact roll-back of the stated tree',
            }
        )
target.write_text(json.dumps({'family': 'trinomial', 'cases': cases}, indent=1) + '\n')
