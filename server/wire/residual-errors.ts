import { z } from 'zod';

const stated = (description: string, example: number) =>
  z
    .number()
    .min(0)
    .max(100)
    .nullable()
    .meta({ description, examples: [example] });

/** What is left of an analyzer's errors after its calibration, as instruments state it. */
export const residualErrorsSchema = z
  .strictObject({
    directivity_db: stated('How far below full reflection a perfect match reads.', 40),
    source_match_db: stated('Source match, below full reflection.', 35),
    tracking_db: stated('Greatest error of a full reflection.', 0.1),
  })
  .meta({
    id: 'ResidualErrors',
    description:
      "The analyzer's own residual errors, in dB; null where one is not known. They widen the half-widths of SWR and resistance. Without any, half-widths hold the noise of the sweep only.",
  });
