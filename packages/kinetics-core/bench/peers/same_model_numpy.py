"""The shipped model and algorithm on a Runge-Kutta method of order four, hand-vectorised over all runs.

All runs advance together in equal steps of their own time. With dx/dt = f(x; k, m, n) autonomous, the derivatives of
the extent are quadratures, dx/dtheta = f int (d ln f/dtheta) dt, so that only the integrals of ln a and ln b are carried
beside x. Between the steps a cubic through values and slopes gives every reading.
"""

import numpy as np
import scipy
from projected_fit import projected_fit
from study import serve

# Steps a run that keep the extent within a millionth of its span, or a ten-thousandth (70 % conversion, orders about 1).
STEPS = 32
COARSE_STEPS = 12
LEAST = 1e-12


def course(log_k, orders, study, coarse):
    m, n = orders
    count = COARSE_STEPS if coarse else STEPS
    k = np.exp(log_k)
    end = study.time[:, -1]
    h = end / count
    a0, b0 = study.a, study.b
    runs = study.runs

    states = np.empty((count + 1, 3, runs))
    slopes = np.empty((count + 1, 3, runs))

    def rates(x, into):
        log_a = np.log(np.maximum(a0 - x, LEAST))
        log_b = np.log(np.maximum(b0 - x, LEAST))
        into[0] = np.exp(log_k + m * log_a + n * log_b)
        into[1] = log_a
        into[2] = log_b

    state = np.zeros((3, runs))
    k2, k3, k4 = np.empty((3, 3, runs))
    for step in range(count):
        k1 = slopes[step]
        states[step] = state
        rates(state[0], k1)
        rates(state[0] + h / 2 * k1[0], k2)
        rates(state[0] + h / 2 * k2[0], k3)
        rates(state[0] + h * k3[0], k4)
        state = state + h / 6 * (k1 + 2 * (k2 + k3) + k4)
    states[count] = state
    rates(state[0], slopes[count])

    extent, integral_a, integral_b = interpolated(states, slopes, study.time, h)
    rate = k[:, None] * np.maximum(a0[:, None] - extent, LEAST) ** m * np.maximum(b0[:, None] - extent, LEAST) ** n
    derivatives = np.empty((runs, 3, study.readings))
    np.multiply(rate, study.time, out=derivatives[:, 0])
    np.multiply(rate, integral_a, out=derivatives[:, 1])
    np.multiply(rate, integral_b, out=derivatives[:, 2])
    return extent, derivatives


def interpolated(states, slopes, time, h):
    """Values at the readings, 3 x runs x readings, by the cubic of Hermite on each step."""
    place = time / h[:, None]
    index = np.minimum(place.astype(np.intp), len(states) - 2)
    s = place - index
    rows = np.arange(len(h))[:, None]
    width = h[:, None]
    square = s * s
    late = square * (3 - 2 * s)
    first = width * (s * (1 - s) ** 2)
    second = width * (square * (s - 1))
    by_run = np.ascontiguousarray(states.transpose(1, 2, 0))
    slope_by_run = np.ascontiguousarray(slopes.transpose(1, 2, 0))
    before = by_run[:, rows, index]
    after = by_run[:, rows, index + 1]
    return (
        before
        + late * (after - before)
        + first * slope_by_run[:, rows, index]
        + second * slope_by_run[:, rows, index + 1]
    )


if __name__ == "__main__":
    serve(
        lambda study: projected_fit(study, course),
        "same_model_numpy",
        {"numpy": np.__version__, "scipy": scipy.__version__},
    )
