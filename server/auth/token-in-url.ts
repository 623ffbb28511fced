const accessToken = /[?&]access_token=/i;
const tokenAnywhere = /sl_[0-9A-Za-z]{36}/;

/** Whether a URL has a token in it, percent-encoded or not, or the parameter that is meant for one. */
export function carriesToken(url: string): boolean {
  const plain = url.replaceAll(/%([0-7][0-9a-f])/gi, (_, hex) =>
    String.fromCharCode(Number.parseInt(hex, 16)),
  );
  return accessToken.test(plain) || tokenAnywhere.test(plain);
}

/** The path of a URL as it may be logged: nothing of it where it has a token. */
export function pathForLog(url: string): string {
  const path = url.split('?', 1)[0];
  return carriesToken(path) ? '(a token stood here)' : path;
}
