"""What one writes first: every unknown is a parameter of SciPy's least_squares with its numeric Jacobian, and every course
is an LSODA by `solve_ivp`. Unknown are ln k, m, n and the scale, an offset and a departure of ln k for every run; the
departures over tau and the scale's departure from its stated value over its error are residuals like any other. tau and
the noise of the runs come from the Jacobian that a fit returns, and the fit is repeated with them until it settles.
"""

from math import exp, log

import numpy as np
import scipy
from projected_fit import CONVERGED, MOST_STEPS, answer
from run_scatter import scatter_step
from scipy.integrate import solve_ivp
from scipy.optimize import least_squares
from study import serve, start_from_initial_rates

# Differences of 1e-4 need courses that are good to well below it.
TOLERANCE = 1e-8
DIFFERENCE = 1e-4
LEAST = 1e-12
# Scatter between runs until the first fit has told it.
FIRST_SCATTER = 0.1
SHARED = 4


def extents(log_k, m, n, study):
    extent = np.empty(study.time.shape)
    for run in range(study.runs):
        log_rate = float(log_k[run])
        a0 = float(study.a[run])
        b0 = float(study.b[run])
        time = study.time[run]

        def slope(_time, state, log_rate=log_rate, a0=a0, b0=b0):
            x = state[0]
            return [exp(log_rate + m * log(max(a0 - x, LEAST)) + n * log(max(b0 - x, LEAST)))]

        absolute = TOLERANCE * min(a0, b0)
        course = solve_ivp(slope, (0, time[-1]), [0.0], "LSODA", time, rtol=TOLERANCE, atol=absolute)
        extent[run] = course.y[0]
    return extent


def fit(study):
    runs, readings = study.runs, study.readings
    noise = np.full(runs, (np.diff(study.signal, axis=1) ** 2).mean() / 2)
    scatter = FIRST_SCATTER
    # Departures and orders are of the size of one; offsets are measured in the noise, so that one difference fits all.
    unit = float(np.sqrt(noise[0]))
    start = start_from_initial_rates(study)
    parameters = np.concatenate([start, [1.0], study.signal[:, 0] / unit, np.zeros(runs)])

    for steps in range(1, MOST_STEPS):

        def residuals(parameters, noise=noise, scatter=scatter):
            log_k, m, n, ratio = parameters[:SHARED]
            offsets = unit * parameters[SHARED : SHARED + runs]
            departures = parameters[SHARED + runs :]
            model = offsets[:, None] - ratio * study.scale * extents(log_k + departures, m, n, study)
            readings_part = (study.signal - model) / np.sqrt(noise)[:, None]
            stated = study.scale * (1 - ratio) / study.scale_error
            return np.concatenate([readings_part.ravel(), [stated], departures / scatter])

        fitted = least_squares(residuals, parameters, x_scale="jac", diff_step=DIFFERENCE, ftol=1e-9, xtol=1e-9)
        parameters = fitted.x
        own = np.sqrt(noise)[:, None]
        rows = fitted.jac[: runs * readings, :SHARED].reshape(runs, readings, SHARED).transpose(0, 2, 1)
        jacobian = -own[:, :, None] * rows
        jacobian[:, 3] /= study.scale
        rest = own * fitted.fun[: runs * readings].reshape(runs, readings)
        found = scatter_step(
            jacobian - jacobian.mean(axis=2, keepdims=True),
            rest - rest.mean(axis=1, keepdims=True),
            parameters[SHARED + runs :],
            study.scale * (1 - parameters[3]),
            study.scale_error,
        )
        noise, scatter = found.noise, np.sqrt(found.variance)
        if found.settled(CONVERGED):
            break
    return answer(parameters[:3], study.scale * parameters[3], found, steps)


if __name__ == "__main__":
    serve(fit, "naive_lsoda", {"numpy": np.__version__, "scipy": scipy.__version__})
