"""The shipped model and algorithm with SciPy's LSODA for every run, the derivatives by quadratures beside the extent.

LSODA by `solve_ivp`, the interface that SciPy recommends for new code; with the argument `odeint` by the older one, which
keeps its steps outside Python and is several times faster.
"""

import sys
from math import exp, log

import numpy as np
import scipy
from projected_fit import projected_fit
from scipy.integrate import odeint, solve_ivp
from study import serve

# Matched accuracy: against the closed form of the benchmark's law the extent is then at most 5e-7 of its span off over all
# readings, as that of the shipped fit; at 1e-6 it is 2e-6 off.
TOLERANCE = 2e-7
COARSE_TOLERANCE = 1e-4
LEAST = 1e-12


def by_solve_ivp(slopes, time, tolerance, absolute):
    start = [0.0, 0.0, 0.0]
    span = (0.0, time[-1])
    return solve_ivp(slopes, span, start, method="LSODA", t_eval=time, rtol=tolerance, atol=absolute).y


def by_odeint(slopes, time, tolerance, absolute):
    return odeint(slopes, [0.0, 0.0, 0.0], time, tfirst=True, rtol=tolerance, atol=absolute).T


def course_by(solve):
    def course(log_k, orders, study, coarse):
        m, n = (float(order) for order in orders)
        tolerance = COARSE_TOLERANCE if coarse else TOLERANCE
        extent = np.empty(study.time.shape)
        derivatives = np.empty((study.runs, 3, study.readings))
        for run in range(study.runs):
            log_rate = float(log_k[run])
            a0 = float(study.a[run])
            b0 = float(study.b[run])
            time = study.time[run]

            def slopes(_time, state, log_rate=log_rate, a0=a0, b0=b0):
                log_a = log(max(a0 - state[0], LEAST))
                log_b = log(max(b0 - state[0], LEAST))
                return exp(log_rate + m * log_a + n * log_b), log_a, log_b

            # The integrals of logarithms grow with the clock; errors of theirs count against that.
            absolute = [tolerance * min(a0, b0), tolerance * time[-1], tolerance * time[-1]]
            x, integral_a, integral_b = solve(slopes, time, tolerance, absolute)
            extent[run] = x
            rate = exp(log_rate) * np.maximum(a0 - x, LEAST) ** m * np.maximum(b0 - x, LEAST) ** n
            derivatives[run, 0] = rate * time
            derivatives[run, 1] = rate * integral_a
            derivatives[run, 2] = rate * integral_b
        return extent, derivatives

    return course


if __name__ == "__main__":
    model = course_by(by_odeint if "odeint" in sys.argv else by_solve_ivp)
    serve(
        lambda study: projected_fit(study, model),
        "same_model_lsoda",
        {"numpy": np.__version__, "scipy": scipy.__version__},
    )
