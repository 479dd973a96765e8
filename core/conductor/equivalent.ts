/** Neighbours of a size in another system. By area and by resistance the answers often differ by one size: both are given. */
import type { ConductorSize } from '../job/part.ts';
import type { ConductorMake } from './metal.ts';
import { ohmPerKmAt20, type ResistanceContext } from './resistance.ts';
import { areaMm2, areaOf, type Missing, SAME_AREA, sizesOf, smallestSize } from './size.ts';

export interface Equivalent {
  readonly system: ConductorSize['system'];
  /** Smallest size with at least the same area; `undefined` when the system has none so large. */
  readonly byArea: ConductorSize | undefined;
  /** Smallest size with at most the same resistance, each by its own table. */
  readonly byResistance: ConductorSize | undefined;
  /** Largest size with at most the same area. */
  readonly nextSmaller: ConductorSize | undefined;
}

/**
 * What stands in another system's list for a size. Nothing in the engine exchanges one for the other by itself. Missing where the
 * size has no area. `make` is how both conductors are made, `otherMake` the other system's if it differs.
 */
export function equivalentIn(
  request: {
    readonly size: ConductorSize;
    readonly system: ConductorSize['system'];
    readonly make: Pick<ConductorMake, 'metal' | 'stranding'>;
    readonly otherMake?: Pick<ConductorMake, 'metal' | 'stranding'>;
  },
  context: ResistanceContext,
): Equivalent | Missing {
  const { size, system, make } = request;
  const area = areaOf(size, context.tables);
  if ('missing' in area) return area;
  const own = ohmPerKmAt20(size, make, context);
  if ('missing' in own) return own;
  const sizes = sizesOf(system, context.tables);
  const areaMm2Of = (candidate: ConductorSize) => areaMm2(candidate, context.tables);
  return {
    system,
    byArea: smallestSize(sizes, (candidate) => areaMm2Of(candidate) >= area.value * (1 - SAME_AREA)),
    byResistance: smallestSize(sizes, (candidate) => {
      const other = ohmPerKmAt20(candidate, request.otherMake ?? make, context);
      return !('missing' in other) && other.ohmPerKm <= own.ohmPerKm;
    }),
    nextSmaller: sizes.filter((candidate) => areaMm2Of(candidate) <= area.value * (1 + SAME_AREA)).at(-1),
  };
}
