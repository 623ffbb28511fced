import { type AttenuationPoint, leastSquares } from './attenuation.ts';
import type { Cable } from './cable.ts';
import {
  type CableRow,
  type CableSource,
  cableRows,
  cableSources,
  type PointUse,
  type PrintedLoss,
} from './cable-table.ts';

/** One printed loss, converted to metres. */
export interface SourcedLoss extends AttenuationPoint {
  readonly source: CableSource;
  /** Where it was read, or that it is recalled. */
  readonly verified: string;
  /** Only `nominal` losses are fitted. */
  readonly use: PointUse;
}

/** A cable of the built-in list, with where each of its figures is from. */
export interface CatalogueCable extends Cable {
  readonly aliases: readonly string[];
  readonly verified: string;
  readonly losses: readonly SourcedLoss[];
  readonly note: string | null;
}

/** 100 ft in hundreds of metres. */
const HUNDRED_FEET = 0.3048;

/** Generic and military types only, in the order of the table. */
export const cables: readonly CatalogueCable[] = cableRows.map(fromRow);

const byName = new Map(
  cables.flatMap((cable) => [cable.id, ...cable.aliases].map((name) => [name, cable])),
);

/** The built-in cable of this id or alias, or null. */
export function findCable(id: string): CatalogueCable | null {
  return byName.get(id) ?? null;
}

function fromRow(row: CableRow): CatalogueCable {
  const losses = row.losses.map(converted);
  return {
    id: row.id,
    name: row.name,
    aliases: row.aliases,
    characteristicOhm: row.characteristicOhm,
    characteristicU95Ohm: row.characteristicU95Ohm,
    velocityFactor: row.velocityFactor,
    velocityFactorU95: row.velocityFactorU95,
    attenuation: leastSquares(losses.filter((loss) => loss.use === 'nominal')),
    lossU95Fraction: row.lossU95Fraction,
    verified: row.verified,
    losses,
    note: row.note,
  };
}

function converted([mhz, dbPer100Ft, source, use]: PrintedLoss): SourcedLoss {
  return {
    frequencyHz: mhz * 1e6,
    lossDbPer100M: dbPer100Ft / HUNDRED_FEET,
    source,
    verified: cableSources[source],
    use: use ?? 'nominal',
  };
}
