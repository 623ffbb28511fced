/** The same as the service in a few lines: what it holds is kept in lists. */
export interface Model {
  readonly sweeps: { readonly file: number; readonly antenna: string; readonly id: string }[];
  /** Tags that the antenna had, the last one is that of now; and its note. */
  readonly edited: { tags: string[]; note: string };
  readonly tokens: { readonly id: string; readonly token: string; isRevoked: boolean }[];
  /** What a backup holds. */
  backup: Model | null;
}

export function emptyModel(tag: string): Model {
  return { sweeps: [], edited: { tags: [tag], note: '' }, tokens: [], backup: null };
}

export function copyOf({ sweeps, edited, tokens }: Model): Model {
  return structuredClone({ sweeps, edited, tokens, backup: null });
}

/** Each file was measured at a time of its own. */
export function measuredAt(file: number): string {
  return new Date(Date.UTC(2026, 0, 1 + ((file * 37) % 101))).toISOString();
}

/** Ids of an antenna's sweeps, newest first. */
export function listed({ sweeps }: Model, antenna: string): string[] {
  return sweeps
    .filter((sweep) => sweep.antenna === antenna)
    .sort((a, b) => measuredAt(b.file).localeCompare(measuredAt(a.file)))
    .map(({ id }) => id);
}
