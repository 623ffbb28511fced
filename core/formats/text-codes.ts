const lineFeed = 10;
const notAscii = 127;
const padding = 8;
const encoder = new TextEncoder();

/**
 * The characters of a text as bytes, one for each, for loops that look at all of them: a typed
 * array is read several times as fast as a string. Characters beyond ASCII become 127. Behind the
 * text stand line feeds, so that a reader meets the end of a line before the end of the array.
 */
export function textCodes(text: string): Uint8Array<ArrayBuffer> {
  const codes = new Uint8Array(text.length + padding);
  const { read, written } = encoder.encodeInto(text, codes);
  if (read !== text.length || written !== text.length) {
    for (let i = 0; i < text.length; i++) codes[i] = Math.min(text.charCodeAt(i), notAscii);
  }
  return codes.fill(lineFeed, text.length);
}
