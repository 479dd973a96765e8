/** Cases with everything off that draws or drives: nothing but wiring and other strings can then take current from a string. */
import type { StringPart } from '../job/part.ts';
import { closedNets, isWiring } from '../network/wiring.ts';
import { type CheckContext, SolvedCase } from './checkContext.ts';

export interface Quiet {
  /** The case with everything off but its switches as they stand. */
  readonly rest: SolvedCase;
  readonly joins: (a: StringPart['plus'], b: StringPart['plus']) => boolean;
}

const ofContext = new WeakMap<CheckContext, readonly Quiet[]>();

/** The quiet state of each case, found once; cases that differ only in what is off in it share one. */
export function quietStates(context: CheckContext): readonly Quiet[] {
  const found = ofContext.get(context);
  if (found !== undefined) return found;
  const known = new Map<string, Quiet>();
  for (const one of context.cases) {
    // What a case does not change is the same in all of them.
    const { changed } = one.operatingCase;
    const lasting = [...changed.values()].filter(
      (part) => part.kind === 'pair' || part.kind === 'string' || isWiring(part),
    );
    const key = JSON.stringify([one.ambientDegC, lasting]);
    if (!known.has(key)) known.set(key, quiet(context, one));
  }
  const states = [...known.values()];
  ofContext.set(context, states);
  return states;
}

function quiet(context: CheckContext, one: SolvedCase): Quiet {
  const changed = new Map(one.operatingCase.changed);
  for (const part of context.job.parts) {
    const now = changed.get(part.id) ?? part;
    if ('on' in now) changed.set(now.id, { ...now, on: false });
  }
  const operatingCase = { ...one.operatingCase, surge: undefined, irradianceWPerM2: 0, changed };
  const rest = new SolvedCase(context.job, operatingCase, context.solve(operatingCase, 'slow'));
  const nets = closedNets(rest.parts);
  return { rest, joins: nets.same };
}
