export function sorted(values: readonly number[]): number[] {
  return [...values].sort((a, b) => a - b);
}

/** Of ascending values; NaN where there are none. */
export function quantile(ascending: readonly number[], p: number): number {
  if (ascending.length === 0) return Number.NaN;
  return ascending[Math.min(ascending.length - 1, Math.ceil(p * ascending.length) - 1)];
}

export function median(values: readonly number[]): number {
  return quantile(sorted(values), 0.5);
}

export function rms(values: readonly number[]): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
}
