/** The sweep that the document, the first start and the README upload: a short Touchstone file. */
export const sampleFile = [
  '# Hz S RI R 50',
  '13900000 0.35 -0.38',
  '14000000 0.18 -0.28',
  '14100000 0.09 -0.10',
  '14200000 0.14 0.12',
  '14300000 0.27 0.26',
  '',
].join('\n');
