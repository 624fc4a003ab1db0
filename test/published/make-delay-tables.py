"""Makes delays.json beside it with SciPy: group delay and phase of designs made independently of ours.

Run it by hand (pip install scipy==1.17.1 numpy; python3 test/published/make-delay-tables.py); the tests read only the
JSON. Frequencies are relative to the edge of the design (analogue) or to the sample rate (digital); delays are in s
at edges of 1 Hz, in samples where the rate is 1.

Analogue: SciPy's poles, each of which delays by -Re p / |jw - p|^2; zeros on the axis delay nothing. Digital: SciPy's
group_delay of every second-order section of the same poles after bilinear_zpk. Phases are angles of H, to within turns.
"""

import json
import pathlib

import numpy
import scipy
from scipy import signal

HERE = pathlib.Path(__file__).parent
DIGITS = 11
RIPPLE_DB = 0.5
STOPBAND_DB = 60.0
ORDERS = list(range(1, 13))
ANALOGUE_EDGES = {"low-pass": (1.0, 1.0), "high-pass": (1.0, 1.0), "band-pass": (0.8, 1.5)}
DIGITAL_EDGES = {"low-pass": (0.17, 0.17), "high-pass": (0.11, 0.11), "band-pass": (0.08, 0.21)}
RESPONSES = {
    "butterworth": "cutoff",
    "bessel": "cutoff",
    "chebyshev": "pass-edge",
    "inverse-chebyshev": "stop-edge",
    "elliptic": "pass-edge",
    "rc": "corner",
}


def rounded(values):
    return [float(f"{value:.{DIGITS}g}") for value in values]


def frequencies(low, high, count):
    return numpy.array([float(f"{f:.{DIGITS}g}") for f in numpy.geomspace(low, high, count)])


def prototype(response, order):
    """(zeros, poles, gain) of the analogue low-pass with its natural edge at 1 rad/s."""
    if response == "butterworth":
        return signal.buttap(order)
    if response == "bessel":
        return signal.besselap(order, norm="mag")
    if response == "chebyshev":
        return signal.cheb1ap(order, RIPPLE_DB)
    if response == "inverse-chebyshev":
        return signal.cheb2ap(order, STOPBAND_DB)
    if response == "elliptic":
        return signal.ellipap(order, RIPPLE_DB, STOPBAND_DB)
    return [], [-1.0] * order, 1.0


def transformed(zpk, shape, low, high):
    zeros, poles, gain = (numpy.atleast_1d(numpy.array(part, dtype=complex)) for part in zpk)
    zpk = zeros, poles, float(gain[0].real)
    if shape == "low-pass":
        return signal.lp2lp_zpk(*zpk, wo=low)
    if shape == "high-pass":
        return signal.lp2hp_zpk(*zpk, wo=low)
    return signal.lp2bp_zpk(*zpk, wo=numpy.sqrt(low * high), bw=high - low)


def designs(edges):
    for shape in edges:
        for response, at in RESPONSES.items():
            more = [25, 40] if response == "bessel" and shape == "low-pass" else []
            for order in ORDERS + more:
                low, high = edges[shape]
                yield shape, response, order, low, high, {
                    "response": response,
                    "order": order,
                    "shape": shape,
                    "edge": {"at": at, "lowHz": low, "highHz": high},
                }


def angle_of_product(zeros, poles, gain, points):
    """The angle of H, zeros and poles one by one: polynomials of order 12 and more would lose digits."""
    angle = numpy.full(len(points), numpy.angle(gain))
    for zero in zeros:
        angle += numpy.angle(points - zero)
    for pole in poles:
        angle -= numpy.angle(points - pole)
    return numpy.angle(numpy.exp(1j * angle))


def analogue():
    hz = frequencies(0.02, 50, 40)
    w = 2 * numpy.pi * hz
    tables = []
    for shape, response, order, low, high, table in designs(ANALOGUE_EDGES):
        zpk = transformed(prototype(response, order), shape, 2 * numpy.pi * low, 2 * numpy.pi * high)
        delay = sum(-pole.real / abs(1j * w - pole) ** 2 for pole in zpk[1])
        phase = angle_of_product(*zpk, 1j * w)
        tables.append({**table, "delayS": rounded(delay), "phaseRad": rounded(phase)})
    return {"frequencies": hz.tolist(), "tables": tables}


def digital():
    hz = frequencies(0.002, 0.498, 40)
    w = 2 * numpy.pi * hz
    tables = []
    for shape, response, order, low, high, table in designs(DIGITAL_EDGES):
        if order > 12:
            continue
        warped = [2 * numpy.tan(numpy.pi * f) for f in (low, high)]
        zpk = signal.bilinear_zpk(*transformed(prototype(response, order), shape, *warped), fs=1.0)
        delay = numpy.zeros(len(w))
        for section in signal.zpk2sos(*zpk):
            delay += signal.group_delay((section[:3], section[3:]), w=w)[1]
        phase = angle_of_product(*zpk, numpy.exp(1j * w))
        tables.append({**table, "delayS": rounded(delay), "phaseRad": rounded(phase)})
    return {"frequencies": hz.tolist(), "tables": tables}


def taps():
    hz = frequencies(0.002, 0.498, 40)
    w = 2 * numpy.pi * hz
    rng = numpy.random.default_rng(7)
    mean = numpy.ones(7) / 7
    given = {
        "random of 33": rng.standard_normal(33),
        "falling, minimum phase": 0.8 ** numpy.arange(40),
        "differences": numpy.array([1.0, 0.0, -1.0]),
        "mean of 7": mean,
        "three means of 7": numpy.convolve(numpy.convolve(mean, mean), mean),
        "Kaiser low-pass of 39": signal.firwin(39, 0.25, window=("kaiser", signal.kaiser_beta(60)), scale=False, fs=1.0),
    }
    tables = []
    for name, values in given.items():
        values = numpy.array(rounded(values))
        _, delay = signal.group_delay((values, [1.0]), w=w)
        _, response = signal.freqz(values, worN=w)
        tables.append(
            {
                "name": name,
                "taps": values.tolist(),
                "levels": rounded(abs(response)),
                "delayS": rounded(delay),
                "phaseRad": rounded(numpy.angle(response)),
            }
        )
    return {"frequencies": hz.tolist(), "tables": tables}


content = {
    "madeBy": {"scipy": scipy.__version__, "numpy": numpy.__version__, "script": "make-delay-tables.py"},
    "rippleDb": RIPPLE_DB,
    "stopbandDb": STOPBAND_DB,
    "analogue": analogue(),
    "digital": digital(),
    "taps": taps(),
}
(HERE / "delays.json").write_text(json.dumps(content, separators=(",", ":")) + "\n")
