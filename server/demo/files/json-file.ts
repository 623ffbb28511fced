import { textBytes, type WriteSweepFile } from './sweep-file.ts';

/** The service's own JSON sweep. */
export const jsonFile: WriteSweepFile = ({ frequencyHz, reflection, referenceOhm }, title) => ({
  extension: '.json',
  bytes: textBytes([
    JSON.stringify({
      format: 'sweep-ledger/sweep',
      version: 1,
      note: title,
      reference_ohm: referenceOhm,
      frequency_hz: frequencyHz,
      reflection_re: reflection.map(({ re }) => Number(re.toFixed(6))),
      reflection_im: reflection.map(({ im }) => Number(im.toFixed(6))),
    }),
  ]),
});
