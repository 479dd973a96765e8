/** Volts at each load against what it needs and what it stands. */
import type { InverterPart, LoadPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { assumedSources, overRange, stiffestStrings } from './assumed.ts';
import { CIRCUIT_LAW, entered } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, isUnder, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { apart, titleOf, together, watts } from './wording.ts';

export const loadStarved: Rule = {
  id: 'load-starved',
  family: 'voltage',
  kinds: ['load', 'inverter'],
  title: 'Too few volts for a load to run',
  compares:
    'volts solved at each running load with its minimumV, and at each running inverter with its cutoffV, in every case without a starting load',
  remedy: 'Use a thicker or shorter cable, a fuller or larger bank, or a load that runs on fewer volts.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => CIRCUIT_LAW,
  run: (context) => {
    const tally = new Tally(loadStarved, CIRCUIT_LAW);
    for (const drawn of context.drawn) {
      if (drawn.kind !== 'load' && drawn.kind !== 'inverter') continue;
      const verdicts = context.steady.flatMap((one) => starvedVerdict(context, drawn, one));
      tally.judge([drawn.id], verdicts);
    }
    return tally.outcome();
  },
};

/** The least volts that a load or inverter runs on. */
export function leastVoltsOf(part: LoadPart | InverterPart): number | undefined {
  return part.kind === 'load' ? part.minimumV : part.cutoffV;
}
export function leastVoltsField(part: LoadPart | InverterPart): 'minimumV' | 'cutoffV' {
  return part.kind === 'load' ? 'minimumV' : 'cutoffV';
}
/** The same part without its drop-out, to see the volts that make it drop out. */
export function withoutDropOut<P extends LoadPart | InverterPart>(part: P): P {
  return { ...part, [leastVoltsField(part)]: undefined };
}

function starvedVerdict(context: CheckContext, drawn: LoadPart | InverterPart, one: SolvedCase): readonly Verdict[] {
  const part = one.part(drawn.id) as LoadPart | InverterPart;
  const answer = one.answer(part.id);
  // What is off needs no volts; a load without a feed is told by the wiring rules.
  if (!part.on || answer.state === 'unfed' || answer.voltageV === null) return [];
  const leastV = leastVoltsOf(part);
  if (leastV === undefined) return [missingField(part, leastVoltsField(part))];
  const basis = together(CIRCUIT_LAW, entered(part, leastVoltsField(part)));
  if (answer.state === 'dropped-out') {
    const held = context.solveChanged(one, [withoutDropOut(part)]);
    const heldV = held.outcome === 'solved' ? held.parts.get(part.id)?.voltageV : undefined;
    if (held.collapse !== undefined || typeof heldV !== 'number') {
      const deliverableW = held.collapse?.largestDeliverableW ?? 0;
      const wantedW = held.collapse?.wantedW ?? 0;
      return [
        {
          kind: 'fail',
          severity: 'fix',
          case: one.id,
          measured: { value: deliverableW, unit: 'W' },
          limit: { value: wantedW, unit: 'W' },
          excess: deliverableW > 0 ? wantedW / deliverableW : Number.POSITIVE_INFINITY,
          message: `${titleOf(part)} drops out in case ${one.id}: ${held.collapse?.load ?? part.id} would need ${watts(wantedW)}, and the wiring can bring ${watts(deliverableW)} at most${assumedSources(one.point)}.`,
          basis,
        },
      ];
    }
    return [tooFew(context, { part, one, voltageV: heldV, leastV, dropsOut: true, basis })];
  }
  if (!isUnder(answer.voltageV, leastV)) return [PASS];
  return [tooFew(context, { part, one, voltageV: answer.voltageV, leastV, dropsOut: false, basis })];
}

interface TooFew {
  readonly part: LoadPart | InverterPart;
  readonly one: SolvedCase;
  readonly voltageV: number;
  readonly leastV: number;
  readonly dropsOut: boolean;
  readonly basis: Basis;
}

function tooFew(context: CheckContext, at: TooFew): Verdict {
  const { part, one, voltageV, leastV } = at;
  const [found, needed] = apart(voltageV, leastV, 'V');
  const outcome = at.dropsOut ? ', so it drops out' : '';
  const range = `${assumedSources(one.point)}${overRange(holdsAtBest(context, at))}`;
  return {
    kind: 'fail',
    severity: 'fix',
    case: one.id,
    measured: { value: voltageV, unit: 'V' },
    limit: { value: leastV, unit: 'V' },
    excess: voltageV > 0 ? leastV / voltageV : Number.POSITIVE_INFINITY,
    message: `${titleOf(part)} gets ${found} while it runs and needs ${needed}${outcome}${range}.`,
    basis: at.basis,
  };
}

/** Would the load run with the best figures that may be assumed for the strings? `undefined` where none are assumed. */
function holdsAtBest(context: CheckContext, { part, one, leastV }: TooFew): boolean | undefined {
  const strings = stiffestStrings(context, one, one.point.model);
  if (strings.length === 0) return undefined;
  const voltageV = context.solveChanged(one, [...strings, withoutDropOut(part)]).parts.get(part.id)?.voltageV;
  return typeof voltageV === 'number' && !isUnder(voltageV, leastV);
}

export const loadOverfed: Rule = {
  id: 'load-overfed',
  family: 'voltage',
  kinds: ['load'],
  title: 'More volts than a load stands',
  compares:
    'the highest volts at each load that is ever on, solved in any case or held by a charger, controller or converter on its two conductors, with its maximumV',
  remedy: 'Feed it through a converter, or lower the charge volts; keep it off while the bank is equalised.',
  byPractice: false,
  reads: 'every-case',
  basisFor: () => CIRCUIT_LAW,
  run: runOverfed,
};

function runOverfed(context: CheckContext): RuleOutcome {
  const tally = new Tally(loadOverfed, CIRCUIT_LAW);
  for (const drawn of context.drawn) {
    if (drawn.kind !== 'load') continue;
    const cases = context.solved.filter((one) => (one.part(drawn.id) as LoadPart).on);
    if (cases.length === 0) continue;
    const setpoint = context.volts.setpointBetween(drawn.plus, drawn.minus);
    const verdicts = cases.flatMap((one): readonly Verdict[] => {
      const part = one.part(drawn.id) as LoadPart;
      const { voltageV } = one.answer(part.id);
      const solvedV = voltageV ?? Number.NEGATIVE_INFINITY;
      const highestV = Math.max(solvedV, setpoint?.volts ?? Number.NEGATIVE_INFINITY);
      if (!Number.isFinite(highestV)) return [];
      if (part.maximumV === undefined) return [missingField(part, 'maximumV')];
      if (!isOver(highestV, part.maximumV)) return [PASS];
      const [found, most] = apart(highestV, part.maximumV, 'V');
      const from =
        setpoint !== undefined && setpoint.volts >= solvedV
          ? `when ${nameOf(setpoint.part)} holds its set-point`
          : 'as solved';
      return [
        {
          kind: 'fail',
          severity: 'fix',
          case: one.id,
          measured: { value: highestV, unit: 'V' },
          limit: { value: part.maximumV, unit: 'V' },
          excess: highestV / part.maximumV,
          message: `${titleOf(part)} can see ${found} (${from}) and stands ${most}.`,
          basis: together(CIRCUIT_LAW, entered(part, 'maximumV')),
        },
      ];
    });
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}
