/** How far each string of a bank is from its fair share, for whatever currents. */
import type { PartId } from '../../job/part.ts';
import type { Bank } from '../banks.ts';
import { LEAST_RATE_PER_H } from '../sharing/bankCurrents.ts';

/** Deviations of the strings of banks with two branches or more; null for the others and for banks that rest. */
export class Deviations {
  private readonly banks: readonly {
    readonly places: readonly number[];
    readonly fair: readonly number[];
    readonly firsts: readonly number[];
    readonly capacityAh: number;
  }[];
  private readonly count: number;

  constructor(banks: readonly Bank[], ids: readonly PartId[]) {
    this.count = ids.length;
    this.banks = banks
      .filter(({ branches }) => branches.length > 1)
      .map(({ branches, capacityAh }) => ({
        places: branches.flatMap(({ strings }) => strings.map(({ id }) => ids.indexOf(id))),
        fair: branches.flatMap((branch) => branch.strings.map(() => branch.capacityAh / capacityAh)),
        firsts: branches.map(({ strings }) => ids.indexOf(strings.at(-1)!.id)),
        capacityAh,
      }));
  }

  of(currentsA: ArrayLike<number>): Float64Array {
    const deviations = new Float64Array(this.count).fill(Number.NaN);
    for (const { places, fair, firsts, capacityAh } of this.banks) {
      const totalA = firsts.reduce((sum, place) => sum + currentsA[place]!, 0);
      if (Math.abs(totalA) < LEAST_RATE_PER_H * capacityAh) continue;
      places.forEach((place, k) => {
        deviations[place] = currentsA[place]! / totalA / fair[k]! - 1;
      });
    }
    return deviations;
  }

  /** Largest |deviation|; NaN where no bank gives enough to tell. */
  worst(currentsA: ArrayLike<number>): number {
    let worst = Number.NaN;
    for (const deviation of this.of(currentsA)) {
      if (!Number.isNaN(deviation) && !(Math.abs(deviation) <= worst)) worst = Math.abs(deviation);
    }
    return worst;
  }
}

/** The string furthest off its share; where nothing is shared, the one that carries most. */
export function judgedString(sharing: Deviations, nominal: readonly number[], ids: readonly PartId[]): PartId {
  const deviations = sharing.of(nominal);
  let best = 0;
  ids.forEach((_, k) => {
    const [mine, its] = [Math.abs(deviations[k]!), Math.abs(deviations[best]!)];
    if (mine > its || (Number.isNaN(its) && !Number.isNaN(mine))) best = k;
    else if (Number.isNaN(mine) && Number.isNaN(its) && Math.abs(nominal[k]!) > Math.abs(nominal[best]!)) best = k;
  });
  return ids[best]!;
}
