"""Makes tests/reference/order-fit.json: straight lines through log-log points by numpy and scipy.

Run with Debian's python3, python3-numpy and python3-scipy:
    python3 tests/reference/generate/order-fit.py > tests/reference/order-fit.json

The errors are numpy's own pseudo-random scatter (seed stated) about C n^-p. Slope and standard
error by scipy.stats.linregress, the slope again by numpy.polyfit, the quantile by
scipy.stats.t.ppf.
"""

import json

import numpy as np
import scipy
from scipy import stats


def case(name, sizes, errors):
    x, y = np.log(sizes), -np.log(errors)
    line = stats.linregress(x, y)
    slope = np.polyfit(x, y, 1)[0]
    assert abs(slope - line.slope) < 1e-11
    half = stats.t.ppf(0.975, len(sizes) - 2) * line.stderr
    return {
        "id": name,
        "sizes": [int(size) for size in sizes],
        "errors": [float(error) for error in errors],
        "expected": {"order": line.slope, "standardError": line.stderr, "halfWidth": half},
    }


def main():
    random = np.random.default_rng(20261201)
    cases = []
    for order in (0.5, 1, 2, 4):
        for count, scatter in ((3, 0.02), (6, 0.1), (8, 0.5)):
            sizes = 25 * 2 ** np.arange(count)
            noise = np.exp(scatter * random.standard_normal(count))
            cases.append(case(f"order {order}, {count} points, scatter {scatter}", sizes, 3.0 * sizes**-float(order) * noise))
    sizes = np.array([33, 67, 135, 271, 543, 1087])
    cases.append(case("odd sizes", sizes, np.array([1.1e-2, 5.2e-3, 2.7e-3, 1.3e-3, 6.6e-4, 3.3e-4])))
    print(
        json.dumps(
            {
                "source": f"scipy {scipy.__version__} stats.linregress and stats.t.ppf, numpy {np.__version__} polyfit",
                "generator": "tests/reference/generate/order-fit.py",
                "cases": cases,
            },
            indent=1,
        )
    )


main()
