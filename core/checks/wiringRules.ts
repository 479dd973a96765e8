/** What the drawing itself says: what is not fed, not connected, never used, or asks for more than there is. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { GraphRemark } from '../network/answer.ts';
import { assumedSources } from './assumed.ts';
import { CIRCUIT_LAW } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { quietStates } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, PASS, Tally, type Verdict } from './tally.ts';
import { ANY_KIND, isOpen, type SinglePart } from './wiring.ts';
import { list, nameOf, shortList, titleOf, volts } from './wording.ts';

/** One part too many where none is allowed. */
const NONE_ALLOWED = {
  measured: { value: 1, unit: '1' },
  limit: { value: 0, unit: '1' },
  excess: Number.POSITIVE_INFINITY,
} as const;

export const loadCollapse: Rule = {
  id: 'load-collapse',
  family: 'wiring',
  kinds: ['load', 'inverter', 'converter'],
  title: 'A load asks for more than the network can deliver',
  compares:
    'power asked for by the loads in each case with the most that the network can deliver to the one that gives way',
  remedy:
    'Lower the resistance on the way (thicker cable, better joints), add strings, cut the load, or go to a higher system voltage.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: (context) => {
    const tally = new Tally(loadCollapse, CIRCUIT_LAW);
    for (const one of context.cases) {
      const { collapse, outcome } = one.point;
      if (outcome === 'unsupplied') continue;
      if (collapse === undefined) {
        tally.judge([], [PASS]);
        continue;
      }
      // A start that cannot be had is the starting rule's finding.
      if (one.isStarting && collapse.load === one.operatingCase.surge) {
        tally.judge([], [ELSEWHERE]);
        continue;
      }
      const { load, wantedW, largestDeliverableW, message } = collapse;
      tally.judge(
        [load],
        [
          {
            kind: 'fail',
            severity: 'stop',
            case: one.id,
            measured: { value: largestDeliverableW, unit: 'W' },
            limit: { value: wantedW, unit: 'W' },
            excess: largestDeliverableW > 0 ? wantedW / largestDeliverableW : Number.POSITIVE_INFINITY,
            message: `${message.replace(/\.$/, '')}${assumedSources(one.point)}.`,
          },
        ],
      );
    }
    return tally.outcome();
  },
};

export const loadUnfed: Rule = {
  id: 'load-unfed',
  family: 'wiring',
  kinds: ['load', 'inverter', 'converter'],
  title: 'Load without a closed path to a source',
  compares:
    'for each load, inverter and converter that is on in some case: is there a case in which a closed path joins both its poles to a source?',
  remedy: 'Connect both its poles to a source, close what is open on the way, or delete it.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: runUnfed,
};

function runUnfed(context: CheckContext): RuleOutcome {
  const tally = new Tally(loadUnfed, CIRCUIT_LAW);
  for (const part of context.drawn) {
    if (part.kind !== 'load' && part.kind !== 'inverter' && part.kind !== 'converter') continue;
    const running = context.cases.filter((one) => isOn(one.part(part.id)));
    if (running.length === 0) continue;
    const without = running.filter((one) => isUnfed(one, part.id));
    const first = without[0];
    if (first === undefined || without.length < running.length) {
      tally.judge([part.id], [PASS]);
      continue;
    }
    const why = first.point.remarks.find(({ kind, parts }) => kind === 'unfed' && parts.includes(part.id))?.message;
    const message = why ?? `${titleOf(part)} is not fed in any case: no source gives volts there.`;
    tally.judge([part.id], [{ kind: 'fail', severity: 'fix', case: first.id, ...NONE_ALLOWED, message }]);
  }
  return tally.outcome();
}

function isUnfed(one: SolvedCase, id: PartId): boolean {
  if (one.point.outcome === 'unsupplied') return true;
  return (
    (one.point.outcome === 'solved' && one.point.parts.get(id)?.state === 'unfed') ||
    one.point.remarks.some(({ kind, parts }) => kind === 'unfed' && parts.includes(id))
  );
}

function isOn(part: SinglePart): boolean {
  switch (part.kind) {
    case 'load':
    case 'inverter':
    case 'charger':
    case 'converter':
      return part.on;
    default:
      return !isOpen(part);
  }
}

export const groupUnconnected: Rule = {
  id: 'group-unconnected',
  family: 'wiring',
  kinds: ANY_KIND,
  title: 'Group of parts with no source, or source with nothing to feed',
  compares:
    'for each connected group of parts: has it a source, and has each source something to feed, in at least one case?',
  remedy: 'Connect the group, or delete it.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: runUnconnected,
};

/** Remarks that stand in every case; one that holds only while a switch is open is how the case was meant. */
function runUnconnected(context: CheckContext): RuleOutcome {
  const tally = new Tally(groupUnconnected, CIRCUIT_LAW);
  const seen = new Map<string, { remark: GraphRemark; first: string; cases: Set<string> }>();
  for (const one of context.cases) {
    for (const remark of one.point.remarks) {
      if (remark.kind === 'unfed') continue;
      const key = JSON.stringify([remark.kind, remark.parts, remark.junctions]);
      const entry = seen.get(key) ?? { remark, first: one.id, cases: new Set() };
      entry.cases.add(one.id);
      seen.set(key, entry);
    }
  }
  let found = 0;
  for (const { remark, first, cases } of seen.values()) {
    if (cases.size < context.cases.length) continue;
    found++;
    const message = remark.message;
    tally.judge(remark.parts, [{ kind: 'fail', severity: 'note', case: first, ...NONE_ALLOWED, message }]);
  }
  if (found === 0 && context.cases.length > 0) tally.judge([], [PASS]);
  return tally.outcome();
}

export const partNeverUsed: Rule = {
  id: 'part-never-used',
  family: 'wiring',
  kinds: ['switch', 'fuse', 'breaker', 'load', 'inverter', 'charger', 'converter'],
  title: 'Part off or open in every case',
  compares:
    'for each switch, fuse, breaker, load, inverter, charger and converter: is it on or closed in at least one case?',
  remedy: 'Add a case in which it is in use: until then no check has judged its currents and volts.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: (context) => {
    const tally = new Tally(partNeverUsed, CIRCUIT_LAW);
    for (const part of context.drawn) {
      if (!('on' in part) && !('state' in part)) continue;
      if (context.cases.some((one) => isOn(one.part(part.id)))) {
        tally.judge([part.id], [PASS]);
        continue;
      }
      const word = 'on' in part ? 'off' : 'open';
      const message = `${titleOf(part)} is ${word} in every case: nothing here says how it fares in use.`;
      tally.judge(
        [part.id],
        [{ kind: 'fail', severity: 'note', case: context.cases[0]?.id ?? '', ...NONE_ALLOWED, message }],
      );
    }
    return tally.outcome();
  },
};

export const endOpen: Rule = {
  id: 'end-open',
  family: 'wiring',
  kinds: ANY_KIND,
  title: 'Conductor or part with a free end',
  compares: 'for each junction: do at least two part ends meet there?',
  remedy: 'Finish the connection, cap the end, or delete the part; a misspelt junction name looks like this too.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: runEndOpen,
};

function runEndOpen(context: CheckContext): RuleOutcome {
  const tally = new Tally(endOpen, CIRCUIT_LAW);
  const bonded = new Set<JunctionId>();
  for (const part of context.drawn) if (part.kind === 'bond') for (const end of [part.from, part.to]) bonded.add(end);
  const freeOf = new Map<PartId, JunctionId[]>();
  for (const [junction, ends] of context.meetings) {
    const only = ends[0]!;
    // The end of a busbar may be free; a midpoint may be for measuring only.
    const isSpare = only.part.kind === 'busbar' || (only.part.kind === 'string' && only.part.midpoint === junction);
    if (ends.length > 1 || bonded.has(junction) || isSpare) continue;
    freeOf.set(only.part.id, [...(freeOf.get(only.part.id) ?? []), junction]);
  }
  for (const part of context.drawn) {
    if (part.kind === 'bond') continue;
    const free = freeOf.get(part.id);
    if (free === undefined) {
      tally.judge([part.id], [PASS]);
      continue;
    }
    const verdict: Verdict = {
      kind: 'fail',
      severity: 'note',
      case: context.cases[0]?.id ?? '',
      ...NONE_ALLOWED,
      measured: { value: free.length, unit: '1' },
      message: `${titleOf(part)} has ${free.length === 1 ? 'a free end' : 'free ends'} at ${shortList(free)}: nothing else meets there.`,
    };
    tally.judge([part.id], [verdict]);
  }
  return tally.outcome();
}

export const polarityCrossed: Rule = {
  id: 'polarity-crossed',
  family: 'wiring',
  kinds: ['load', 'inverter', 'charger', 'array', 'string', 'controller', 'converter'],
  title: 'Plus and minus crossed',
  compares:
    'volts from plus to minus of each load, inverter, charger, controller, converter, array and string, with everything off (where no string reaches: while it runs), with nought; plus and minus of each string and array with those of the others that it is joined to',
  remedy: 'Swap the leads, and check with a meter before anything is closed.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: runPolarity,
};

/** Less than this the wrong way round is a dead network's rounding, not a crossed lead. */
const CROSSED_BELOW_V = -1e-3;

function runPolarity(context: CheckContext): RuleOutcome {
  const tally = new Tally(polarityCrossed, CIRCUIT_LAW);
  const atRest = quietStates(context)
    .map(({ rest }) => rest)
    .filter((rest) => rest.isSolved);
  for (const part of context.drawn) {
    const pole = polesToTest(part);
    if (pole.length === 0) continue;
    const verdicts: Verdict[] = pole.flatMap(({ plus, minus, which }) => {
      // At rest the sign tells how the leads lie; only what no string reaches is judged while it runs.
      const resting = signsAt({ part, plus, minus, which }, atRest);
      return resting.length > 0 ? resting : signsAt({ part, plus, minus, which }, context.solved);
    });
    verdicts.push(...againstOthers(context, part));
    tally.judge([part.id], verdicts);
  }
  return tally.outcome();
}

function signsAt(
  { part, plus, minus, which }: { part: SinglePart; plus: JunctionId; minus: JunctionId; which: string },
  answered: readonly SolvedCase[],
): readonly Verdict[] {
  return answered.flatMap((one): readonly Verdict[] => {
    const [high, low] = [one.point.junctions.get(plus), one.point.junctions.get(minus)];
    if (typeof high !== 'number' || typeof low !== 'number') return [];
    const acrossV = high - low;
    if (acrossV >= CROSSED_BELOW_V) return [PASS];
    return [crossed(part, one.id, acrossV, `has ${volts(acrossV)} from plus to minus${which}`)];
  });
}

function polesToTest(part: SinglePart): readonly { plus: JunctionId; minus: JunctionId; which: string }[] {
  switch (part.kind) {
    case 'load':
    case 'inverter':
    case 'charger':
    case 'array':
    case 'string':
      return [{ plus: part.plus, minus: part.minus, which: '' }];
    case 'controller':
    case 'converter':
      return [
        { ...part.from, which: ' at its input' },
        { ...part.to, which: ' at its output' },
      ];
    default:
      return [];
  }
}

function crossed(
  part: SinglePart,
  caseId: string,
  acrossV: number,
  what: string,
  others: readonly PartId[] = [],
): Verdict {
  return {
    kind: 'fail',
    severity: 'stop',
    case: caseId,
    measured: { value: acrossV, unit: 'V' },
    limit: { value: 0, unit: 'V' },
    excess: Number.POSITIVE_INFINITY,
    message: `${titleOf(part)} ${what}: its leads are crossed.`,
    others,
  };
}

/** Strings joined plus to minus and minus to plus; an array joined so to a controller's input. Told by the drawing alone. */
function againstOthers(context: CheckContext, part: SinglePart): readonly Verdict[] {
  if (part.kind !== 'string' && part.kind !== 'array') return [];
  const wrong = context.drawn.filter((other) => {
    if (other.id === part.id) return false;
    if (part.kind === 'string' && other.kind === 'string') return isSwapped(context, part, other);
    if (part.kind === 'array' && other.kind === 'controller') return isSwapped(context, part, other.from);
    return part.kind === 'array' && other.kind === 'array' && isSwapped(context, part, other);
  });
  if (wrong.length === 0) return [];
  const what = `is joined plus to minus and minus to plus with ${list(wrong.map(nameOf))}`;
  const caseId = context.cases[0]?.id ?? '';
  return [
    crossed(
      part,
      caseId,
      0,
      what,
      wrong.map(({ id }) => id),
    ),
  ];
}

type Ends = { readonly plus: JunctionId; readonly minus: JunctionId };
function isSwapped({ nets }: CheckContext, a: Ends, b: Ends): boolean {
  return nets.same(a.plus, b.minus) && nets.same(a.minus, b.plus) && !nets.same(a.plus, a.minus);
}
