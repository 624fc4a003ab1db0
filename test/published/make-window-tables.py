"""Makes windows.json beside it with SciPy: samples of windows, and their figures of merit computed independently of ours.

Run it by hand (python3 test/published/make-window-tables.py); the tests read only the JSON. Windows are periodic
(sym=False). Figures are those of F. J. Harris, Proc. IEEE 1978, table 1; bandwidths are taken at half of the power and
half of the amplitude.
"""

import json
import pathlib

import numpy
import scipy
from scipy import optimize, signal
from scipy.signal import windows

HERE = pathlib.Path(__file__).parent
DIGITS = 12
SHORT = 48
LONG = 8192
PADDED = 2**21
OFFSETS = [0.5, 1.0, 1.5, 2.5, 3.5, 4.5, 5.5, 8.5, 16.5, 40.5, 100.5, 400.5]
OVERLAPS = [0.25, 0.5, 0.625, 0.75, 0.875]

EXACT_BLACKMAN = [7938 / 18608, 9240 / 18608, 1430 / 18608]
THREE_TERMS = [0.42323, 0.49755, 0.07922]
ISO_FLAT_TOP = numpy.array([1, 1.933, 1.286, 0.388, 0.0322]) / 4.6392

WINDOWS = {
    "rectangle": lambda n: windows.boxcar(n, sym=False),
    "triangle": lambda n: windows.bartlett(n, sym=False),
    "hann": lambda n: windows.hann(n, sym=False),
    "hamming": lambda n: windows.hamming(n, sym=False),
    "blackman": lambda n: windows.blackman(n, sym=False),
    "blackman-exact": lambda n: windows.general_cosine(n, EXACT_BLACKMAN, sym=False),
    "blackman-harris-3": lambda n: windows.general_cosine(n, THREE_TERMS, sym=False),
    "blackman-harris": lambda n: windows.blackmanharris(n, sym=False),
    "nuttall": lambda n: windows.nuttall(n, sym=False),
    "flat-top": lambda n: windows.general_cosine(n, ISO_FLAT_TOP, sym=False),
    **{
        f"kaiser-bessel-{alpha:g}": lambda n, alpha=alpha: windows.kaiser(n, numpy.pi * alpha, sym=False)
        for alpha in (2, 2.5, 3, 3.5)
    },
    **{
        f"gaussian-{alpha:g}": lambda n, alpha=alpha: windows.gaussian(n, n / (2 * alpha), sym=False)
        for alpha in (2.5, 3, 3.5)
    },
    **{f"tukey-{taper:g}": lambda n, taper=taper: windows.tukey(n, taper, sym=False) for taper in (0.25, 0.5, 0.75)},
}


def rounded(values):
    return [float(f"{value:.{DIGITS}g}") for value in values]


def amplitude(samples, offset):
    """|transform| at an offset in bins, 1 at 0."""
    turns = numpy.exp(-2j * numpy.pi * offset * numpy.arange(len(samples)) / len(samples))
    return abs(samples @ turns) / samples.sum()


def width(samples, level):
    past = 0.25
    while amplitude(samples, past) > level:
        past += 0.25
    return 2 * optimize.brentq(lambda offset: amplitude(samples, offset) - level, past - 0.25, past, xtol=1e-12)


def side_lobes(samples):
    """Highest side lobe in dB: the highest maximum past the last hollow of the main lobe."""
    levels = abs(numpy.fft.rfft(samples, PADDED))
    levels /= levels[0]
    first = int(numpy.argmax(levels < 0.4))
    peaks, _ = signal.find_peaks(levels[first:])
    return 20 * numpy.log10(levels[first:][peaks].max())


def table(name, make):
    samples = make(LONG)
    shared = [int(round(overlap * LONG)) for overlap in OVERLAPS]
    figures = {
        "coherentGain": samples.mean(),
        "noiseBandwidthBins": LONG * (samples**2).sum() / samples.sum() ** 2,
        "scallopingLossDb": -20 * numpy.log10(amplitude(samples, 0.5)),
        "highestSideLobeDb": side_lobes(samples),
        "bandwidth3DbBins": width(samples, 0.5**0.5),
        "bandwidth6DbBins": width(samples, 0.5),
    }
    return {
        "window": name,
        "samples": rounded(make(SHORT)),
        "figures": dict(zip(figures, rounded(figures.values()))),
        "leakageDb": rounded(20 * numpy.log10(amplitude(samples, offset)) for offset in OFFSETS),
        "overlapCorrelation": rounded(
            (samples[:part] * samples[LONG - part :]).sum() / (samples**2).sum() for part in shared
        ),
    }


content = {
    "madeBy": {"scipy": scipy.__version__, "numpy": numpy.__version__, "script": "make-window-tables.py"},
    "offsetsBins": OFFSETS,
    "overlaps": OVERLAPS,
    "flatTopOfSciPy": rounded(windows.flattop(SHORT, sym=False)),
    "tables": [table(name, make) for name, make in WINDOWS.items()],
}
(HERE / "windows.json").write_text(json.dumps(content, separators=(",", ":")) + "\n")
