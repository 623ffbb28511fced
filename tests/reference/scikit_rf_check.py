"""Reads Touchstone files with scikit-rf, a general-purpose network library, and prints what it sees.

Arguments: the files. Output: JSON, per file the reflections and the grid's lowest SWR.
"""

import json
import sys

import numpy as np

# The library of this distribution uses a name that newer numpy no longer has.
np.complex = complex

import skrf  # noqa: E402

answers = []
for path in sys.argv[1:]:
    network = skrf.Network(path)
    reflection = network.s[:, 0, 0]
    magnitude = np.abs(reflection)
    swr = (1 + magnitude) / (1 - magnitude)
    lowest = int(np.argmin(swr))
    answers.append(
        {
            "frequency_hz": network.f.tolist(),
            "re": reflection.real.tolist(),
            "im": reflection.imag.tolist(),
            "reference_ohm": float(network.z0[0, 0].real),
            "minimum_swr": float(swr[lowest]),
            "minimum_hz": float(network.f[lowest]),
        }
    )
print(json.dumps(answers))
