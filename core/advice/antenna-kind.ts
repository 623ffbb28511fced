/** What kind of antenna a record says it is. */
export type AntennaKind =
  | 'dipole'
  | 'loaded_dipole'
  | 'trap_dipole'
  | 'off_centre_fed'
  | 'end_fed'
  | 'vertical'
  | 'vertical_with_radials'
  | 'five_eighths_vertical'
  | 'loop'
  | 'small_loop'
  | 'beam'
  | 'other';

/** How an antenna's resonance follows its length. */
export type TrimBehaviour =
  /** A bare resonant wire or tube: frequency goes with 1/length. */
  | 'bare'
  /** Loading, traps, a top hat or coupled elements: it follows length in a way of its own. */
  | 'own_way'
  /** Its length does not set it. */
  | 'not_by_length';

/** `vertical` and `other` say too little to be taken for bare. */
export function trimBehaviour(kind: AntennaKind): TrimBehaviour {
  switch (kind) {
    case 'dipole':
    case 'off_centre_fed':
    case 'end_fed':
    case 'vertical_with_radials':
    case 'loop':
      return 'bare';
    case 'small_loop':
      return 'not_by_length';
    default:
      return 'own_way';
  }
}
