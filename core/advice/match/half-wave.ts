/** An angle in radians as wavelengths in [0, 1/2), after which a line repeats. */
export function halfWave(angle: number): number {
  return (((angle / (2 * Math.PI)) % 0.5) + 0.5) % 0.5;
}
