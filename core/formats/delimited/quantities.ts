import type { PhaseKnowledge } from '../../sweep.ts';

export type Unit =
  | 'Hz'
  | 'kHz'
  | 'MHz'
  | 'GHz'
  | 'ohm'
  | 'kohm'
  | 'S'
  | 'mS'
  | 'deg'
  | 'rad'
  | 'dB'
  | 'fraction'
  | 'percent';

/** What a column can hold. The list is closed. */
export type Quantity =
  | 'frequency'
  | 'reflection_re'
  | 'reflection_im'
  | 'reflection_im_magnitude'
  | 'reflection_magnitude'
  | 'reflection_db'
  | 'return_loss'
  | 'reflected_power'
  | 'swr'
  | 'reflection_angle'
  | 'reflection_angle_magnitude'
  | 'resistance'
  | 'reactance'
  | 'reactance_magnitude'
  | 'impedance_magnitude'
  | 'impedance_angle'
  | 'impedance_angle_magnitude'
  | 'parallel_resistance'
  | 'parallel_reactance'
  | 'conductance'
  | 'susceptance';

/** Which side of the reference a quantity lies on: a mix of both fixes the reference. */
type Side = 'reflection' | 'impedance';

interface QuantityFacts {
  /** The first is taken where none is written, unless one must be written. */
  readonly units: readonly Unit[];
  readonly mustSayUnit: boolean;
  readonly side: Side | null;
  /** The least that must be known of the phase to compute the quantity from the reflection. */
  readonly needs: PhaseKnowledge;
  readonly isMagnitude: boolean;
  readonly meaning: string;
}

const hertz: readonly Unit[] = ['Hz', 'kHz', 'MHz', 'GHz'];
const ohms: readonly Unit[] = ['ohm', 'kohm'];
const angles: readonly Unit[] = ['deg', 'rad'];
const siemens: readonly Unit[] = ['S', 'mS'];
const shares: readonly Unit[] = ['fraction', 'percent'];

function facts(
  units: readonly Unit[],
  side: Side | null,
  needs: PhaseKnowledge,
  meaning: string,
  { mustSayUnit = false, isMagnitude = false } = {},
): QuantityFacts {
  return { units, mustSayUnit, side, needs, isMagnitude, meaning };
}

const said = { mustSayUnit: true };
const magnitude = { isMagnitude: true };

const table: Readonly<Record<Quantity, QuantityFacts>> = {
  frequency: facts(hertz, null, 'none', 'frequency', said),
  reflection_re: facts([], 'reflection', 'unsigned', 'real part of the reflection coefficient'),
  reflection_im: facts([], 'reflection', 'signed', 'imaginary part of the reflection coefficient'),
  reflection_im_magnitude: facts(
    [],
    'reflection',
    'unsigned',
    'imaginary part of the reflection coefficient, sign unknown',
    magnitude,
  ),
  reflection_magnitude: facts(
    shares,
    'reflection',
    'none',
    'magnitude of the reflection coefficient',
    magnitude,
  ),
  reflection_db: facts(
    ['dB'],
    'reflection',
    'none',
    'the same in dB: not above 0 for a passive antenna',
  ),
  return_loss: facts(
    ['dB'],
    'reflection',
    'none',
    'return loss in dB: not below 0 for a passive antenna',
  ),
  reflected_power: facts(
    shares,
    'reflection',
    'none',
    'reflected power as a share of the incident',
    { mustSayUnit: true, isMagnitude: true },
  ),
  swr: facts([], 'reflection', 'none', 'standing wave ratio, written 1.5 or 1.5:1', magnitude),
  reflection_angle: facts(
    angles,
    'reflection',
    'signed',
    'angle of the reflection coefficient',
    said,
  ),
  reflection_angle_magnitude: facts(
    angles,
    'reflection',
    'unsigned',
    'angle of the reflection coefficient, sign unknown',
    { mustSayUnit: true, isMagnitude: true },
  ),
  resistance: facts(ohms, 'impedance', 'unsigned', 'series resistance'),
  reactance: facts(ohms, 'impedance', 'signed', 'series reactance with its sign'),
  reactance_magnitude: facts(
    ohms,
    'impedance',
    'unsigned',
    'series reactance, sign unknown',
    magnitude,
  ),
  impedance_magnitude: facts(
    ohms,
    'impedance',
    'unsigned',
    'magnitude of the impedance',
    magnitude,
  ),
  impedance_angle: facts(angles, 'impedance', 'signed', 'angle of the impedance', said),
  impedance_angle_magnitude: facts(
    angles,
    'impedance',
    'unsigned',
    'angle of the impedance, sign unknown',
    { mustSayUnit: true, isMagnitude: true },
  ),
  parallel_resistance: facts(ohms, 'impedance', 'unsigned', 'equivalent parallel resistance'),
  parallel_reactance: facts(
    ohms,
    'impedance',
    'signed',
    'equivalent parallel reactance with its sign',
  ),
  conductance: facts(siemens, 'impedance', 'unsigned', 'conductance', said),
  susceptance: facts(siemens, 'impedance', 'signed', 'susceptance with its sign', said),
};

const names = Object.keys(table).filter(isQuantity);

/** All quantities, in the order in which they are documented. */
export const quantities: readonly Quantity[] = names;

export function isQuantity(name: string): name is Quantity {
  return Object.hasOwn(table, name);
}

export function factsOf(quantity: Quantity): QuantityFacts {
  return table[quantity];
}

/** Decimal exponent that brings a unit to Hz, ohm, siemens or a fraction. */
const shifts: Readonly<Partial<Record<Unit, number>>> = {
  kHz: 3,
  MHz: 6,
  GHz: 9,
  kohm: 3,
  mS: -3,
  percent: -2,
};

export function decimalShift(unit: Unit | null): number {
  return unit === null ? 0 : (shifts[unit] ?? 0);
}
