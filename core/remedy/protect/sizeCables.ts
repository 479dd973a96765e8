/** Cables that carry more than they may, have no margin, or are thinner than the practice lays: the next listed size that passes. */
import { returnSmaller } from '../../checks/returnRules.ts';
import { isUnder } from '../../checks/tally.ts';
import { amps } from '../../checks/wording.ts';
import type { ConductorSize } from '../../job/part.ts';
import { sizeText } from '../../units/conductorSize.ts';
import type { Conductor } from '../cableLadders.ts';
import { cablesOf, lacksOf, sizeForCurrent, sizesFrom } from './cableChoice.ts';
import { standardRatings, windowFrom, wireFigures } from './fuseWindow.ts';
import { needOf } from './need.ts';
import type { Plan, Why } from './plan.ts';

/** Every conductor of a stated size, once. */
export function conductorsOf(plan: Plan): readonly Conductor[] {
  const found = plan.context.drawn.flatMap((part) => (part.kind === 'cable' ? (plan.conductor(part.id) ?? []) : []));
  return [...new Map(found.map((one) => [`${one.part} ${one.field}`, one])).values()];
}

export function sizeCables(plan: Plan): void {
  const changes: { conductor: Conductor; to: ConductorSize; why: Why }[] = [];
  for (const conductor of conductorsOf(plan)) {
    const cables = cablesOf(plan.context, conductor);
    const lacks = cables
      .map((cable) => lacksOf(plan.context, cable, conductor.size))
      .find((word) => word !== undefined);
    if (lacks === undefined) continue;
    const words = `${conductor.name}: ${sizeText(conductor.size)}`;
    plan.reject({ part: conductor.part, words, why: lacks });
    const to = sizeForCurrent(plan, conductor);
    if (to === undefined) {
      plan.reject({
        part: conductor.part,
        words: `${conductor.name}: a larger size`,
        why: 'no listed size is large enough: lay more side by side, or let it carry less',
      });
      continue;
    }
    rejectFuseOver(plan, conductor);
    changes.push({ conductor, to, why: whyOf(plan, conductor, lacks) });
  }
  plan.resize(changes);
}

/** Says why a fuse for what flows does not go with the size in place. */
function rejectFuseOver(plan: Plan, conductor: Conductor): void {
  for (const cable of cablesOf(plan.context, conductor).slice(0, 1)) {
    const need = needOf(plan.context, cable.id);
    const wire = wireFigures(plan.context, cable, cable);
    if ('missing' in need || 'missing' in wire) continue;
    const window = windowFrom(
      { ...wire, loadA: need.loadA, continuousA: need.mostA, fuseA: null },
      standardRatings(plan.context),
    );
    const wantedA = standardRatings(plan.context).find((ratingA) => !isUnder(ratingA, need.mostA));
    if (window.fits || wantedA === undefined) continue;
    plan.reject({
      part: conductor.part,
      words: `${amps(wantedA)} fuse over ${sizeText(conductor.size)}`,
      why: `${window.words}; ${amps(wantedA)} does not protect a cable of ${amps(wire.wireA)}`,
    });
  }
}

/** Returns that carry less than the cable out: the next listed size that carries as much. */
export function sizeReturns(plan: Plan): void {
  const changes: { conductor: Conductor; to: ConductorSize; why: Why }[] = [];
  for (const { finding } of returnSmaller.run(plan.context).findings) {
    const back = finding.parts.slice(-2).find((id) => plan.conductor(id) !== undefined);
    const conductor = back === undefined ? undefined : plan.conductor(back);
    if (conductor === undefined) continue;
    const to = sizesFrom(plan, conductor).find((size) => carriesOf(plan, conductor, size) >= finding.limit.value);
    if (to === undefined)
      plan.reject({ part: conductor.part, words: `${conductor.name}: a larger size`, why: finding.message });
    else changes.push({ conductor, to, why: finding.message.replace(/\.$/, '') });
  }
  plan.resize(changes);
}

/** Ampacity of a conductor of another size in the warmest case; 0 where it is not known. */
function carriesOf({ context }: Plan, conductor: Conductor, size: ConductorSize): number {
  const ambientDegC = Math.max(...context.cases.map((one) => one.ambientDegC));
  const all = cablesOf(context, conductor).map((cable) => context.ampacityOf({ ...cable, size }, ambientDegC));
  return Math.min(...all.map((ampacity) => ('missing' in ampacity ? 0 : ampacity.finalA)));
}

function whyOf(plan: Plan, conductor: Conductor, lacks: string): Why {
  const needs = cablesOf(plan.context, conductor).map(({ id }) => needOf(plan.context, id));
  const known = needs.flatMap((need) => ('missing' in need ? [] : [need]));
  known.sort((a, b) => b.mostA - a.mostA);
  const [most] = known;
  const carried = most === undefined ? '' : ` (it carries ${amps(most.loadA)}; ${most.sum})`;
  return `${sizeText(conductor.size)} ${lacks}${carried}`;
}
