/** Sizes of a conductor against what it must carry, what stands over it, and the smallest that the practice lays. */
import type { CheckContext } from '../../checks/checkContext.ts';
import { demandsOf } from '../../checks/continuousCurrent.ts';
import { thinVerdicts } from '../../checks/smallestRules.ts';
import { isOver } from '../../checks/tally.ts';
import { nextSizeUp } from '../../conductor/size.ts';
import type { CablePart, ConductorSize, PartId } from '../../job/part.ts';
import type { Device } from '../../network/wiring.ts';
import type { Conductor } from '../cableLadders.ts';
import { upperOf, wireFigures } from './fuseWindow.ts';
import type { Plan } from './plan.ts';

/** Sizes that are looked at above the one in place. */
const MOST_SIZES = 20;

/** The size in place and all larger ones that are listed in its system. */
export function sizesFrom(plan: Plan, conductor: Conductor): readonly ConductorSize[] {
  const sizes = [conductor.size];
  while (sizes.length < MOST_SIZES) {
    const next = nextSizeUp(sizes.at(-1)!, plan.tables.conductors);
    if (next === undefined) break;
    sizes.push(next);
  }
  return sizes;
}

/** The cables of the drawing that a conductor is. */
export function cablesOf(context: CheckContext, { part, field }: Conductor): readonly CablePart[] {
  const single = context.drawn.filter((one): one is CablePart => one.kind === 'cable' && one.id === part);
  if (single.length > 0) return single;
  const pair = context.job.parts.find(({ id }) => id === part);
  const isSplit = pair?.kind === 'pair' && pair.minusSize !== undefined;
  const poles = !isSplit ? ['plus', 'minus'] : field === 'size' ? ['plus'] : ['minus'];
  const ids = new Set(poles.map((pole) => `${part}.${pole}`));
  return context.drawn.filter((one): one is CablePart => one.kind === 'cable' && ids.has(one.id));
}

/** What a size lacks for a cable, in words; `undefined` where nothing, or where a figure is missing that would tell. */
export function lacksOf(context: CheckContext, cable: CablePart, size: ConductorSize): string | undefined {
  const asSized = cable.size === size ? cable : { ...cable, size };
  if (thinVerdicts(context, asSized).some(({ kind }) => kind === 'fail'))
    return 'under the smallest conductor that the practice lays';
  // A cable kept is judged as the rules do; a new one has margin for loads that do not say how long they run.
  const demandFor = cable.size === size ? 'leastA' : 'mostA';
  for (const one of context.steady) {
    const inCase = one.part(cable.id) as CablePart;
    const tried = inCase.size === size ? inCase : { ...inCase, size };
    const ampacity = context.ampacityOf(tried, one.ambientDegC);
    const demand = demandsOf(context, one).of(cable.id);
    if ('missing' in ampacity || demand === undefined) continue;
    if (isOver(demand.runningA, ampacity.finalA)) return 'carries more than it may';
    const bare = context.uncorrectedAmpacityOf(tried, ampacity);
    if (!('missing' in bare) && isOver(demand[demandFor], bare.finalA)) return 'has no margin for what lasts for hours';
  }
  return undefined;
}

/** The smallest listed size from the present one on that lacks nothing for what flows; `undefined`: none. */
export function sizeForCurrent(plan: Plan, conductor: Conductor): ConductorSize | undefined {
  const cables = cablesOf(plan.context, conductor);
  return sizesFrom(plan, conductor).find((size) =>
    cables.every((cable) => lacksOf(plan.context, cable, size) === undefined),
  );
}

/** The smallest listed size from the present one on over which the practice admits a device of a rating. */
export function sizeUnder(
  plan: Plan,
  conductor: Conductor,
  over: { readonly ratingA: number; readonly between: Pick<Device, 'from' | 'to'>; readonly only: ReadonlySet<PartId> },
): ConductorSize | undefined {
  const cables = cablesOf(plan.context, conductor).filter(({ id }) => over.only.has(id));
  return sizesFrom(plan, conductor).find((size) =>
    cables.every((cable) => {
      const tried = cable.size === size ? cable : { ...cable, size };
      const figures = wireFigures(plan.context, tried, over.between);
      return !('missing' in figures) && !isOver(over.ratingA, upperOf(figures));
    }),
  );
}
