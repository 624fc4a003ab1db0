"""Makes the filter tables beside it with SciPy: attenuation in dB over frequency, of designs made independently of ours.

Run it by hand (python3 test/published/make-tables.py); the tests read only the JSON. Frequencies are relative to the
edge of the design (analogue) or to the sample rate (digital). The poles and zeros are evaluated as a product, since
polynomial coefficients of order 12 would lose digits.
"""

import json
import pathlib

import numpy
import scipy
from scipy import signal

HERE = pathlib.Path(__file__).parent
DIGITS = 12
ORDERS = range(1, 13)
RIPPLE_DB = 0.5
STOPBAND_DB = 60.0
RATE = 1.0


def attenuation(zeros, poles, gain, points):
    """-20 log10 |H| at complex points of the s or z plane."""
    total = numpy.full(len(points), numpy.log(abs(gain)))
    with numpy.errstate(divide="ignore"):
        for zero in zeros:
            total += numpy.log(abs(points - zero))
        for pole in poles:
            total -= numpy.log(abs(points - pole))
    return -20 / numpy.log(10) * total


def rounded(values):
    return [float(f"{value:.{DIGITS}g}") if numpy.isfinite(value) else 1e999 for value in values]


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
    return signal.ellipap(order, RIPPLE_DB, STOPBAND_DB)


RESPONSES = {
    "butterworth": "cutoff",
    "bessel": "cutoff",
    "chebyshev": "pass-edge",
    "inverse-chebyshev": "stop-edge",
    "elliptic": "pass-edge",
}


def transformed(zpk, shape, low, high):
    if shape == "low-pass":
        return signal.lp2lp_zpk(*zpk, wo=low)
    if shape == "high-pass":
        return signal.lp2hp_zpk(*zpk, wo=low)
    return signal.lp2bp_zpk(*zpk, wo=numpy.sqrt(low * high), bw=high - low)


def notches(zeros, frequency_of):
    """Frequencies of the zeros on the axis, away from 0 and the end."""
    found = sorted({float(f"{frequency_of(zero):.{DIGITS}g}") for zero in zeros})
    return [frequency for frequency in found if 0 < frequency < 1e6]


def pole_filters(shape_orders, edges, design, frequency_of, points):
    tables = []
    for shape, orders in shape_orders:
        low, high = edges[shape]
        for response, at in RESPONSES.items():
            for order in orders:
                zpk = design(prototype(response, order), shape, low, high)
                tables.append(
                    {
                        "response": response,
                        "order": order,
                        "shape": shape,
                        "edge": {"at": at, "lowHz": low, "highHz": high},
                        "notchesHz": notches(zpk[0], frequency_of),
                        "attenuationDb": rounded(attenuation(*zpk, points)),
                    }
                )
    return tables


def analogue():
    frequencies = numpy.array([float(f"{f:.{DIGITS}g}") for f in numpy.logspace(-2, 2, 200)])

    edges = {"low-pass": (1.0, 1.0), "high-pass": (1.0, 1.0), "band-pass": (0.8, 1.5)}
    shapes = [("low-pass", ORDERS), ("high-pass", (1, 4, 7)), ("band-pass", (1, 3, 6))]
    return {
        "rippleDb": RIPPLE_DB,
        "stopbandDb": STOPBAND_DB,
        "frequencies": frequencies.tolist(),
        "tables": pole_filters(shapes, edges, transformed, lambda zero: zero.imag, 1j * frequencies),
    }


def digital():
    frequencies = numpy.array([float(f"{f:.{DIGITS}g}") for f in numpy.logspace(-4, numpy.log10(0.4999), 200)])

    def design(zpk, shape, low, high):
        warped = [2 * RATE * numpy.tan(numpy.pi * f / RATE) for f in (low, high)]
        return signal.bilinear_zpk(*transformed(zpk, shape, *warped), fs=RATE)

    def frequency_of(zero):
        # 0 and half the rate are zeros of every high-pass and low-pass, and no notches.
        frequency = numpy.angle(zero) * RATE / (2 * numpy.pi)
        return 0 if frequency > 0.4999 * RATE else frequency

    edges = {"low-pass": (0.17, 0.17), "high-pass": (0.11, 0.11), "band-pass": (0.08, 0.21)}
    shapes = [("low-pass", ORDERS), ("high-pass", (2, 5)), ("band-pass", (2, 5))]
    return {
        "rateHz": RATE,
        "rippleDb": RIPPLE_DB,
        "stopbandDb": STOPBAND_DB,
        "frequencies": frequencies.tolist(),
        "tables": pole_filters(
            shapes, edges, design, frequency_of, numpy.exp(2j * numpy.pi * frequencies / RATE)
        ),
    }


def elliptic():
    """More ripples and stop bands, and the edges that follow from the design."""
    tables = []
    frequencies = numpy.array([float(f"{f:.{DIGITS}g}") for f in numpy.logspace(-1, 1, 41)])
    for ripple, stopband in ((0.01, 40.0), (0.1, 80.0), (1.0, 100.0), (2.5, 30.0)):
        for order in (2, 3, 5, 8, 11):
            zpk = signal.ellipap(order, ripple, stopband)
            tables.append(
                {
                    "order": order,
                    "rippleDb": ripple,
                    "stopbandDb": stopband,
                    "attenuationDb": rounded(attenuation(*zpk, 1j * frequencies)),
                }
            )
    return {"frequencies": frequencies.tolist(), "tables": tables}


def fir():
    """Taps given, and Kaiser's design; |H| as freqz computes it."""
    frequencies = numpy.array([float(f"{f:.{DIGITS}g}") for f in numpy.linspace(0, 0.5, 200)])
    rng = numpy.random.default_rng(20)
    given = {
        "boxcar of 7": numpy.ones(7) / 7,
        "random of 33": rng.standard_normal(33),
        "equiripple low-pass of 48": signal.remez(48, [0, 0.1, 0.15, 0.5], [1, 0], fs=1.0),
        "equiripple band-pass of 61": signal.remez(61, [0, 0.1, 0.15, 0.25, 0.3, 0.5], [0, 1, 0], fs=1.0),
    }
    tables = []
    for name, taps in given.items():
        taps = numpy.array(rounded(taps))
        _, response = signal.freqz(taps, worN=frequencies, fs=1.0)
        with numpy.errstate(divide="ignore"):
            tables.append(
                {
                    "name": name,
                    "taps": taps.tolist(),
                    "sum": float(taps.sum()),
                    "levelDb": rounded(20 * numpy.log10(abs(response))),
                }
            )
    designs = []
    for stopband, low, high in ((60.0, 0.2, 0.3), (90.0, 0.2, 0.25), (45.0, 0.05, 0.12), (18.0, 0.1, 0.2)):
        count, beta = signal.kaiserord(stopband, (high - low) / 0.5) if stopband > 8 else (1, 0)
        count = count if count % 2 == 1 else count + 1
        taps = signal.firwin(count, (low + high) / 2, window=("kaiser", beta), scale=False, fs=1.0)
        _, response = signal.freqz(taps, worN=frequencies, fs=1.0)
        designs.append(
            {
                "stopbandDb": stopband,
                "passHz": low,
                "stopHz": high,
                "beta": float(beta),
                "taps": rounded(taps),
                "attenuationDb": rounded(-20 * numpy.log10(abs(response) / abs(taps.sum()))),
            }
        )
    return {"frequencies": frequencies.tolist(), "given": tables, "kaiser": designs}


def write(name, content):
    made_by = {"scipy": scipy.__version__, "numpy": numpy.__version__, "script": "make-tables.py"}
    text = json.dumps({"madeBy": made_by, **content}, separators=(",", ":"))
    (HERE / name).write_text(text.replace("Infinity", "1e999") + "\n")


write("analogue.json", analogue())
write("digital.json", digital())
write("elliptic.json", elliptic())
write("fir.json", fir())
