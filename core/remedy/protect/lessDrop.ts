/** Loads that lose too many volts on the way: the least copper that brings the loss within its limit. */
import { dropTooBig } from '../../checks/dropRules.ts';
import type { Finding } from '../../checks/finding.ts';
import { percent } from '../../checks/wording.ts';
import { voltWalk } from '../../explain/voltWalk.ts';
import type { ConductorSize, PartId } from '../../job/part.ts';
import { sizeText } from '../../units/conductorSize.ts';
import type { Conductor } from '../cableLadders.ts';
import { sizesFrom } from './cableChoice.ts';
import type { Plan } from './plan.ts';

/** Times that one load's way is bettered: a warmer or heavier laden cable may want one size more than the sum says. */
const MOST_TRIES = 4;
/** Conductors of a way that are looked at, those that lose most first. */
const MOST_CONDUCTORS = 6;

export function lessDrop(plan: Plan): void {
  const given = new Set<PartId>();
  for (let tries = 0; tries < MOST_TRIES * 8; tries += 1) {
    const finding = dropTooBig
      .run(plan.context)
      .findings.map((ranked) => ranked.finding)
      .find(({ parts }) => !given.has(parts[0]!));
    if (finding === undefined) return;
    if (!better(plan, finding)) given.add(finding.parts[0]!);
  }
}

/** What one conductor on the way loses, and what other sizes of it would save and cost. */
interface Rung {
  readonly to: ConductorSize;
  readonly savedV: number;
  readonly copper: number;
}
interface Choice {
  readonly savedV: number;
  readonly copper: number;
  readonly picks: readonly { readonly conductor: Conductor; readonly to: ConductorSize }[];
}

function better(plan: Plan, finding: Finding): boolean {
  const load = finding.parts[0]!;
  const lost = lossesTo(plan, finding);
  const nominalV = nominalOf(plan, load);
  if (nominalV === undefined || lost.length === 0) return false;
  const wantedV = (finding.measured.value - finding.limit.value) * nominalV;
  const options = lost.map(({ conductor, lossV }) => ({ conductor, rungs: rungsOf(plan, conductor, lossV) }));
  const best = cheapest(options, wantedV);
  const said = `${percent(finding.measured.value)} lost on the way to ${load}, ${percent(finding.limit.value)} allowed`;
  if (best === undefined || best.picks.length === 0) {
    for (const { conductor } of options.slice(0, 1)) {
      const words = `${conductor.name}: a larger size for less drop`;
      plan.reject({
        part: conductor.part,
        words,
        why: `${said}: no listed size is large enough; shorten the way, or raise the system's volts`,
      });
    }
    return false;
  }
  for (const { conductor } of best.picks) {
    plan.reject({ part: conductor.part, words: `${conductor.name}: ${sizeText(conductor.size)}`, why: said });
  }
  return plan.resize(best.picks.map((pick) => ({ ...pick, why: `${sizeText(pick.conductor.size)}: ${said}` })));
}

function nominalOf({ context }: Plan, id: PartId): number | undefined {
  const part = context.drawn.find((one) => one.id === id);
  return part?.kind === 'load' || part?.kind === 'inverter'
    ? context.volts.nominalBetween(part.plus, part.minus)
    : undefined;
}

/** Volts that each conductor on the way loses, in the case of the finding, most first. */
function lossesTo(plan: Plan, finding: Finding): readonly { readonly conductor: Conductor; readonly lossV: number }[] {
  const one = plan.context.cases.find(({ id }) => id === finding.case);
  if (one === undefined) return [];
  const { operatingCase, point } = one;
  const walk = voltWalk({ job: plan.job, operatingCase, point, load: finding.parts[0]! });
  if (!walk.ok) return [];
  const found = new Map<string, { conductor: Conductor; lossV: number }>();
  for (const { kind, part, changeV } of walk.steps) {
    const conductor = kind === 'part' ? plan.conductor(part) : undefined;
    if (conductor === undefined || changeV >= 0) continue;
    const key = `${conductor.part} ${conductor.field}`;
    found.set(key, { conductor, lossV: (found.get(key)?.lossV ?? 0) - changeV });
  }
  const losses = [...found.values()];
  losses.sort((a, b) => b.lossV - a.lossV);
  return losses.slice(0, MOST_CONDUCTORS);
}

/** Volts saved go by the areas: what the terminations lose stays, so a little less is saved than this says. */
function rungsOf(plan: Plan, conductor: Conductor, lossV: number): readonly Rung[] {
  const own = plan.copper(conductor, conductor.size);
  return sizesFrom(plan, conductor).map((to, step): Rung => {
    const copper = plan.copper(conductor, to);
    return { to, savedV: lossV * (1 - own / copper), copper: step === 0 ? 0 : copper };
  });
}

/** The least copper that saves the wanted volts: choices that cost more and save less than another are dropped as they come. */
function cheapest(
  options: readonly { readonly conductor: Conductor; readonly rungs: readonly Rung[] }[],
  wantedV: number,
): Choice | undefined {
  let choices: readonly Choice[] = [{ savedV: 0, copper: 0, picks: [] }];
  for (const { conductor, rungs } of options) {
    const all = choices.flatMap((choice) =>
      rungs.map(
        ({ to, savedV, copper }, step): Choice => ({
          savedV: choice.savedV + savedV,
          copper: choice.copper + copper,
          picks: step === 0 ? choice.picks : [...choice.picks, { conductor, to }],
        }),
      ),
    );
    all.sort((a, b) => a.copper - b.copper || b.savedV - a.savedV);
    let mostV = Number.NEGATIVE_INFINITY;
    choices = all.filter(({ savedV }) => {
      if (savedV <= mostV) return false;
      mostV = savedV;
      return true;
    });
  }
  return choices.find(({ savedV }) => savedV >= wantedV);
}
