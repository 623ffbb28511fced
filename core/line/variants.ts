import type { Cable } from './cable.ts';
import type { FeedLine, LineSection } from './feed-line.ts';

/** The same line with one uncertain quantity at either end of its 95 % interval. */
export interface LineVariant {
  readonly quantity: 'length' | 'velocity_factor' | 'loss' | 'characteristic_impedance';
  readonly plus: FeedLine;
  readonly minus: FeedLine;
}

/**
 * Every independent uncertain quantity of a line: the length of each section, and velocity factor,
 * loss and impedance of each cable (sections of one cable err together). Known ones are left out.
 */
export function lineVariants(line: FeedLine): readonly LineVariant[] {
  const variants: LineVariant[] = [];
  for (const [index, section] of line.sections.entries()) {
    if (section.lengthU95M > 0) variants.push(lengthVariant(line, index));
  }
  const cables = new Set(line.sections.map((section) => section.cable));
  for (const cable of cables) {
    const { velocityFactorU95, lossU95Fraction, characteristicU95Ohm } = cable;
    if (velocityFactorU95 > 0) {
      variants.push(cableVariant(line, cable, 'velocity_factor', velocityFactorU95));
    }
    if (lossU95Fraction > 0) variants.push(cableVariant(line, cable, 'loss', lossU95Fraction));
    if (characteristicU95Ohm > 0) {
      variants.push(cableVariant(line, cable, 'characteristic_impedance', characteristicU95Ohm));
    }
  }
  return variants;
}

function lengthVariant(line: FeedLine, index: number): LineVariant {
  const moved = (sign: number): FeedLine => ({
    ...line,
    sections: line.sections.map((section, i) =>
      i === index
        ? { ...section, lengthM: Math.max(0, section.lengthM + sign * section.lengthU95M) }
        : section,
    ),
  });
  return { quantity: 'length', plus: moved(1), minus: moved(-1) };
}

function cableVariant(
  line: FeedLine,
  cable: Cable,
  quantity: Exclude<LineVariant['quantity'], 'length'>,
  halfWidth: number,
): LineVariant {
  const moved = (change: number): FeedLine => ({
    ...line,
    sections: line.sections.map((section) =>
      section.cable === cable ? sectionMoved(section, quantity, change) : section,
    ),
  });
  return { quantity, plus: moved(halfWidth), minus: moved(-halfWidth) };
}

function sectionMoved(
  section: LineSection,
  quantity: Exclude<LineVariant['quantity'], 'length'>,
  change: number,
): LineSection {
  const { cable } = section;
  switch (quantity) {
    case 'loss':
      return withLoss(section, 1 + change);
    case 'velocity_factor':
      return { ...section, cable: { ...cable, velocityFactor: cable.velocityFactor + change } };
    case 'characteristic_impedance':
      return {
        ...section,
        cable: { ...cable, characteristicOhm: cable.characteristicOhm + change },
      };
  }
}

function withLoss(section: LineSection, stated: number): LineSection {
  const factor = Math.max(0, stated);
  const { attenuation } = section.cable;
  return {
    ...section,
    extraLossDb: section.extraLossDb * factor,
    cable: {
      ...section.cable,
      attenuation: {
        ...attenuation,
        conductorDbPer100M: attenuation.conductorDbPer100M * factor,
        dielectricDbPer100M: attenuation.dielectricDbPer100M * factor,
      },
    },
  };
}
