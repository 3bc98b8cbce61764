"""Values of a discrete Fourier transform and of window figures from NumPy, for tests/unit/lib/signal.

Run: python3 scripts/reference/fftValues.py > tests/unit/lib/signal/fftValues.json
Made with NumPy 2.4 (pocketfft, an implementation that shares nothing with fft.js).
The input is a closed form, so that both sides make the same numbers: x(n) = sin(0.37 n²) + n/64.
"""

import json

import numpy as np

size = 64
n = np.arange(size)
x = np.sin(0.37 * n**2) + n / 64
spectrum = np.fft.rfft(x)

figures = {}
for name, coefficients in {
    "rectangular": [1.0],
    "hann": [0.5, 0.5],
    "hamming": [0.54, 0.46],
    "blackmanHarris4": [0.35875, 0.48829, 0.14128, 0.01168],
}.items():
    length = 4096
    k = np.arange(length)
    window = sum((-1) ** j * a * np.cos(2 * np.pi * j * k / length) for j, a in enumerate(coefficients))
    half_bin = abs(np.sum(window * np.exp(-1j * np.pi * k / length)))
    figures[name] = {
        "coefficients": coefficients,
        "coherentGain": window.mean(),
        "noiseBandwidthBins": length * np.sum(window**2) / window.sum() ** 2,
        "scallopingDecibels": -20 * np.log10(half_bin / window.sum()),
    }

print(
    json.dumps(
        {
            "source": f"NumPy {np.__version__}",
            "size": size,
            "real": spectrum.real.round(12).tolist(),
            "imaginary": spectrum.imag.round(12).tolist(),
            "windows": figures,
        },
        indent=2,
    )
)
