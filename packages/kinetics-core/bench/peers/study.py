"""What the three scripts of this folder share: the study, starting values, and the talk with the benchmark.

A study is v = k a^m b^n for A + B -> products in runs j, the signal of A read at given times,

    S_j(t) = o_j + l c_A(t) + noise,   c_A = a_j - x,   dx/dt = k (a_j - x)^m (b_j - x)^n,

with one scale l for all runs that is known as l0 +- u, an offset o_j of its own for every run, first-order
autoregressive noise, and a rate constant that scatters from run to run, ln k_j ~ N(ln k, tau^2).
"""

import json
import sys
from dataclasses import dataclass
from time import perf_counter, process_time

import numpy as np


@dataclass(frozen=True)
class Study:
    """Runs in rows; all runs have equally many readings."""

    a: np.ndarray
    b: np.ndarray
    time: np.ndarray
    signal: np.ndarray
    scale: float
    scale_error: float

    @property
    def runs(self):
        return len(self.a)

    @property
    def readings(self):
        return self.time.shape[1]

    def thinned(self, points):
        """The same runs with evenly picked readings, first and last included."""
        if self.readings <= 2 * points:
            return self
        picked = np.round(np.linspace(0, self.readings - 1, points)).astype(int)
        time, signal = self.time[:, picked], self.signal[:, picked]
        return Study(self.a, self.b, time, signal, self.scale, self.scale_error)


def study_from(message):
    return Study(
        a=np.array(message["a"]),
        b=np.array(message["b"]),
        time=np.array(message["time"]),
        signal=np.array(message["signal"]),
        scale=message["scale"],
        scale_error=message["scaleError"],
    )


def start_from_initial_rates(study, part=0.1):
    """ln k, m, n by least squares on the logarithms of the slopes of straight lines through the first readings."""
    count = max(5, int(part * study.readings))
    time = study.time[:, :count]
    signal = study.signal[:, :count]
    centred = time - time.mean(axis=1, keepdims=True)
    slopes = (centred * signal).sum(axis=1) / (centred**2).sum(axis=1)
    rates = np.maximum(-slopes / study.scale, 1e-300)
    design = np.column_stack([np.ones(study.runs), np.log(study.a), np.log(study.b)])
    return np.linalg.lstsq(design, np.log(rates), rcond=None)[0]


def serve(fit, name, versions):
    """Reads one message a line. {"study": ...} keeps a study; {"fit": true} fits it and answers with the time of that alone."""
    study = None
    for line in sys.stdin:
        message = json.loads(line)
        if "study" in message:
            study = study_from(message["study"])
            answer = {"ready": name, "versions": versions}
        else:
            begin, worked = perf_counter(), process_time()
            found = fit(study)
            seconds, processor = perf_counter() - begin, process_time() - worked
            answer = {"seconds": seconds, "processorSeconds": processor, **found}
        sys.stdout.write(json.dumps(answer) + "\n")
        sys.stdout.flush()
