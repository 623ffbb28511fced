"""Resonances and the lowest SWR of one port of a Touchstone file by plain linear interpolation.

A second way to the same answers that shares nothing with the project: numpy, its own reading of the
file, straight lines between neighbouring points. Prints JSON. Each crossing comes with a bound of
what linear interpolation may be off by: h^2/8 |x''| / |x'| (numerical analysis, error of linear
interpolation) from second differences, plus two standard deviations of the points' own scatter,
estimated from third differences (divided by sqrt 20, their noise gain).
"""

import json
import sys

import numpy as np

UNITS = {"HZ": 1.0, "KHZ": 1e3, "MHZ": 1e6, "GHZ": 1e9}


def read(path, port):
    rows = []
    with open(path, encoding="latin-1") as lines:
        for line in lines:
            text = line.split("!")[0].strip()
            if text.startswith("#"):
                unit, _, form, _, reference = text[1:].upper().split()[:5]
            elif text:
                rows.append([float(cell) for cell in text.split()])
    table = np.array(rows)
    first = 1 if port == 1 else 7
    a, b = table[:, first], table[:, first + 1]
    if form == "RI":
        reflection = a + 1j * b
    else:
        magnitude = a if form == "MA" else 10 ** (a / 20)
        reflection = magnitude * np.exp(1j * np.deg2rad(b))
    return table[:, 0] * UNITS[unit], reflection, float(reference)


def crossings(frequency, reactance):
    found = []
    for i in np.nonzero(np.sign(reactance[:-1]) * np.sign(reactance[1:]) < 0)[0]:
        if i < 3 or i + 4 >= len(reactance):
            continue
        step = frequency[i + 1] - frequency[i]
        rise = reactance[i + 1] - reactance[i]
        near = reactance[i - 2 : i + 4]
        curvature = np.abs(np.diff(near, 2)).max()
        scatter = np.sqrt(np.mean(np.diff(reactance[i - 3 : i + 5], 3) ** 2) / 20)
        found.append(
            {
                "frequency_hz": frequency[i] - reactance[i] * step / rise,
                "kind": "series" if rise > 0 else "parallel",
                "bound_hz": (curvature / 8 + 2 * scatter) * step / abs(rise),
                # Clear of its neighbours: the sign stays the same for three points on each side.
                "clear": bool(
                    np.all(np.sign(reactance[i - 2 : i + 1]) == np.sign(reactance[i]))
                    and np.all(np.sign(reactance[i + 1 : i + 4]) == np.sign(reactance[i + 1]))
                ),
            }
        )
    return found


def main(path, port):
    frequency, reflection, reference = read(path, int(port))
    impedance = reference * (1 + reflection) / (1 - reflection)
    swr = (1 + np.abs(reflection)) / (1 - np.abs(reflection))
    lowest = int(np.argmin(swr))
    around = swr[max(0, lowest - 2) : lowest + 3]
    answer = {
        "frequency_hz": frequency.tolist(),
        "re": reflection.real.tolist(),
        "im": reflection.imag.tolist(),
        "reference_ohm": reference,
        "crossings": crossings(frequency, impedance.imag),
        "lowest": {
            "frequency_hz": frequency[lowest],
            "step_hz": frequency[1] - frequency[0],
            "swr": swr[lowest],
            "spread_of_neighbours": around.max() - around.min(),
        },
    }
    print(json.dumps(answer))


main(*sys.argv[1:])
