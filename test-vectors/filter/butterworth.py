"""Butterworth low-passes as scipy designs them (bilinear transform, corner held), for the filter and sweep measures."""
import json
import math
import os

import numpy
import scipy
from scipy import signal

RATE_HZ = 96000
FREQUENCIES_HZ = [20, 100, 500, 1000, 2000, 5000, 10000, 15000, 20000]
CASES = [(1, 4000), (1, 15000), (2, 12000), (3, 18000), (6, 20000)]


def row(order, corner_hz):
    sections = signal.butter(order, corner_hz, fs=RATE_HZ, output="sos")
    _, gain = signal.sosfreqz(sections, worN=numpy.array(FREQUENCIES_HZ, float), fs=RATE_HZ)
    return {
        "order": order,
        "cornerHz": corner_hz,
        "points": [
            {
                "frequencyHz": f,
                "levelDb": round(20 * math.log10(abs(g)), 9),
                "phaseDeg": round(math.degrees(math.atan2(g.imag, g.real)), 9),
            }
            for f, g in zip(FREQUENCIES_HZ, gain)
        ],
    }


table = {
    "source": f"scipy {scipy.__version__}, signal.butter and signal.sosfreqz",
    "sampleRateHz": RATE_HZ,
    "rows": [row(*case) for case in CASES],
}
with open(os.path.join(os.path.dirname(os.path.abspath(__file__)), "butterworth.json"), "w") as file:
    json.dump(table, file, indent=1)
    file.write("\n")
