import { readSweep } from '../../core/formats/read-sweep.ts';
import { type Figure, sideBySide } from './measure.ts';
import { asDelimited, asTouchstone, typicalSweep } from './typical-sweep.ts';

const points = 1601;

/** Text to `Sweep`, all checks included, against JSON.parse of the same numbers. */
export function readingFigures(): readonly Figure[] {
  const sweep = typicalSweep(points);
  const json = JSON.stringify(sweep);
  const touchstone = Buffer.from(asTouchstone(sweep));
  const delimited = Buffer.from(asDelimited(sweep));
  const columns = 'frequency:Hz,reflection_re,reflection_im';
  const read = (bytes: Uint8Array, mapping?: string) => {
    const result = readSweep(bytes, mapping === undefined ? {} : { columns: mapping });
    if (!result.ok) throw new Error(result.error.detail);
    return result.value;
  };
  const parse = () => JSON.parse(json);
  const ofTouchstone = sideBySide(parse, () => read(touchstone));
  const ofDelimited = sideBySide(parse, () => read(delimited, columns));
  return [
    {
      key: 'parse_vs_json',
      value: ofTouchstone.ratio,
      aim: '>= 1.3',
      unit: 'JSON.parse time / ours',
      detail: `${points} points: ${ofTouchstone.secondUs.toFixed(0)} us, JSON.parse ${ofTouchstone.firstUs.toFixed(0)} us`,
    },
    {
      key: 'parse_mb_s',
      value: touchstone.length / ofTouchstone.secondUs,
      aim: 'report',
      unit: 'MB/s',
      detail: `${touchstone.length} bytes of Touchstone`,
    },
    {
      key: 'delimited_vs_json',
      value: ofDelimited.ratio,
      aim: '>= 0.5',
      unit: 'JSON.parse time / ours',
      detail: `${points} rows: ${ofDelimited.secondUs.toFixed(0)} us`,
    },
  ];
}
