/** What the drawing itself says: what is not fed, not connected, never used, or asks for more than there is. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { GraphRemark } from '../network/answer.ts';
import { ANY_KIND, isOpen, type SinglePart } from '../network/wiring.ts';
import { assumedSources } from './assumed.ts';
import { CIRCUIT_LAW } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, PASS, Tally, type Verdict } from './tally.ts';
import { shortList, titleOf } from './wording.ts';

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
