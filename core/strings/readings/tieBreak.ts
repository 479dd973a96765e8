/** "It takes less charge than the others: fuller, or sick?" What each cause would show, and what the readings say of it. */

import type { CheckedJob } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { StringFromReadings, TieBreak, TieBreakRow } from '../answer.ts';
import { type Bank, banksOf } from '../banks.ts';
import { LEAST_RATE_PER_H } from '../sharing/bankCurrents.ts';
import { listed } from '../words/sentence.ts';
import type { Expectation } from './expectation.ts';
import { ownRunOf } from './ownRun.ts';
import type { ReadState } from './readStates.ts';
import { type Seen, seenOf, shareInState } from './seen.ts';

export interface TieBreakRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly states: readonly ReadState[];
  readonly found: readonly StringFromReadings[];
  readonly expectation: Expectation;
  /** Slow solves, for banks whose strings' amps were not read. */
  readonly points?: readonly OperatingPoint[];
}

/** A table for each string that is further below its fair share, on charge or on load, than the share limit. */
export function tieBreaksOf(request: TieBreakRequest): readonly TieBreak[] {
  return banksOf(withoutPairs(request.job.parts)).flatMap((bank) => {
    if (bank.branches.length < 2) return [];
    return laggards(bank, request).map((string) => tieBreakOf(string, request));
  });
}

/** By readings where any string of the bank lags by them; else the furthest behind by the solves. */
function laggards(bank: Bank, request: TieBreakRequest): readonly PartId[] {
  const firsts = bank.branches.map(({ strings }) => strings[0]!.id);
  const limit = request.job.settings.shareLimit;
  const byReading = firsts.filter((id) =>
    request.states.some((state) => shareInState(state, id, limit)?.side === 'less'),
  );
  if (byReading.length > 0) return byReading;
  const wasRead = firsts.some((id) => request.states.some((state) => shareInState(state, id, limit) !== null));
  return wasRead ? [] : laggardBySolve(bank, request);
}

function laggardBySolve({ branches, capacityAh }: Bank, { job, points = [] }: TieBreakRequest): readonly PartId[] {
  let worst: { readonly id: PartId; readonly deviation: number } | null = null;
  for (const point of points) {
    const currents = branches.map(({ strings }) => point.parts.get(strings[0]!.id)?.currentA ?? 0);
    const totalA = currents.reduce((sum, one) => sum + one, 0);
    if (Math.abs(totalA) < LEAST_RATE_PER_H * capacityAh) continue;
    for (const [index, branch] of branches.entries()) {
      const deviation = currents[index]! / totalA / (branch.capacityAh / capacityAh) - 1;
      if (deviation >= -job.settings.shareLimit || deviation >= (worst?.deviation ?? 0)) continue;
      worst = { id: branch.strings[0]!.id, deviation };
    }
  }
  return worst === null ? [] : [worst.id];
}

function tieBreakOf(string: PartId, request: TieBreakRequest): TieBreak {
  const seen = seenOf(string, request);
  const rows = rowsOf(seen);
  return { string, rows, next: nextReading(string, rows, seen, request) };
}

type Verdict = TieBreakRow['agrees'];

/**
 * Signs: + gives, - takes. A cause is out as soon as one reading speaks against it; it is in once the sign that no other cause
 * shares was read. Ranking hints: high resistance with ordinary joint drops, the string; a joint drop over three times what it
 * should be, the joint; low EMF that takes at rest, a shorted cell or only an emptier string.
 */
function rowsOf(seen: Seen): readonly TieBreakRow[] {
  return [
    {
      cause: 'fuller',
      atRest: seen.flat
        ? '+ or 0: it gives a little to the others; on a flat curve the volts hardly show it'
        : '+ it gives to the others, its volts are higher',
      onLoad: 'more than its share',
      onCharge: 'less than its share, until the others have caught up',
      acrossJoint: 'no more millivolts an amp than its neighbours',
      agrees: fuller(seen),
    },
    {
      cause: 'high-resistance',
      atRest: '0: next to nothing either way, its volts are as the others',
      onLoad: 'less than its share, its volts sag most',
      onCharge: 'less than its share, its volts rise most',
      acrossJoint: 'no more millivolts an amp than its neighbours: the drop is inside its blocks',
      agrees: highResistance(seen),
    },
    {
      cause: 'bad-joint',
      atRest: '0: next to nothing either way, its volts are as the others',
      onLoad: 'less than its share',
      onCharge: 'less than its share',
      acrossJoint: 'more than three times the millivolts an amp of its neighbours, and warm',
      agrees: badJoint(seen),
    },
    {
      cause: 'shorted-cell',
      atRest: '− it takes from the others, one block about a cell low (2.1 V for lead-acid)',
      onLoad: 'less than its share, or it is charged while the others give',
      onCharge: 'more than its share, and does not come up',
      acrossJoint: 'no more millivolts an amp than its neighbours',
      agrees: shortedCell(seen),
    },
  ];
}

function judged(against: boolean, decided: boolean): Verdict {
  if (against) return 'no';
  return decided ? 'yes' : 'cannot-tell';
}

function fuller({ rest, load, charge, ohm, joint, flat }: Seen): Verdict {
  const rested = rest === 'takes' || (rest === 'nothing' && !flat);
  const against = rested || load === 'less' || charge === 'more' || ohm === 'high' || joint === 'high';
  return judged(against, rest === 'gives' || (load === 'more' && charge === 'less'));
}

function highResistance({ rest, load, charge, ohm, joint, atTerminals }: Seen): Verdict {
  const circulates = rest === 'gives' || rest === 'takes';
  const against =
    ohm === 'normal' || load === 'more' || charge === 'more' || joint === 'high' || (circulates && ohm !== 'high');
  return judged(against, ohm === 'high' && (joint === 'normal' || atTerminals));
}

function badJoint({ rest, load, charge, joint, ohm, atTerminals }: Seen): Verdict {
  const circulates = rest === 'gives' || rest === 'takes';
  const normalThroughout = ohm === 'normal' && !atTerminals;
  const against =
    joint === 'normal' ||
    load === 'more' ||
    charge === 'more' ||
    (joint !== 'high' && ((circulates && ohm !== 'high') || normalThroughout));
  return judged(against, joint === 'high');
}

function shortedCell({ rest, load, charge, cellLow }: Seen): Verdict {
  const against = rest === 'gives' || rest === 'nothing' || load === 'more' || charge === 'less';
  return judged(against, rest === 'takes' && cellLow);
}

/** The one reading that parts those causes that are still possible. */
function nextReading(string: PartId, rows: readonly TieBreakRow[], seen: Seen, request: TieBreakRequest): string {
  const sure = rows.filter(({ agrees }) => agrees === 'yes');
  if (sure.length === 1) return confirming(sure[0]!.cause, string);
  if (seen.rest === null) {
    return `Read the amps of ${string} with its direction, everything off (case at-rest), and those of the others: + fuller; − emptier, or a shorted cell; next to nothing, resistance or a joint.`;
  }
  if (seen.rest === 'takes') {
    return `Read the volts of every block of ${string} at rest: one about a cell low (2.1 V for lead-acid) is a shorted cell, all alike is a string that is only emptier.`;
  }
  if (seen.joint === null) {
    const parts = wiringOf(string, request);
    const where = parts.length === 0 ? 'its lugs and links' : `its lugs, its links and ${listed(parts)}`;
    return `Read the millivolts across ${where} while it carries its amps, and the same at a neighbour: more than three times as much an amp is the joint, no more than that is the string itself.`;
  }
  if (seen.ohm === null) {
    return `Read the volts at the terminals of ${string} and its amps under two loads, within minutes, that change its amps by at least 30 %: a resistance well above the others' is the string itself.`;
  }
  return `Charge all strings until full, let them rest an hour, and read the amps of ${string} again on load and on charge: what is still short then is not a matter of charge.`;
}

function confirming(cause: TieBreakRow['cause'], string: PartId): string {
  switch (cause) {
    case 'fuller':
      return `Charge all strings until full and read the amps of ${string} on charge again: a string that was only fuller then shares with the others. Nothing needs replacing for this.`;
    case 'high-resistance':
      return `Read the volts of every block of ${string} under the same load: the one that sags most is the one to test for capacity.`;
    case 'bad-joint':
      return `Take the joint apart with the string isolated, clean and tighten it, and read the millivolts across it again at the same amps.`;
    case 'shorted-cell':
      return `Isolate ${string}, let it rest an hour and read the volts of every block: the one about a cell low (2.1 V for lead-acid) is the one.`;
  }
}

function wiringOf(string: PartId, { job }: TieBreakRequest): readonly string[] {
  const parts = withoutPairs(job.parts);
  const part = parts.find((one) => one.id === string);
  if (part?.kind !== 'string') return [];
  return [...ownRunOf(part, parts).carriers.keys()].filter(
    (id) => parts.find((one) => one.id === id)?.kind !== 'string',
  );
}
