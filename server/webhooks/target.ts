import ipaddr from 'ipaddr.js';

/**
 * Whether an address is one of the public internet: neither private, loopback, link-local, shared,
 * multicast nor reserved (the IANA special-purpose registries, RFC 6890), nor one that embeds
 * another address in itself.
 */
export function isPublicAddress(address: string): boolean {
  return ipaddr.isValid(address) && ipaddr.process(address).range() === 'unicast';
}

/** What is wrong with a URL as the target of a webhook; null: nothing that can be seen from it. */
export function targetFault(text: string, allowPrivate: boolean): string | null {
  const url = new URL(text);
  if (url.username !== '' || url.password !== '') return 'It must not carry a user or password.';
  if (url.hash !== '') return 'It must not have a fragment.';
  if (allowPrivate) return null;
  if (url.protocol !== 'https:') return 'It must begin with https:// here.';
  const host = hostOf(url);
  if (ipaddr.isValid(host) && !isPublicAddress(host)) return 'The address is not a public one.';
  return null;
}

/** The host without the brackets of IPv6. */
export function hostOf({ hostname }: URL): string {
  return hostname.replace(/^\[(.*)\]$/, '$1');
}
