"""The yardstick for `tone`: the same work on a WAV file with scipy alone, on one thread.

Welch's method with 65,536 points, 75 % overlap and a 7-term Blackman-Harris window; true peak by fourfold
interpolation; a four-parameter sine fit. Prints the level of the fundamental and the peak of each channel.
"""
import sys

import numpy
from scipy import signal
from scipy.io import wavfile

COEFFICIENTS = [
    0.27105140069342, 0.43329793923448, 0.21812299954311, 0.06592544638803,
    0.01081174209837, 0.00077658482522, 0.00001388721735,
]
LENGTH = 65536


def fit_sine(samples, omega):
    n = numpy.arange(len(samples)) - len(samples) / 2
    for _ in range(5):
        cosine, sine = numpy.cos(omega * n), numpy.sin(omega * n)
        columns = numpy.stack([cosine, sine, numpy.ones_like(n)])
        a, b, _ = numpy.linalg.solve(columns @ columns.T, columns @ samples)
        columns = numpy.vstack([columns, n * (b * cosine - a * sine)])
        scale = numpy.abs(columns).max(axis=1, keepdims=True)
        columns /= scale
        solution = numpy.linalg.solve(columns @ columns.T, columns @ samples) / scale[:, 0]
        omega += solution[3]
    return omega, numpy.hypot(solution[0], solution[1])


rate, data = wavfile.read(sys.argv[1])
data = data.reshape(len(data), -1)
window = signal.windows.general_cosine(LENGTH, COEFFICIENTS, sym=False)
for channel in range(data.shape[1]):
    samples = data[:, channel] / 2.0**31
    frequencies, power = signal.welch(
        samples, rate, window, LENGTH, LENGTH * 3 // 4, detrend=False, scaling="spectrum"
    )
    peak_bin = power.argmax()
    omega, amplitude = fit_sine(samples[: LENGTH * 4], 2 * numpy.pi * frequencies[peak_bin] / rate)
    true_peak = numpy.abs(signal.resample_poly(samples, 4, 1)).max()
    print(omega * rate / (2 * numpy.pi), 20 * numpy.log10(amplitude), 20 * numpy.log10(true_peak))
