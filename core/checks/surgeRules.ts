/** Volts while a load or inverter starts up. */
import type { InverterPart, LoadPart, StringPart } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { assumedSources, overRange, stiffestStrings } from './assumed.ts';
import { CIRCUIT_LAW, entered } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { leastVoltsField, leastVoltsOf, withoutDropOut } from './loadVolts.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isUnder, missing, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { apart, titleOf, together, watts } from './wording.ts';

/**
 * Each load and inverter with a `surgeW` is started on top of every case in which it is on, with the battery's resistance of the
 * first second: V = (E + sqrt(E² − 4 R P))/2 behind one source, the whole network here. A case of the job that starts the part
 * itself is that case. Battery and wiring bring E²/(4 R) at most.
 */
export const surgeSag: Rule = {
  id: 'surge-sag',
  family: 'voltage',
  kinds: ['load', 'inverter'],
  title: 'Volts sag too far while a load starts',
  compares:
    'volts at each load and inverter with a surgeW while it starts on top of each case, with its minimumV or cutoffV, and its surge with the largest power that the wiring can bring',
  remedy:
    'Lower the resistance on the way (thicker cable, better joints), add strings, or go to a higher system voltage.',
  byPractice: false,
  reads: 'every-case',
  basisFor: () => CIRCUIT_LAW,
  run: runSurgeSag,
};

function runSurgeSag(context: CheckContext): RuleOutcome {
  const tally = new Tally(surgeSag, CIRCUIT_LAW);
  for (const drawn of context.drawn) {
    if (drawn.kind !== 'load' && drawn.kind !== 'inverter') continue;
    if (drawn.surgeW === undefined) continue;
    const verdicts = context.cases.flatMap((one): readonly Verdict[] => {
      const part = one.part(drawn.id) as LoadPart | InverterPart;
      const startsOther = one.isStarting && one.operatingCase.surge !== drawn.id;
      if (!part.on || part.surgeW === undefined || startsOther || one.point.outcome === 'unsupplied') return [];
      // A case that collapses before anything starts is told as such.
      if (!one.isStarting && one.point.outcome === 'collapse') return [ELSEWHERE];
      return [startVerdict(context, { part, one, surgeW: part.surgeW })];
    });
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}

interface Start {
  readonly part: LoadPart | InverterPart;
  readonly one: SolvedCase;
  readonly surgeW: number;
}

/** The case with the part starting and never dropping out, so that its volts can be seen. */
function started(
  context: CheckContext,
  { part, one, surgeW }: Start,
  strings: readonly StringPart[] = [],
): OperatingPoint {
  const changed = new Map(one.operatingCase.changed);
  for (const string of strings) changed.set(string.id, string);
  changed.set(part.id, { ...withoutDropOut(part), surgeW });
  return context.solve({ ...one.operatingCase, surge: part.id, changed }, 'fast');
}

const ofContext = new WeakMap<CheckContext, Map<string, OperatingPoint>>();

/** The same with the strings as they are, solved once for all rules that ask about a start with the part's own surge. */
export function startedPoint(context: CheckContext, start: Start): OperatingPoint {
  let known = ofContext.get(context);
  if (known === undefined) {
    known = new Map();
    ofContext.set(context, known);
  }
  const key = JSON.stringify([start.one.id, start.part.id]);
  let point = known.get(key);
  if (point === undefined) {
    point = started(context, start);
    known.set(key, point);
  }
  return point;
}

function startVerdict(context: CheckContext, start: Start): Verdict {
  const { part, one, surgeW } = start;
  const point = startedPoint(context, start);
  if (point.outcome === 'unsupplied') return missing(`a source that feeds ${part.kind} ${part.id} in case ${one.id}`);
  const answer = point.parts.get(part.id);
  const leastV = leastVoltsOf(part);
  if (point.collapse !== undefined) {
    const { load, wantedW, largestDeliverableW } = point.collapse;
    const who = load === part.id ? 'it' : load;
    return {
      kind: 'fail',
      severity: 'fix',
      case: one.id,
      measured: { value: largestDeliverableW, unit: 'W' },
      limit: { value: wantedW, unit: 'W' },
      excess: largestDeliverableW > 0 ? wantedW / largestDeliverableW : Number.POSITIVE_INFINITY,
      message: () =>
        `${titleOf(part)} cannot start with ${watts(surgeW)} on top of case ${one.id}: ${who} would need ${watts(wantedW)} at its terminals, and the wiring can bring ${watts(largestDeliverableW)} at most${assumedSources(point)}${overRange(holdsAtBest(context, start, leastV))}.`,
    };
  }
  if (answer === undefined || answer.voltageV === null || answer.state === 'unfed') {
    return missing(`volts at ${part.kind} ${part.id} in case ${one.id}: it is not fed`);
  }
  if (leastV === undefined) return missingField(part, leastVoltsField(part));
  if (!isUnder(answer.voltageV, leastV)) return PASS;
  const [found, needed] = apart(answer.voltageV, leastV, 'V');
  return {
    kind: 'fail',
    severity: 'fix',
    case: one.id,
    measured: { value: answer.voltageV, unit: 'V' },
    limit: { value: leastV, unit: 'V' },
    excess: leastV / answer.voltageV,
    message: () =>
      `${titleOf(part)} has ${found} while it starts with ${watts(surgeW)} on top of case ${one.id} and needs ${needed}; ${bearableText(largestStart(context, start, leastV))}${assumedSources(point)}${overRange(holdsAtBest(context, start, leastV))}.`,
    basis: together(CIRCUIT_LAW, entered(part, leastVoltsField(part))),
  };
}

/** Would the start hold with the best figures that may be assumed for the strings? `undefined` where none are assumed. */
function holdsAtBest(context: CheckContext, start: Start, leastV: number | undefined): boolean | undefined {
  const strings = stiffestStrings(context, start.one, 'fast');
  if (strings.length === 0) return undefined;
  const voltageV = started(context, start, strings).parts.get(start.part.id)?.voltageV;
  return typeof voltageV === 'number' && !isUnder(voltageV, leastV ?? 0);
}

function bearableText(bearableW: number): string {
  return bearableW > 0 ? `a start of up to ${watts(bearableW)} would hold` : 'no start at all would hold';
}

const HALVINGS = 12;

/** The largest start that keeps the part at its least volts, by halving; 0 where even none would. Volts fall as the start grows. */
function largestStart(context: CheckContext, start: Start, leastV: number): number {
  let [low, high] = [0, start.surgeW];
  for (let step = 0; step < HALVINGS; step++) {
    const surgeW = (low + high) / 2;
    const voltageV = started(context, { ...start, surgeW }).parts.get(start.part.id)?.voltageV;
    if (typeof voltageV === 'number' && !isUnder(voltageV, leastV)) low = surgeW;
    else high = surgeW;
  }
  return low;
}
