"""Prints the polynomials of pricing/numerics/elementary/erfc.ts.

Needs Debian's python3-mpmath:  /usr/bin/python3 tests/reference/generate/erfc-coefficients.py

The function F(x) = (1 + 2x) exp(x^2) erfc(x) of w = (x - 3) / (x + 3) is interpolated at Chebyshev
points on each of five pieces of w, and then written in powers of the distance from the middle of
the piece. The constant term is printed in two parts, whose sum holds it to 106 bits.
"""
from mpmath import cos, erfc, exp, lu_solve, matrix, mp, mpf, pi

mp.dps = 60

START, WIDTH, PIECES, DEGREE = -0.75, 0.3125, 5, 13


def scaled(w):
    x = 3 * (1 + w) / (1 - w)
    return (1 + 2 * x) * exp(x * x) * erfc(x)


for piece in range(PIECES):
    middle = mpf(START + (piece + 0.5) * WIDTH)
    count = DEGREE + 1
    points = [cos(pi * (2 * i + 1) / (2 * count)) * WIDTH / 2 for i in range(count)]
    rows = matrix(count, count)
    for i, v in enumerate(points):
        for j in range(count):
            rows[i, j] = v**j
    exact = lu_solve(rows, matrix([scaled(middle + v) for v in points]))
    rounded = [mpf(float(c)) for c in exact]
    tail = mpf(float(exact[0] - rounded[0]))
    worst = swing = mpf(0)
    for i in range(2001):
        v = WIDTH * (mpf(i) / 2000 - mpf(1) / 2)
        value = sum(c * v**j for j, c in enumerate(rounded)) + tail
        worst = max(worst, abs(value / scaled(middle + v) - 1))
        swing = max(swing, abs(value / rounded[0] - 1))
    print(f'// middle {float(middle)}: relative error {float(worst):.1e}, swing {float(swing):.3f}')
    print('[' + ', '.join(repr(float(c)) for c in [rounded[0], tail] + rounded[1:]) + '],')
