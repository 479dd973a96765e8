/** What rushes from string to string in the instant in which they are joined. */

import { limitOf } from '../battery/limits.ts';
import { factsOf } from '../battery/stringSource.ts';
import type { CablePart, JunctionId, PartId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { type Device, isDevice, isOpen, isWiring, joined, type SinglePart } from '../network/wiring.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import { branchCurrent } from '../strings/sharing/bankCurrents.ts';
import type { Basis } from '../tables/status.ts';
import { assumedSources } from './assumed.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { type BankAtRest, chargeLimitA, eachBankAtRest, isGraveAtRest } from './restRules.ts';
import type { Rule } from './rule.ts';
import { branchName, branchSource, branchTitle } from './sharedBanks.ts';
import { limitFor } from './stringRules.ts';
import { ELSEWHERE, isOver, missingField, PASS, type Verdict } from './tally.ts';
import { apart, field, list, volts } from './wording.ts';

/** Above this gap per four cells a limiting resistor is asked for; up to it, time and a watchful eye. SRC-BAT-LFP-JOIN. */
const RESISTOR_V_PER_BLOCK = 0.3;
const CELLS_OF_BLOCK = 4;

const JOINING: Basis = {
  source: 'SRC-BAT-LFP-JOIN',
  text: 'first-instant current ΔE/R (Ohm’s law) against fuse, charge limit and cable, common practice; iron phosphate: trade articles, join within 50 mV, use a resistor above 300 mV per 12 V block',
  status: 'common-practice',
};

export const joiningSurge: Rule = {
  id: 'joining-surge',
  family: 'strings',
  kinds: ['string'],
  title: 'Strings would rush into one another when joined',
  compares:
    'for strings joined to the same two poles, the current of the first instant (fast resistance, everything off) with the rating of each string’s fuse, what its cables may carry (where that is known) and what it may take on charge; of iron phosphate strings also the gap between their rest volts with 50 mV and 300 mV per 12 V block',
  remedy: 'Before they are joined, bring them to the same charge one by one, or join them first through a resistor.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => JOINING,
  run: (context) => eachBankAtRest(context, joiningSurge, surgeVerdict),
};

interface Limit {
  readonly limitA: number;
  readonly what: string;
  /** It may open: then the finding is more than a look. */
  readonly opens: boolean;
}

function surgeVerdict(context: CheckContext, at: BankAtRest): Verdict | undefined {
  const { rest, bank } = at;
  if (isGraveAtRest(context, at)) return ELSEWHERE;
  const without = bank.strings.find((string) => 'wants' in limitFor(context, string, 'charge'));
  if (without !== undefined) return missingField(without, 'maxChargeA');
  const sources = bank.branches.map((branch) =>
    branchSource(context, branch, { model: 'fast', ambientDegC: rest.ambientDegC }),
  );
  const emfs = sources.map(({ emfV }) => emfV);
  const [lowV, highV] = [Math.min(...emfs), Math.max(...emfs)];
  const surges = bank.branches.flatMap((branch, k) => {
    const { emfV, ohm } = sources[k]!;
    // With no resistance but its own in the way: never less than what the network brings.
    const mostA = Math.max(highV - emfV, emfV - lowV) / ohm;
    const takes = emfV - lowV < highV - emfV;
    return limitsOf(context, rest, branch, takes).map((limit) => ({ branch, mostA, ...limit }));
  });
  const suspects = surges.filter(({ mostA, limitA }) => isOver(mostA, limitA));
  const gap = gapVerdict(context, rest, bank, highV - lowV);
  if (suspects.length === 0) return gap;
  const fast = fastRest(context, rest);
  const currents = new Map(bank.branches.map((branch) => [branch, Math.abs(branchCurrent(fast, branch) ?? 0)]));
  const over = suspects.map((one) => ({ ...one, surgeA: currents.get(one.branch)! }));
  const worst = over.reduce((most, one) => (one.surgeA / one.limitA > most.surgeA / most.limitA ? one : most));
  if (!isOver(worst.surgeA, worst.limitA) || (gap.kind === 'fail' && gap.severity === 'fix')) return gap;
  const [surge, limit] = apart(worst.surgeA, worst.limitA, 'A');
  return {
    kind: 'fail',
    severity: over.some(({ opens, surgeA, limitA }) => opens && isOver(surgeA, limitA)) ? 'fix' : 'look',
    case: rest.id,
    measured: { value: worst.surgeA, unit: 'A' },
    limit: { value: worst.limitA, unit: 'A' },
    excess: worst.surgeA / worst.limitA,
    message: () =>
      `${branchTitle(worst.branch)} would carry ${surge} in the first instant after joining, its rest volts being up to ${volts(highV - lowV)} from those of ${list(bank.branches.filter((one) => one !== worst.branch).map(branchName))}; ${limit} is ${worst.what}. It falls within minutes${assumedSources(fast)}.`,
  };
}

const fastOf = new WeakMap<SolvedCase, OperatingPoint>();

/** Everything off, with the resistances of the first second; solved once for all banks of a state. */
function fastRest(context: CheckContext, rest: SolvedCase): OperatingPoint {
  const point = fastOf.get(rest) ?? context.solveChanged(rest, [], 'fast');
  fastOf.set(rest, point);
  return point;
}

/** Iron phosphate strings of the same cells: the gap per four cells against what the trade joins by. */
function gapVerdict(context: CheckContext, rest: SolvedCase, bank: Bank, gapV: number): Verdict {
  const tables = context.tables.chemistry;
  const cells = bank.branches.map(({ strings }) =>
    strings.reduce((sum, string) => sum + factsOf(string, { ambientDegC: rest.ambientDegC, tables }).cells, 0),
  );
  const isLfp = bank.strings.every(({ chemistry }) => chemistry === 'lfp');
  const joinV = limitOf('lfp', 'joinWithinV', tables);
  if (!isLfp || joinV === undefined || new Set(cells).size > 1) return PASS;
  const withinV = joinV.value * cells[0]!;
  const resistorV = (RESISTOR_V_PER_BLOCK * cells[0]!) / CELLS_OF_BLOCK;
  if (!isOver(gapV, withinV)) return PASS;
  const needsResistor = isOver(gapV, resistorV);
  const limitV = needsResistor ? resistorV : withinV;
  const [gap, limit] = apart(gapV, limitV, 'V');
  return {
    kind: 'fail',
    severity: needsResistor ? 'fix' : 'look',
    case: rest.id,
    measured: { value: gapV, unit: 'V' },
    limit: { value: limitV, unit: 'V' },
    excess: gapV / limitV,
    message: () =>
      `Strings ${list(bank.branches.map(branchName))} rest ${gap} apart; ${limit} is ${needsResistor ? 'where the trade asks for a resistor between them' : 'within what the trade joins iron phosphate blocks'}, and equal volts on its flat curve do not prove equal charge${assumedSources(rest.point)}.`,
  };
}

/** What the current of a branch may not pass: its fuses and cables up to the first fork, and its charge limit where it takes. */
function limitsOf(context: CheckContext, rest: SolvedCase, branch: Branch, takes: boolean): readonly Limit[] {
  const { devices, cables } = leadsOf(context, rest, branch);
  const chargeA = takes ? chargeLimitA(context, branch) : undefined;
  return [
    ...(chargeA === undefined
      ? []
      : [{ limitA: chargeA, what: `what ${branchName(branch)} may take on charge`, opens: false }]),
    ...devices.map((device) => ({
      limitA: device.ratingA,
      what: field(device, 'ratingA'),
      opens: true,
    })),
    ...cables.flatMap((cable) => {
      const found = context.ampacityOf(cable, rest.ambientDegC);
      if ('missing' in found || context.job.practiceAssumed === true) return [];
      return [{ limitA: found.finalA, what: `what cable ${cable.id} may carry`, opens: false }];
    }),
  ];
}

interface Leads {
  readonly devices: readonly Device[];
  readonly cables: readonly CablePart[];
}

/** The wiring in line with a branch, from each of its ends to the first fork. */
function leadsOf(context: CheckContext, rest: SolvedCase, branch: Branch): Leads {
  const along = [
    ...inLine(context, rest, branch.plus, branch.strings.at(-1)!),
    ...inLine(context, rest, branch.minus, branch.strings[0]!),
  ];
  return { devices: along.filter(isDevice), cables: along.filter((part) => part.kind === 'cable') };
}

function inLine(context: CheckContext, rest: SolvedCase, start: JunctionId, string: SinglePart): readonly SinglePart[] {
  const found: SinglePart[] = [];
  let [junction, from]: [JunctionId, PartId] = [start, string.id];
  for (;;) {
    const ends = context.meetings.get(junction) ?? [];
    const next = ends.find(({ part }) => part.id !== from)?.part;
    if (ends.length !== 2 || next === undefined || !isWiring(next) || next.kind === 'busbar') return found;
    const part = rest.part(next.id);
    if (isOpen(part) || found.some(({ id }) => id === part.id)) return found;
    found.push(part);
    junction = joined(next).find((end) => end !== junction) ?? junction;
    from = next.id;
  }
}
