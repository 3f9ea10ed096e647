"""Run-to-run scatter of ln k, ln k_j = ln k + b_j with b_j ~ N(0, tau^2), on the model linearised where every run stands.

With J the derivatives of one run for (ln k, m, n, l), means removed because of the run's own offset, e the ln k column
and r the residuals at the run's present b_j, the linear model has r + J_e b_j at b_j = 0. Let G = J'J and g = J'r of
those. The run's own ln k would move by z = g_e / G_ee; the residuals that this leaves have variance s^2 and lag-one
autocorrelation rho, read from all runs together, and sigma^2 = s^2 (1 + rho)/(1 - rho). With h = sigma^2 / G_ee and u = G e / G_ee

    J'V^-1 J = S / sigma^2 + u u' / (h + tau^2),   J'V^-1 r = s / sigma^2 + u z / (h + tau^2),

S = G - G e e'G / G_ee. tau^2 by restricted maximum likelihood, in one dimension; then the step d in the parameters, and
b_j = tau^2 / (h + tau^2) (z - u'd).
"""

from dataclasses import dataclass

import numpy as np
from scipy.optimize import minimize_scalar

LARGEST_AUTOCORRELATION = 0.97
# Coefficients that a run spends on itself: offset and ln k.
OWN = 2
# What a short trace takes from the gain (1 + rho)/(1 - rho) of a smooth direction, and the least part of freedom left.
SHORT = 2.5
LEAST_FREEDOM = 0.2


@dataclass(frozen=True)
class ScatterStep:
    step: np.ndarray
    covariance: np.ndarray
    variance: float
    deviations: np.ndarray
    # sigma^2 of every run.
    noise: np.ndarray

    def settled(self, part):
        return bool(np.all(np.abs(self.step) <= part * np.sqrt(np.diag(self.covariance))))


def taken(rho, spent, readings):
    """Variances of autoregressive noise that the fit takes out of a trace with `spent` smooth coefficients."""
    gain = (1 + rho) / (1 - rho)
    return spent * gain / (1 + SHORT * gain / readings)


def corrected(lag, spent, readings):
    """rho from the lag-one autocorrelation of residuals, which lack what the fit has taken."""
    rho = lag
    for _ in range(30):
        part = np.minimum(taken(rho, spent, readings) / readings, 1 - LEAST_FREEDOM)
        rho = np.clip(lag + (1 - lag) * part, -LARGEST_AUTOCORRELATION, LARGEST_AUTOCORRELATION)
    return rho


def scatter_step(jacobian, residuals, deviations, scale_deviation, scale_error):
    """`jacobian` runs x parameters x readings, `residuals` runs x readings, means removed; ln k first, l last."""
    runs, _, readings = jacobian.shape
    residuals = residuals + deviations[:, None] * jacobian[:, 0]
    gram = jacobian @ jacobian.transpose(0, 2, 1)
    gradient = (jacobian @ residuals[:, :, None])[:, :, 0]
    information = gram[:, 0, 0]
    offset = gradient[:, 0] / information
    direction = gram[:, 0, :] / information[:, None]

    own = residuals - offset[:, None] * jacobian[:, 0]
    squares = (own**2).sum(axis=1)
    lag = (own[:, 1:] * own[:, :-1]).sum(axis=1) / squares
    spent = OWN + (jacobian.shape[1] - 1) / runs
    alone = corrected(lag, spent, readings)
    least = alone - 2 * np.sqrt((1 - alone**2) / readings)
    rho = np.clip(np.maximum(corrected(lag.mean(), spent, readings), least), 0, LARGEST_AUTOCORRELATION)
    freedom = np.maximum(readings - taken(rho, spent, readings), LEAST_FREEDOM * readings)
    noise = squares / freedom * (1 + rho) / (1 - rho)
    precision = noise / information

    shape = gram - information[:, None, None] * direction[:, :, None] * direction[:, None, :]
    shape_gradient = gradient - information[:, None] * direction * offset[:, None]
    fixed = (shape / noise[:, None, None]).sum(axis=0)
    fixed_gradient = (shape_gradient / noise[:, None]).sum(axis=0)
    fixed_square = (squares / noise).sum() + (scale_deviation / scale_error) ** 2
    fixed[-1, -1] += 1 / scale_error**2
    fixed_gradient[-1] += scale_deviation / scale_error**2

    def normal_equations(variance):
        weight = 1 / (precision + variance)
        left = fixed + (direction * weight[:, None]).T @ direction
        right = fixed_gradient + direction.T @ (weight * offset)
        return left, right, weight

    def deviance(log_variance):
        variance = np.exp(log_variance)
        left, right, weight = normal_equations(variance)
        factor = np.linalg.cholesky(left)
        half = np.linalg.solve(factor, right)
        quadratic = fixed_square + (weight * offset**2).sum() - half @ half
        return quadratic + np.log1p(variance / precision).sum() + 2 * np.log(np.diag(factor)).sum()

    spread = np.log(max(np.var(offset), 1e-12))
    found = minimize_scalar(deviance, bracket=(spread - 1, spread), method="brent", options={"xtol": 1e-5})
    variance = float(np.exp(found.x))
    left, right, _ = normal_equations(variance)
    covariance = np.linalg.inv(left)
    step = covariance @ right
    share = variance / (precision + variance)
    return ScatterStep(step, covariance, variance, share * (offset - direction @ step), noise)
