/** A cable size with the fuse that protects it: the window between what flows and what the cable may carry. */
import { largestDevice } from '../checks/fuseRules.ts';
import { ampacity } from '../conductor/ampacity.ts';
import { areaOf } from '../conductor/size.ts';
import type { Practice } from '../job/job.ts';
import type { ConductorSize } from '../job/part.ts';
import type { SmallestConductor } from '../tables/practiceTable.ts';
import type { Tables } from '../tables/tables.ts';

export interface ProtectedRun {
  readonly size: ConductorSize;
  readonly ratingA: number;
}

/** Air round a cable where nothing is said, as for every job without a design temperature. */
const usualAmbientDegC = 25;

/**
 * The smallest standard fuse at or above the current with the practice's margin for what lasts, if it is no larger than the
 * practice allows over a cable of the size lying in free air, and no larger than its cap for small wires. `undefined` where the
 * window is empty the size has no ampacity in the practice's book, or is thinner than its least.
 */
export function protectedRun(asked: {
  readonly size: ConductorSize;
  /** The most that flows for hours. */
  readonly currentA: number;
  readonly practice: Practice;
  readonly systemV: number;
  readonly tables: Tables;
}): ProtectedRun | undefined {
  const { size, currentA, practice: name, systemV, tables } = asked;
  const practice = tables.practices[name];
  if (isTooThin(size, practice.smallestSingle, tables)) return undefined;
  const conductor = {
    size,
    inParallel: 1,
    metal: undefined,
    insulationDegC: undefined,
    run: 'free-air' as const,
    loadedConductors: undefined,
    ambientDegC: undefined,
  };
  const rated = ampacity(conductor, {
    practice: name,
    ambientDegC: usualAmbientDegC,
    systemV,
    tables: tables.conductors,
  });
  if ('missing' in rated) return undefined;
  const neededA = currentA * practice.continuousFactor.value;
  const ratingA = tables.devices.ratings.get(practice.standardRatings)?.ratingsA.find((step) => step >= neededA);
  const largest = largestDevice({ ampacityA: rated.finalA, nominalV: systemV }, { practice, tables });
  if (ratingA === undefined || 'missing' in largest || ratingA > largest.ratingA || neededA > rated.finalA)
    return undefined;
  const capA = size.system === 'awg' ? practice.smallWireCaps?.capsA.get(size.gauge) : undefined;
  return capA !== undefined && ratingA > capA ? undefined : { size, ratingA };
}

/** Thinner than the practice's least for a cable on its own, which is taken at any volts. */
function isTooThin(size: ConductorSize, least: SmallestConductor | undefined, { conductors }: Tables): boolean {
  if (least === undefined) return false;
  const [area, leastArea] = [areaOf(size, conductors), areaOf(least.size, conductors)];
  return !('missing' in area) && !('missing' in leastArea) && area.value < leastArea.value;
}
