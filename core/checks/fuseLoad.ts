/** Fuses and breakers against the current that they carry. */

import type { Device } from '../network/wiring.ts';
import { isDevice } from '../network/wiring.ts';
import { PART_RATING } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { demandsOf } from './continuousCurrent.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, field, percent, shortList, titleOf, withEdition } from './wording.ts';

export const fuseUnderCurrent: Rule = {
  id: 'fuse-under-current',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse or breaker smaller than the current that it carries',
  compares: 'rating of each fuse and breaker with the current solved in it, in every case without a starting load',
  remedy: 'Fit the next standard size above the current with its margin, then check the cable against it.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => PART_RATING,
  run: (context) =>
    eachDevice(context, fuseUnderCurrent, (device, one) => {
      const { currentA, undetermined } = one.answer(device.id);
      if (currentA === null)
        return missing(`current in ${device.kind} ${device.id} in case ${one.id}: ${undetermined ?? 'not determined'}`);
      const runningA = Math.abs(currentA);
      if (!isOver(runningA, device.ratingA)) return PASS;
      const [carried, rated] = apart(runningA, device.ratingA, 'A');
      return {
        kind: 'fail',
        severity: 'fix',
        case: one.id,
        measured: { value: runningA, unit: 'A' },
        limit: { value: device.ratingA, unit: 'A' },
        excess: runningA / device.ratingA,
        message: `${titleOf(device)}, ${rated}, carries ${carried}: it will open in use.`,
      };
    }),
};

export const fuseUnderContinuous: Rule = {
  id: 'fuse-under-continuous',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse or breaker has no margin for current that lasts',
  compares:
    'rating of each fuse and breaker with 125 % (or as set) of the current that lasts three hours or more plus the rest; one that is below its running current outright is told by the other rule',
  remedy: 'Choose the next standard rating at or above the sum, then check the cable against it.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => withEdition(judge.practice.continuousFactor.basis, judge),
  run: (context) =>
    eachDevice(context, fuseUnderContinuous, (device, one) => {
      const demand = demandsOf(context, one).of(device.id);
      if (demand === undefined)
        return missing(`current in ${device.kind} ${device.id} in case ${one.id}: not determined`);
      if (isOver(demand.runningA, device.ratingA)) return ELSEWHERE;
      if (!isOver(demand.mostA, device.ratingA)) return PASS;
      if (!isOver(demand.leastA, device.ratingA)) {
        return missing(
          `${shortList(demand.unmarked.map((load) => field(load, 'continuous')))}: it decides whether ${device.kind} ${device.id} has margin enough`,
          ...demand.unmarked.map((load) => wanted(load, 'continuous')),
        );
      }
      const [needed, rated] = apart(demand.leastA, device.ratingA, 'A');
      return {
        kind: 'fail',
        severity: 'fix',
        case: one.id,
        measured: { value: demand.leastA, unit: 'A' },
        limit: { value: device.ratingA, unit: 'A' },
        excess: demand.leastA / device.ratingA,
        message: `${titleOf(device)}, ${rated}, carries ${amps(demand.runningA)}; with ${percent(context.job.settings.continuousFactor)} of what lasts for hours it should be rated for ${needed}.`,
      };
    }),
};

function eachDevice(
  context: CheckContext,
  rule: Rule,
  judgement: (device: Device, one: CheckContext['steady'][number]) => Verdict,
): RuleOutcome {
  const tally = new Tally(rule, rule.basisFor(context));
  for (const drawn of context.drawn) {
    if (!isDevice(drawn)) continue;
    tally.judge(
      [drawn.id],
      context.steady.flatMap((one) => {
        const device = one.part(drawn.id) as Device;
        // What is open carries nothing: that is no pass.
        return device.state === 'open' ? [] : [judgement(device, one)];
      }),
    );
  }
  return tally.outcome();
}
