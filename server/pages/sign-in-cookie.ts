import type { FastifyReply, FastifyRequest } from 'fastify';

const cookieName = 'sweep-ledger-token';
const keptSeconds = 30 * 24 * 3600;

/** The token that somebody signed in with; null if nobody did. The interface itself never looks. */
export function signInToken(request: FastifyRequest): string | null {
  return request.cookies[cookieName] ?? null;
}

/** Keeps a token in the browser: out of reach of scripts, and never sent from another site. */
export function keepSignedIn(
  reply: FastifyReply,
  token: string,
  { publicUrl, forLonger }: { readonly publicUrl: string; readonly forLonger: boolean },
): void {
  reply.setCookie(cookieName, token, {
    ...attributes(publicUrl),
    ...(forLonger ? { maxAge: keptSeconds } : {}),
  });
}

/** Forgets the token. */
export function signOut(reply: FastifyReply, publicUrl: string): void {
  reply.clearCookie(cookieName, attributes(publicUrl));
}

function attributes(publicUrl: string) {
  return {
    path: '/',
    httpOnly: true,
    sameSite: 'strict',
    secure: publicUrl.startsWith('https:'),
  } as const;
}
