/** What a request may need. A route names one in its `config`; `public` needs nobody to ask. */
export const rights = ['read', 'measure', 'keep', 'administer'] as const;
export type Right = (typeof rights)[number];
export type RouteRight = Right | 'public';

/** What the club trusts a member with. */
export const roles = ['reader', 'measurer', 'keeper', 'steward'] as const;
export type Role = (typeof roles)[number];

const rightsByRole: Readonly<Record<Role, readonly Right[]>> = {
  /** Looks at everything but other people's particulars. */
  reader: ['read'],
  /** Uploads sweeps and checks, and adds analyzers and edits those. */
  measurer: ['read', 'measure'],
  /** Keeps sites, antennas, cables and every analyzer, and corrects what is told of sweeps. */
  keeper: ['read', 'measure', 'keep'],
  /** Administers people, their tokens and the club. */
  steward: ['read', 'measure', 'keep', 'administer'],
};

/** The rights of a role, or those of them that a token is narrowed to. */
export function rightsOf(role: Role, scopes: readonly Right[] | null = null): ReadonlySet<Right> {
  const all = rightsByRole[role];
  return new Set(scopes === null ? all : all.filter((right) => scopes.includes(right)));
}
