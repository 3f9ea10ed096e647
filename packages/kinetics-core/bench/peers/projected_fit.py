"""The algorithm that two of the scripts share: offsets projected out, analytic derivatives, Levenberg-Marquardt in
(ln k, m, n) with the one linear scale solved for at every step, begun on few readings a run; then on all readings steps
under run-to-run scatter, linearised at every run's own ln k.

`model(log_k, orders, study, coarse)` returns the extent x and its derivatives for ln k, m and n, runs x readings and
runs x 3 x readings, with ln k a value a run, within a millionth of the extent, or a ten-thousandth where `coarse`.
"""

import numpy as np
from run_scatter import scatter_step
from study import start_from_initial_rates

LARGEST_STEP_IN_LOG_K = 1.0
MOST_STEPS = 50
COARSE_READINGS = 48
# Parts of a standard error.
COARSE_CONVERGED = 0.03
CONVERGED = 0.01


def projected_fit(study, model):
    few = study.thinned(COARSE_READINGS)
    theta, scale = pooled_fit(few, model, start_from_initial_rates(study))
    deviations = np.zeros(study.runs)
    for steps in range(1, MOST_STEPS):
        at = Evaluation(study, model(theta[0] + deviations, theta[1:], study, False), scale)
        found = scatter_step(at.jacobian, at.residuals, deviations, study.scale - scale, study.scale_error)
        theta = theta + found.step[:3]
        scale = scale + found.step[3]
        deviations = found.deviations
        if found.settled(CONVERGED):
            break
    return answer(theta, scale, found, steps)


def answer(theta, scale, found, steps):
    return {
        "logRateConstant": float(theta[0]),
        "orders": [float(theta[1]), float(theta[2])],
        "scale": float(scale),
        "standardErrors": [float(error) for error in np.sqrt(np.diag(found.covariance))],
        "betweenRuns": float(np.sqrt(found.variance)),
        "steps": steps,
    }


class Evaluation:
    """Residuals and derivatives for (ln k, m, n, l) with the means of each run removed.

    The scale is the least-squares one, its stated value counting as one more reading (`weight` against the others),
    unless it is given.
    """

    def __init__(self, study, course, scale=None, weight=0.0):
        extent, derivatives = course
        signal = study.signal - study.signal.mean(axis=1, keepdims=True)
        column = extent.mean(axis=1, keepdims=True) - extent
        if scale is None:
            squares = (column**2).sum()
            scale = ((column * signal).sum() + weight * study.scale) / (squares + weight)
        self.scale = scale
        self.residuals = signal - scale * column
        self.squares = (self.residuals**2).sum() + weight * (study.scale - scale) ** 2
        runs, _, readings = derivatives.shape
        self.jacobian = np.empty((runs, 4, readings))
        np.multiply(-scale, derivatives - derivatives.mean(axis=2, keepdims=True), out=self.jacobian[:, :3])
        self.jacobian[:, 3] = column

    def normal_equations(self, weight):
        """Of (ln k, m, n) with the scale at its own least, where its part of the gradient is zero (Kaufman)."""
        gram = (self.jacobian @ self.jacobian.transpose(0, 2, 1)).sum(axis=0)
        gradient = (self.jacobian[:, :3] @ self.residuals[:, :, None]).sum(axis=0)[:, 0]
        return gram[:3, :3] - np.outer(gram[:3, 3], gram[:3, 3]) / (gram[3, 3] + weight), gradient


def pooled_fit(study, model, theta):
    """All readings alike and no scatter between runs: where the steps under scatter start from."""
    noise = (np.diff(study.signal, axis=1) ** 2).mean() / 2
    weight = noise / study.scale_error**2

    def at(theta):
        return Evaluation(study, model(np.full(study.runs, theta[0]), theta[1:], study, True), weight=weight)

    evaluation = at(theta)
    damping = 1e-3
    for _ in range(MOST_STEPS):
        gram, gradient = evaluation.normal_equations(weight)
        diagonal = np.diag(gram)
        while True:
            step = np.linalg.solve(gram + damping * np.diag(diagonal), gradient)
            step *= min(1, LARGEST_STEP_IN_LOG_K / max(abs(step[0]), 1e-300))
            tried = at(theta + step)
            if tried.squares <= evaluation.squares * (1 + 1e-12) or damping > 1e8:
                break
            damping *= 10
        theta = theta + step
        evaluation = tried
        damping *= 0.1
        # The fall of the sum of squares that the step foretold, against the variance of a residual.
        if step @ gradient <= COARSE_CONVERGED**2 * evaluation.squares / study.signal.size:
            break
    return theta, evaluation.scale
