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
