/** Cases with everything off that draws or drives: nothing but wiring and other strings can then take current from a string. */
import type { StringPart } from '../job/part.ts';
import { closedNets, isWiring } from '../network/wiring.ts';
import { type CheckContext, SolvedCase } from './checkContext.ts';

export interface Quiet {
  /** The case with everything off but its switches as they stand. */
  readonly rest: SolvedCase;
  /** The cases that it is the quiet state of. */
  readonly cases: readonly SolvedCase[];
  readonly joins: (a: StringPart['plus'], b: StringPart['plus']) => boolean;
}

interface QuietStates {
  readonly states: readonly Quiet[];
  readonly byCase: ReadonlyMap<SolvedCase, Quiet>;
}

const ofContext = new WeakMap<CheckContext, QuietStates>();

/** The quiet state of each case, found once; cases that differ only in what is off in it share one. */
export function quietStates(context: CheckContext): readonly Quiet[] {
  return allStates(context).states;
}

/** The quiet state of one case of the context. */
export function quietOf(context: CheckContext, one: SolvedCase): SolvedCase | undefined {
  return allStates(context).byCase.get(one)?.rest;
}

function allStates(context: CheckContext): QuietStates {
  const known = ofContext.get(context);
  if (known !== undefined) return known;
  const alike = new Map<string, SolvedCase[]>();
  for (const one of context.cases) {
    // What a case does not change is the same in all of them.
    const { changed } = one.operatingCase;
    const lasting = [...changed.values()].filter(
      (part) => part.kind === 'pair' || part.kind === 'string' || isWiring(part),
    );
    const key = JSON.stringify([one.ambientDegC, lasting]);
    alike.set(key, [...(alike.get(key) ?? []), one]);
  }
  const states = [...alike.values()].map((cases) => quiet(context, cases));
  const byCase = new Map(states.flatMap((state) => state.cases.map((one) => [one, state] as const)));
  const found = { states, byCase };
  ofContext.set(context, found);
  return found;
}

function quiet(context: CheckContext, cases: readonly SolvedCase[]): Quiet {
  const one = cases[0]!;
  const changed = new Map(one.operatingCase.changed);
  for (const part of context.job.parts) {
    const now = changed.get(part.id) ?? part;
    if ('on' in now) changed.set(now.id, { ...now, on: false });
  }
  const operatingCase = { ...one.operatingCase, surge: undefined, irradianceWPerM2: 0, changed };
  const rest = new SolvedCase(context.job, operatingCase, context.solve(operatingCase, 'slow'));
  const nets = closedNets(rest.parts);
  return { rest, cases, joins: nets.same };
}
