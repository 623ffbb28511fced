/** Where a figure was seen. `memory`: recalled handbook nominal, no copy seen, about +-15 %. */
export type CableSource =
  | 'association_table'
  | 'training_guide'
  | 'compiled_sheet'
  | 'military_summary'
  | 'county_page'
  | 'parallel_line_notes'
  | 'memory';

export const cableSources: Readonly<Record<CableSource, string>> = {
  association_table:
    "read in: a national amateur association's table of line loss, which derives from a maker's figures",
  training_guide: 'read in: a repeater training guide, table of nominal attenuation',
  compiled_sheet: 'read in: a compiled sheet of coaxial line data',
  military_summary:
    'read in: a posted summary (2004) of MIL-C-17/28 and /74: specification limits, not nominal',
  county_page: "read in: a county's emergency-communications page on cables",
  parallel_line_notes: 'read in: posted notes on measured parallel lines',
  memory: 'value from memory (handbook nominal, about +-15 %)',
};

/** `limit`: what a specification allows at most; never fitted. `doubtful`: its source contradicts itself. */
export type PointUse = 'nominal' | 'limit' | 'doubtful';

/** MHz, dB per 100 ft as printed, source, use. */
export type PrintedLoss = readonly [
  mhz: number,
  dbPer100Ft: number,
  source: CableSource,
  use?: PointUse,
];

export interface CableRow {
  readonly id: string;
  readonly name: string;
  /** Other ids under which records may name it. */
  readonly aliases: readonly string[];
  readonly characteristicOhm: number;
  readonly characteristicU95Ohm: number;
  readonly velocityFactor: number;
  readonly velocityFactorU95: number;
  readonly lossU95Fraction: number;
  /** How far impedance and velocity factor were seen in print. */
  readonly verified: string;
  readonly losses: readonly PrintedLoss[];
  readonly note: string | null;
}

const militaryCoax = { characteristicU95Ohm: 2, velocityFactorU95: 0.01, lossU95Fraction: 0.15 };
const genericCoax = { characteristicU95Ohm: 3, velocityFactorU95: 0.02, lossU95Fraction: 0.25 };

/**
 * Losses as their sources print them, per 100 ft. No MIL-DTL-17 slash sheet could be read in full:
 * every figure is nominal unless marked.
 */
export const cableRows: readonly CableRow[] = [
  {
    id: 'm17-28-rg58',
    name: 'M17/28-RG58',
    aliases: ['coax-50-pe-5mm'],
    characteristicOhm: 50,
    velocityFactor: 0.66,
    ...militaryCoax,
    verified:
      'Z0 50+-2 ohm read in: a posted summary of MIL-C-17/28; VF 0.66 read in: a compiled sheet of coaxial line data',
    losses: [
      [10, 1.4, 'compiled_sheet'],
      [30, 2.47, 'association_table'],
      [50, 3.3, 'training_guide'],
      [100, 4.9, 'memory'],
      [150, 5.63, 'association_table'],
      [150, 6.1, 'training_guide'],
      [450, 11.75, 'training_guide', 'doubtful'],
      [850, 17.75, 'training_guide'],
      [1000, 21.5, 'memory'],
      [1000, 28, 'military_summary', 'limit'],
    ],
    note: 'At 450 MHz the source prints 35.5 dB per 100 m beside 11.75 dB per 100 ft (10.82): one is a misprint, so the point is not fitted.',
  },
  {
    id: 'm17-74-rg213',
    name: 'M17/74-RG213',
    aliases: ['coax-50-pe-10mm'],
    characteristicOhm: 50,
    velocityFactor: 0.66,
    ...militaryCoax,
    verified:
      'Z0 50+-2 ohm read in: a posted summary of MIL-C-17/74; VF 0.66 read for the type before it in: a compiled sheet of coaxial line data',
    losses: [
      [10, 0.6, 'memory'],
      [30, 1.08, 'association_table'],
      [50, 1.5, 'training_guide'],
      [50, 1.2, 'military_summary', 'doubtful'],
      [100, 2.1, 'memory'],
      [150, 2.53, 'association_table'],
      [150, 2.7, 'training_guide'],
      [450, 4.97, 'training_guide'],
      [850, 7.53, 'training_guide'],
      [1000, 9, 'military_summary', 'limit'],
    ],
    note: 'The summary prints a limit of 1.2 dB at 50 MHz, below the nominal elsewhere: not fitted.',
  },
  {
    id: 'm17-60-rg142',
    name: 'M17/60-RG142',
    aliases: [],
    characteristicOhm: 50,
    velocityFactor: 0.695,
    ...militaryCoax,
    verified: 'Z0 and VF value from memory',
    losses: [
      [10, 1.1, 'memory'],
      [50, 2.7, 'memory'],
      [100, 3.9, 'memory'],
      [400, 8.2, 'memory'],
      [1000, 13.5, 'memory'],
    ],
    note: null,
  },
  {
    id: 'm17-119-rg174',
    name: 'M17/119-RG174',
    aliases: [],
    characteristicOhm: 50,
    velocityFactor: 0.66,
    ...militaryCoax,
    lossU95Fraction: 0.2,
    verified: 'VF 0.66 read in: a compiled sheet of coaxial line data; Z0 value from memory',
    losses: [
      [10, 3.3, 'compiled_sheet'],
      [30, 4.56, 'association_table'],
      [100, 8.4, 'memory'],
      [150, 10.3, 'association_table'],
      [400, 19, 'memory'],
      [1000, 34, 'memory'],
    ],
    note: 'Its centre conductor is thinner than the skin effect assumes: below about 20 MHz the fitted law reads too low.',
  },
  {
    id: 'm17-84-rg223',
    name: 'M17/84-RG223',
    aliases: [],
    characteristicOhm: 50,
    velocityFactor: 0.66,
    ...militaryCoax,
    verified: 'VF 0.66 read in: a compiled sheet of coaxial line data; Z0 value from memory',
    losses: [
      [10, 1.2, 'compiled_sheet'],
      [50, 3, 'memory'],
      [100, 4.5, 'memory'],
      [400, 9.6, 'memory'],
      [1000, 16.3, 'memory'],
    ],
    note: null,
  },
  {
    id: 'm17-6-rg11',
    name: 'M17/6-RG11',
    aliases: [],
    characteristicOhm: 75,
    velocityFactor: 0.66,
    ...militaryCoax,
    characteristicU95Ohm: 3,
    verified: 'VF 0.66 read in: a compiled sheet of coaxial line data; Z0 value from memory',
    losses: [
      [10, 0.7, 'compiled_sheet'],
      [50, 1.6, 'memory'],
      [100, 2.3, 'memory'],
      [400, 5.2, 'memory'],
      [1000, 8.8, 'memory'],
    ],
    note: null,
  },
  {
    id: 'm17-2-rg6',
    name: 'M17/2-RG6 (solid polyethylene)',
    aliases: [],
    characteristicOhm: 75,
    velocityFactor: 0.66,
    ...militaryCoax,
    characteristicU95Ohm: 3,
    verified: 'Z0 and VF value from memory',
    losses: [
      [10, 0.8, 'memory'],
      [50, 1.9, 'memory'],
      [100, 2.8, 'memory'],
      [400, 6.3, 'memory'],
      [1000, 10.5, 'memory'],
    ],
    note: 'Foam television cable of the same size differs: velocity factor 0.82 to 0.85 (value from memory). State it as an own cable.',
  },
  {
    id: 'rg8x-foam',
    name: 'RG-8X type, generic foam',
    aliases: ['coax-50-foam-6mm'],
    characteristicOhm: 50,
    velocityFactor: 0.8,
    ...genericCoax,
    velocityFactorU95: 0.03,
    verified:
      "Z0 50 ohm read in: a national amateur association's table of line loss; VF 0.78 to 0.82 value from memory",
    losses: [
      [10, 1, 'county_page'],
      [30, 1.96, 'association_table'],
      [30, 2, 'county_page'],
      [50, 2.3, 'county_page'],
      [150, 4.53, 'association_table'],
      [150, 4.7, 'county_page'],
      [450, 8.6, 'county_page'],
    ],
    note: null,
  },
  {
    id: 'rg59-pe',
    name: 'RG-59 type, generic solid polyethylene',
    aliases: ['coax-75-pe-6mm'],
    characteristicOhm: 75,
    velocityFactor: 0.66,
    ...genericCoax,
    verified:
      "VF 0.66 read in: a compiled sheet of coaxial line data; Z0 75 ohm read in: a national amateur association's table of line loss",
    losses: [
      [10, 1.1, 'compiled_sheet'],
      [30, 1.79, 'association_table'],
      [100, 3.4, 'memory'],
      [150, 4.11, 'association_table'],
      [400, 7.1, 'memory'],
      [1000, 12, 'memory'],
    ],
    note: null,
  },
  {
    id: 'coax-50-foam-10mm',
    name: 'Generic 50 ohm foam, 10 mm',
    aliases: [],
    characteristicOhm: 50,
    velocityFactor: 0.85,
    ...genericCoax,
    verified: 'Z0 and VF value from memory',
    losses: [
      [30, 0.7, 'memory'],
      [50, 0.9, 'memory'],
      [150, 1.5, 'memory'],
      [450, 2.7, 'memory'],
      [900, 3.9, 'memory'],
    ],
    note: null,
  },
  {
    id: 'half-inch-foam',
    name: 'Generic 50 ohm foam, half inch, corrugated',
    aliases: [],
    characteristicOhm: 50,
    velocityFactor: 0.88,
    ...genericCoax,
    verified: 'Z0 and VF value from memory',
    losses: [
      [50, 0.48, 'training_guide'],
      [100, 0.68, 'memory'],
      [150, 0.84, 'training_guide'],
      [450, 1.57, 'training_guide'],
      [850, 2.06, 'training_guide'],
      [1000, 2.3, 'memory'],
    ],
    note: null,
  },
  {
    id: 'ribbon-300',
    name: 'Generic 300 ohm ribbon line',
    aliases: ['ladder-300'],
    characteristicOhm: 300,
    characteristicU95Ohm: 20,
    velocityFactor: 0.82,
    velocityFactorU95: 0.03,
    lossU95Fraction: 0.3,
    verified: 'Z0 and VF value from memory',
    losses: [
      [1, 0.09, 'memory'],
      [10, 0.3, 'memory'],
      [100, 1.1, 'parallel_line_notes'],
      [100, 1.4, 'parallel_line_notes'],
    ],
    note: 'Of the two losses at 100 MHz the lower belongs to thicker wire. Moisture raises loss strongly.',
  },
  {
    id: 'window-450',
    name: 'Generic 450 ohm window line',
    aliases: ['ladder-450'],
    characteristicOhm: 400,
    characteristicU95Ohm: 40,
    velocityFactor: 0.91,
    velocityFactorU95: 0.02,
    lossU95Fraction: 0.3,
    verified:
      'read in: posted notes on measured parallel lines: four samples sold as 450 ohm were 400/0.902, 380/0.918, 395/0.902 and 360/0.930 (Z0/VF)',
    losses: [
      [1, 0.02, 'memory'],
      [10, 0.08, 'memory'],
      [100, 0.3, 'memory'],
    ],
    note: '450 ohm is a label: measured samples are 360 to 405 ohm, so 400 ohm is calculated with. Moisture raises loss strongly.',
  },
];
