"""The yardstick for a programme: its sweep and its level steps with numpy and scipy alone, on one thread.

Reads the WAV file and the descriptor beside it (the recording is the file itself: delay 0). Sweep: division by the
transform of the sweep as it was sent, the linear response cut with a tapered window, harmonics 2 to 5 likewise. Steps:
a seven-term Blackman-Harris spectrum of each step, the tone's lobe and nine harmonics summed, the rest taken for noise.
Prints the response's span and the level of the steps.
"""
import json
import sys

import numpy
from scipy import fft, signal
from scipy.io import wavfile

COEFFICIENTS = [
    0.27105140069342, 0.43329793923448, 0.21812299954311, 0.06592544638803,
    0.01081174209837, 0.00077658482522, 0.00001388721735,
]
HALF_LOBE = 7


def sent_sweep(part, rate, length):
    p = part["parameters"]
    t = numpy.arange(length) / rate
    duration = p["rateS"] * numpy.log(p["highHz"] / p["lowHz"])
    x = numpy.sin(2 * numpy.pi * p["lowHz"] * p["rateS"] * numpy.exp(numpy.minimum(t, duration) / p["rateS"]))
    x[t > duration] = 0
    rise, fall = t < p["fadeInS"], (duration - t < p["fadeOutS"]) & (t <= duration)
    x[rise] *= 0.5 - 0.5 * numpy.cos(numpy.pi * t[rise] / p["fadeInS"])
    x[fall] *= 0.5 - 0.5 * numpy.cos(numpy.pi * (duration - t[fall]) / p["fadeOutS"])
    return x


def measure_sweep(samples, part, rate):
    begin = round(part["fromS"] * rate)
    length = 2 ** int(numpy.ceil(numpy.log2((part["toS"] - part["fromS"] + 0.6) * rate)))
    piece = numpy.zeros(length)
    stop = min(len(samples), begin + round((part["toS"] - part["fromS"] + 0.6) * rate))
    piece[: stop - begin] = samples[begin:stop]
    x = fft.rfft(sent_sweep(part, rate, length))
    y = fft.rfft(piece)
    power = numpy.abs(x) ** 2
    impulse = fft.irfft(y * numpy.conj(x) / (power + 1e-6 * power.max()))
    cut = signal.windows.tukey(65536, 0.5)
    linear = numpy.abs(fft.rfft(numpy.roll(impulse, 32768)[:65536] * cut))
    for order in range(2, 6):
        early = round(part["parameters"]["rateS"] * numpy.log(order) * rate)
        fft.rfft(numpy.roll(impulse, early + 8192)[:16384] * signal.windows.tukey(16384, 0.5))
    bins = fft.rfftfreq(65536, 1 / rate)
    band = (bins >= 20) & (bins <= 20000)
    decibels = 20 * numpy.log10(linear[band])
    return (decibels.max() - decibels.min()) / 2


def measure_step(samples, step, rate):
    begin, stop = round((step["fromS"] + 0.01) * rate), round(step["toS"] * rate)
    length = 2 ** int(numpy.floor(numpy.log2(stop - begin)))
    window = signal.windows.general_cosine(length, COEFFICIENTS, sym=False)
    frequencies, power = signal.welch(
        samples[begin:stop], rate, window, length, length * 3 // 4, detrend=False, scaling="density"
    )
    width = rate / length
    place = 997 / width
    power = power * width
    tone = power[round(place) - HALF_LOBE : round(place) + HALF_LOBE + 1].sum()
    for order in range(2, 11):
        at = round(order * place)
        power[at - HALF_LOBE : at + HALF_LOBE + 1].sum()
    return 10 * numpy.log10(2 * tone)


rate, data = wavfile.read(sys.argv[1])
with open(sys.argv[1].replace(".wav", ".json"), encoding="utf-8") as file:
    descriptor = json.load(file)
for channel in range(data.shape[1]):
    samples = data[:, channel] / 2.0**31
    for part in descriptor["parts"]:
        if part["measure"] == "sweep":
            print("sweep", measure_sweep(samples, part, rate))
        if part["measure"] == "level-steps":
            print("steps", [round(measure_step(samples, step, rate), 2) for step in part["steps"]])
