/**
 * The sweep that the document, the first start and the README upload: an invented antenna, resonant
 * at 14.0 MHz with 25 ohm (SWR 2), whose SWR is lowest elsewhere, where its resistance nears 50 ohm.
 */
export const sampleFile = [
  '# MHz S RI R 50',
  '13.80 -0.5783 -0.5612',
  '13.85 -0.5958 -0.4068',
  '13.90 -0.5601 -0.2496',
  '13.95 -0.4696 -0.1086',
  '14.00 -0.3333 0.0000',
  '14.05 -0.1676 0.0684',
  '14.10 0.0099 0.0990',
  '14.15 0.1842 0.1014',
  '14.20 0.3450 0.0873',
  '',
].join('\n');

/** A sweep into 12 m of line with its far end open, for the document: delay and loss alone. */
export function sampleLineFile(): string {
  const rows = Array.from({ length: 101 }, (_, i) => {
    const hz = 1_000_000 + i * 1_000_000;
    const size = 10 ** -(0.022 * Math.sqrt(hz / 1e6));
    const angle = (-4 * Math.PI * hz * 12) / (0.66 * 299_792_458);
    return `${hz} ${(size * Math.cos(angle)).toFixed(5)} ${(size * Math.sin(angle)).toFixed(5)}`;
  });
  return `! invented: 12 m of line, far end open\n# HZ S RI R 50\n${rows.join('\n')}\n`;
}
