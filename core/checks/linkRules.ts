/** The links between blocks of a string and between strings: what they carry, and what is tapped where. */
import type { CablePart, JunctionId, PartId, StringPart } from '../job/part.ts';
import { isOpen, isWiring, joined, type SinglePart } from '../network/wiring.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import { LEAST_RATE_PER_H } from '../strings/sharing/bankCurrents.ts';
import { sizeText } from '../units/conductorSize.ts';
import { CIRCUIT_LAW } from './bases.ts';
import { cableOverloaded } from './cableRules.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { quietOf } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchCurrents, branchName, idsOf, sharedBanks } from './sharedBanks.ts';
import { GroupVerdicts, isOver, missing, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together } from './wording.ts';

export const linkOverloaded: Rule = {
  id: 'link-overloaded',
  family: 'strings',
  kinds: ['string'],
  title: 'Link between blocks carries more than it may',
  compares:
    'current solved in each string of more than one block with the ampacity of a link of its linkSize, lying in free air, in every case without a starting load; links drawn as cables are judged as cables',
  remedy: 'Use thicker links between the blocks, or let the string carry less.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: cableOverloaded.basisFor.bind(cableOverloaded),
  run: runLinks,
};

function runLinks(context: CheckContext): RuleOutcome {
  const tally = new Tally(linkOverloaded, linkOverloaded.basisFor(context));
  for (const drawn of context.drawn) {
    if (drawn.kind !== 'string' || drawn.blocksInSeries < 2) continue;
    const verdicts = context.steady.map((one) => linkVerdict(context, one.part(drawn.id) as StringPart, one));
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}

function linkVerdict(context: CheckContext, string: StringPart, one: SolvedCase): Verdict {
  if (string.linkSize === undefined) return missingField(string, 'linkSize');
  const { currentA } = one.answer(string.id);
  if (currentA === null) return missing(`current of string ${string.id} in case ${one.id}`);
  const ampacity = context.ampacityOf(linkOf(string), one.ambientDegC);
  if ('missing' in ampacity) return missing(`ampacity of the links of string ${string.id}: ${ampacity.missing}`);
  const carriedA = Math.abs(currentA);
  if (!isOver(carriedA, ampacity.finalA)) return PASS;
  const [carried, allowed] = apart(carriedA, ampacity.finalA, 'A');
  const excess = carriedA / ampacity.finalA;
  return {
    kind: 'fail',
    severity: isOver(excess, context.job.settings.cableStopFactor) ? 'stop' : 'fix',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: ampacity.finalA, unit: 'A' },
    excess,
    message: `${titleOf(string)} carries ${carried} through its links of ${sizeText(string.linkSize)}; such a link in free air may carry ${allowed}.`,
    basis: together(linkOverloaded.basisFor(context), { text: ampacity.basis.text, status: ampacity.status }),
  };
}

const links = new WeakMap<StringPart, CablePart>();

/** A link as the cable that it is: what is not known of it is left to the practice's own assumptions. */
function linkOf(string: StringPart): CablePart {
  const known = links.get(string);
  if (known !== undefined) return known;
  const link: CablePart = {
    kind: 'cable',
    id: string.id,
    label: undefined,
    note: undefined,
    locationTag: undefined,
    at: undefined,
    origin: new Map(),
    range: new Map(),
    given: new Set(),
    from: string.minus,
    to: string.plus,
    lengthM: LINK_M,
    size: string.linkSize,
    inParallel: 1,
    metal: undefined,
    stranding: undefined,
    insulationDegC: undefined,
    run: 'free-air',
    loadedConductors: undefined,
    ambientDegC: undefined,
    conductorDegC: undefined,
    endOhm: 0,
    sheathed: undefined,
    resistanceOhm: undefined,
  };
  links.set(string, link);
  return link;
}
/** Ampacity does not depend on it. */
const LINK_M = 0.3;

export const tapsApart: Rule = {
  id: 'charge-and-load-share-links',
  family: 'strings',
  kinds: ['string'],
  title: 'Charger and load work through the same links',
  compares:
    'in every case without a starting load, what the loads and chargers of the case (beyond what flows with nothing switched on) make one string of a bank take and another give, with C/50 of each',
  remedy: 'Take chargers and loads from the same two points, or bring equal leads of all strings to common bars.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () =>
    together(CIRCUIT_LAW, {
      text: 'C/50 as too little to matter, common practice, no source',
      status: 'common-practice',
    }),
  run: runTapsApart,
};

function runTapsApart(context: CheckContext): RuleOutcome {
  const verdicts = new GroupVerdicts();
  for (const one of context.steady) {
    const rest = quietOf(context, one);
    if (rest === undefined || !rest.isSolved) continue;
    for (const bank of sharedBanks(one)) verdicts.add(idsOf(bank), opposedVerdict(one, rest, bank));
  }
  return verdicts.outcome(tapsApart, tapsApart.basisFor(context));
}

interface Worked {
  readonly branch: Branch;
  readonly currentA: number;
  /** Beyond what flows at rest, per Ah. */
  readonly workedPerH: number;
}

/** By superposition: the case's currents less those at rest are what loads and chargers alone drive. */
function opposedVerdict(one: SolvedCase, rest: SolvedCase, bank: Bank): Verdict | undefined {
  const currents = branchCurrents(one, bank);
  const resting = branchCurrents(rest, bank);
  if (currents === undefined || resting === undefined) return undefined;
  const all = bank.branches.map((branch, k): Worked => {
    const workedA = currents[k]! - resting[k]!;
    return { branch, currentA: currents[k]!, workedPerH: workedA / branch.capacityAh };
  });
  const giver = all.reduce((most, other) => (other.workedPerH > most.workedPerH ? other : most));
  const taker = all.reduce((least, other) => (other.workedPerH < least.workedPerH ? other : least));
  // Both must also be seen at a clamp meter: one string taking and another giving.
  const least = Math.min(
    giver.workedPerH,
    -taker.workedPerH,
    giver.currentA / giver.branch.capacityAh,
    -taker.currentA / taker.branch.capacityAh,
  );
  if (!isOver(least, LEAST_RATE_PER_H)) return PASS;
  const limitA = LEAST_RATE_PER_H * taker.branch.capacityAh;
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: -taker.currentA, unit: 'A' },
    limit: { value: limitA, unit: 'A' },
    excess: least / LEAST_RATE_PER_H,
    message: () => {
      const link = fullestLink(one, giver.branch, taker.branch);
      const through = link === undefined ? 'the links between them' : `${link.id} (${amps(link.currentA)})`;
      return `${branchName(taker.branch)} ${isSingle(taker) ? 'takes' : 'take'} ${amps(-taker.currentA)} while ${branchName(giver.branch)} ${isSingle(giver) ? 'gives' : 'give'} ${amps(giver.currentA)}: charger and load work on different ends of ${through}.`;
    },
  };
}

function isSingle({ branch }: Worked): boolean {
  return branch.strings.length === 1;
}

/** The part on the way from one branch to another, plus to plus or minus to minus, that carries most. */
function fullestLink(
  one: SolvedCase,
  a: Branch,
  b: Branch,
): { readonly id: PartId; readonly currentA: number } | undefined {
  const ways = [...wayBetween(one, a.plus, b.plus), ...wayBetween(one, a.minus, b.minus)];
  const carried = ways.flatMap(({ id, kind }) => {
    const { currentA, segmentsA } = one.answer(id);
    const currents = kind === 'busbar' ? (segmentsA ?? []) : [currentA];
    return [{ id, currentA: Math.max(0, ...currents.map((current) => Math.abs(current ?? 0))) }];
  });
  return carried.reduce<(typeof carried)[number] | undefined>(
    (most, link) => (most === undefined || link.currentA > most.currentA ? link : most),
    undefined,
  );
}

/** The fewest wiring parts that join two junctions in a case. */
function wayBetween(one: SolvedCase, from: JunctionId, to: JunctionId): readonly SinglePart[] {
  const wiring = one.parts.filter((part) => isWiring(part) && part.kind !== 'diode' && !isOpen(part));
  const reached = new Map<JunctionId, readonly SinglePart[]>([[from, []]]);
  for (const [junction, way] of reached) {
    if (junction === to) return way;
    for (const part of wiring) {
      if (!isWiring(part)) continue;
      const ends = joined(part);
      if (!ends.includes(junction)) continue;
      for (const end of ends) if (!reached.has(end)) reached.set(end, [...way, part]);
    }
  }
  return [];
}
