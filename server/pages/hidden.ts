/** Pages are not part of the documented interface, and need no right of their own. */
export const hidden = { config: { right: 'public' }, schema: { hide: true } } as const;
