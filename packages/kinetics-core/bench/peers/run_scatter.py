"""Run-to-run scatter of ln k, ln k_j = ln k + b_j with b_j ~ N(0, tau^2), on the model linearised where every run stands.

With J the derivatives of one run for (ln k, m, n, l), means removed because of the run's own offset, e the ln k column
and r the residuals at the run's present b_j, the linear model has r + J_e b_j at b_j = 0. Let G = J'J and g = J'r of
those. The run's own ln k would move by z = g_e / G_ee; the residuals that this leaves have variance s_j^2, and all of them
together an autocorrelation rho, so that sigma_j^2 = s_j^2 (1 + rho)/(1 - rho). Then with h = sigma^2 / G_ee and
u = G e / G_ee

    J'V^-1 J = S / sigma^2 + u u' / (h + t),   J'V^-1 r = s / sigma^2 + u z / (h + t),   S = G - G e e'G / G_ee.

tau^2 is found by restricted maximum likelihood with t = tau^2, in one dimension. The runs weigh with
t = f = max(tau^2, mean h); d is the step and C the inverse of the sum at f. With s^2 the mean square of (z - u'd) against
h + f, a run counts as varying by v = max(s^2 (h + f), h + tau^2), which gives the covariance
C (sum S / sigma^2 + prior + sum v u u' / (h + f)^2) C. The new b_j is tau^2 / (h + tau^2) (z - u'd).
"""

from dataclasses import dataclass

import numpy as np
from scipy.optimize import minimize_scalar

LARGEST = 0.97
# What a short trace takes from the variances that a smooth direction takes out of autocorrelated noise.
SHORT = 2.5
# Coefficients that a run spends on itself: offset and ln k.
OWN = 2


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
    lags = (own[:, 1:] * own[:, :-1]).sum(axis=1) / squares
    rho, freedom = reading_noise(lags, readings, OWN + (jacobian.shape[1] - 1) / runs)
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
    spread = max(variance, precision.mean())
    left, right, weight = normal_equations(spread)
    inverse = np.linalg.inv(left)
    step = inverse @ right
    effects = direction @ inverse
    rest = offset - direction @ step
    expected = (1 - weight * (effects * direction).sum(axis=1)).sum()
    excess = (weight * rest**2).sum() / expected
    varies = np.maximum(excess / weight, precision + variance)
    covariance = inverse + (effects * (weight * (weight * varies - 1))[:, None]).T @ effects
    deviations = variance / (precision + variance) * rest
    return ScatterStep(step, covariance, variance, deviations, noise)


def reading_noise(lags, readings, spent):
    """Autocorrelation of each run and the freedom of its residuals.

    `spent` smooth directions take `taken` variances out of autoregressive noise, which lowers both the lag-one
    autocorrelation and the sum of squares. All runs are read by one instrument: a run has an autocorrelation of its own
    only where it lies above that of all together by more than twice its error.
    """

    def taken(rho):
        gain = (1 + rho) / (1 - rho)
        return spent * gain / (1 + SHORT * gain / readings)

    def corrected(lag):
        rho = lag
        for _ in range(30):
            rho = np.clip(lag + (1 - lag) * np.minimum(taken(rho) / readings, 0.8), -LARGEST, LARGEST)
        return rho

    own = corrected(lags)
    least = own - 2 * np.sqrt((1 - own**2) / readings)
    rho = np.clip(np.maximum(corrected(lags.mean()), least), 0, LARGEST)
    return rho, np.maximum(readings - taken(rho), 0.2 * readings)
