"""Lossy line cascades by scikit-rf 0.15, a general-purpose network library: JSON in, JSON out."""

import json
import sys

import numpy as np
import skrf
from skrf.media import DefinedGammaZ0

LIGHT = 299_792_458.0


def medium(cable, hz, frequency):
    mhz = hz / 1e6
    neper = np.log(10) / 20 / 100
    conductor = cable["k1"] * np.sqrt(mhz) * neper
    dielectric = cable["k2"] * mhz * neper
    omega = 2 * np.pi * hz
    gamma = conductor + dielectric + 1j * omega / (cable["velocity_factor"] * LIGHT)
    capacitance = 1 / (cable["ohm"] * cable["velocity_factor"] * LIGHT)
    conductance = 2 * dielectric / cable["ohm"]
    z0 = gamma / (conductance + 1j * omega * capacitance)
    return DefinedGammaZ0(frequency, z0=z0, gamma=gamma)


def answer(case):
    hz = np.array(case["frequency_hz"])
    frequency = skrf.Frequency.from_f(hz, unit="hz")
    reference = case["reference_ohm"]
    air = DefinedGammaZ0(frequency, z0=reference, gamma=1j)
    impedance = np.array(case["load_re"]) + 1j * np.array(case["load_im"])
    network = air.load((impedance - reference) / (impedance + reference))
    for section in reversed(case["sections"]):
        # cascading networks of unlike impedance puts the step between them
        network = medium(section, hz, frequency).line(section["length_m"], "m") ** network
    network = air.thru() ** network
    reflection = network.s[:, 0, 0]
    return {"re": reflection.real.tolist(), "im": reflection.imag.tolist()}


answers = [answer(case) for case in json.load(sys.stdin)]
print("answers", json.dumps(answers))
