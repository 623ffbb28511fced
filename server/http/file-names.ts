const reserved = /^(con|prn|aux|nul|com\d|lpt\d)(\.|$)/i;
const maxLength = 100;

/**
 * A file name made of our own words: letters, digits, dots and hyphens only, never hidden, never a
 * name that an operating system keeps for itself. The uploader's name of a file is not used.
 */
export function safeFileName(stem: string, extension: string): string {
  const plain = stem
    .normalize('NFKD')
    .replace(/[^A-Za-z0-9-]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, maxLength - extension.length - 1);
  const name = plain === '' || reserved.test(plain) ? `sweep-${plain}` : plain;
  return `${name}.${extension}`;
}
