import type { Caution } from '../analysis/summary.ts';

/**
 * What stands on every report. The service sees numbers, never the place: each caution points to
 * the rules and the licensed practice that hold there, and none declares anything safe.
 */
export const standingCautions: readonly Caution[] = [
  {
    code: 'emission_width_at_edge',
    detail:
      'Band and segment edges bound the whole emission, sidebands included. A signal tuned to an edge reaches past it: keep at least half its width (all of it on one side for single sideband) inside, and drift as well.',
  },
  {
    code: 'low_swr_proves_little',
    detail:
      'A low SWR proves neither resonance nor efficiency. A lossy line, load, coil or ground also lowers it; judge the antenna by its resistance, its losses and what it radiates.',
  },
  {
    code: 'rf_exposure',
    detail:
      'Transmitting exposes people near the antenna to radio-frequency fields. Evaluate exposure by the limits and the method that apply where the station stands, and keep people at the distance found; this report does not do it.',
  },
  {
    code: 'antenna_voltage',
    detail:
      'Even modest power makes voltages that burn and kill at wire ends, loading coils, traps, tuning capacitors and mismatched lines. Place them out of reach, and never touch or adjust them while anyone may transmit.',
  },
  {
    code: 'power_lines',
    detail:
      'Keep antennas, masts, ropes and ladders far from power lines, also while they are raised, lowered or falling: further than their full length. Contact kills. Ask the network operator and follow local rules.',
  },
  {
    code: 'lightning',
    detail:
      'Neither measure nor operate with thunder about, and disconnect the analyzer before weather or static reaches it. Grounding and lightning protection follow local codes and belong to qualified hands.',
  },
  {
    code: 'climbing',
    detail:
      'Climb masts, towers and roofs only if trained, with fall protection, never alone and with transmitters locked out; local work rules hold. When in doubt leave it to a rigger.',
  },
];
