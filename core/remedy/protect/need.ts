/** What a device or cable has to carry, over all cases without a starting load. */
import type { CheckContext } from '../../checks/checkContext.ts';
import { demandsOf } from '../../checks/continuousCurrent.ts';
import { amps, shortList } from '../../checks/wording.ts';
import { nameOf, type PartId } from '../../job/part.ts';
import { isOpen } from '../../network/wiring.ts';

/** Amperes that a part of the wiring carries, with the margin for what lasts. */
export interface Need {
  /** The most that flows in any case. */
  readonly loadA: number;
  /** The most with the factor on what lasts for hours, loads that do not say taken as short. */
  readonly leastA: number;
  /** The same, taken as lasting. */
  readonly mostA: number;
  /** Factor on what lasts. */
  readonly factor: number;
  /** The sum in words: `1.25 × 42 A = 52.5 A`. */
  readonly sum: string;
  /** Names of loads that do not say whether they run for hours, where it matters. */
  readonly unmarked: readonly string[];
}

/** The need of a part; what is missing where no case gives its current. */
export function needOf(context: CheckContext, id: PartId): Need | { readonly missing: string } {
  const factor = context.job.settings.continuousFactor;
  let [loadA, leastA, mostA, sum] = [0, 0, 0, ''];
  let unmarked: readonly string[] = [];
  if (context.steady.length === 0) return { missing: 'a case that can be solved and has no starting load' };
  for (const one of context.steady) {
    if (isOpen(one.part(id))) continue;
    const demand = demandsOf(context, one).of(id);
    if (demand === undefined) return { missing: `current in ${id} in case ${one.id}` };
    loadA = Math.max(loadA, demand.runningA);
    leastA = Math.max(leastA, demand.leastA);
    if (demand.mostA < mostA && sum !== '') continue;
    mostA = demand.mostA;
    sum = sumOf(demand.runningA, demand.mostA, factor);
    unmarked = demand.mostA > demand.leastA ? demand.unmarked.map((load) => nameOf(load)) : [];
  }
  return { loadA, leastA, mostA, factor, sum, unmarked };
}

function sumOf(runningA: number, mostA: number, factor: number): string {
  const lastingA = factor === 1 ? runningA : (mostA - runningA) / (factor - 1);
  const restA = Math.max(0, runningA - lastingA);
  const rest = restA < REST_WORTH_SAYING * runningA ? '' : ` + ${amps(restA)}`;
  return lastingA < REST_WORTH_SAYING * runningA
    ? `${amps(runningA)}, none of it for hours`
    : `${factor} × ${amps(lastingA)}${rest} = ${amps(mostA)}`;
}

/** Below this share of the whole, a part of the sum is not printed. */
const REST_WORTH_SAYING = 0.005;

/** Says whose duration was not given and what was taken instead. */
export function unmarkedWords({ unmarked }: Need): readonly string[] {
  return unmarked.length === 0 ? [] : [`${shortList(unmarked)} taken as running for hours, since nothing else is said`];
}
