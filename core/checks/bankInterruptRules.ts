/** What the devices next to a bank must be able to break, as far as the label of the batteries says. */
import type { StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { entered } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { type MainDevice, mainDevices } from './mainDevices.ts';
import type { Judge, Rule } from './rule.ts';
import { ELSEWHERE, isOver, isUnder, missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, field, list, shortList, titleOf, together, volts } from './wording.ts';

const INTERRUPT_MARK: Basis = {
  source: 'SRC-NEC-240-60',
  text: 'NEC (NFPA 70) 240.60(C), numbering of 2023, cartridge fuses carry their interrupting rating where it is not 10 kA, second-hand',
  status: 'published',
};

export const interruptUnknown: Rule = {
  id: 'interrupt-unknown',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Interrupting rating not known',
  compares: 'each fuse and breaker: is an interruptA (at the direct-current volts of the system) given?',
  remedy: "Find the maker's interrupting figure for direct current; it stands on the device or in its data sheet.",
  byPractice: false,
  reads: 'drawing',
  basisFor: () => INTERRUPT_MARK,
  run: (context) => {
    const tally = new Tally(interruptUnknown, INTERRUPT_MARK);
    for (const device of context.drawn) {
      if (!isDevice(device)) continue;
      tally.judge([device.id], [device.interruptA === undefined ? unknown(context, device) : PASS]);
    }
    return tally.outcome();
  },
};

function unknown(context: CheckContext, device: Device): Verdict {
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    measured: { value: 0, unit: '1' },
    limit: { value: 1, unit: '1' },
    excess: 1,
    message: `${titleOf(device)} has no interrupting rating given: whether it can break a short circuit is not known${typicalWords(context, device)}.`,
  };
}

/** What its type usually can, as a hint: never its own figure. */
function typicalWords({ tables }: Judge, { type }: Device): string {
  const rows = tables.devices.typicalInterrupt.filter((row) => row.type === type);
  if (rows.length === 0) return '';
  const each = rows.map(({ interruptA, upToV }) => `${amps(interruptA.value)} up to ${volts(upToV.value)}`);
  return ` (its type usually breaks ${list(each)})`;
}

export const bigBankNeedsMore: Rule = {
  id: 'big-bank-needs-more',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Main device of a large bank breaks too little',
  compares:
    'interruptA of each device next to a bank of more than 2200 cranking amperes or 500 Ah with the short-circuit current that the maker gives for the strings (20 kA at 125 V does where that is above 10 kA)',
  remedy:
    'Use a current-limiting fuse with a high interrupting rating (20 kA at 125 V direct current) as the main device.',
  byPractice: false,
  reads: 'drawing',
  basisFor: ({ tables }) => tables.devices.largeBank.mainA.basis,
  run: (context) => {
    const tally = new Tally(bigBankNeedsMore, bigBankNeedsMore.basisFor(context));
    for (const { device, near, whole } of mainDevices(context)) {
      if (isLarge(context, whole)) tally.judge([device.id], [bankVerdict(context, { device, near, whole })]);
    }
    return tally.outcome();
  },
};

/** Capacity always stands in the job; cranking amperes are a figure of starter batteries, and count where they are given. */
function isLarge({ tables }: Judge, strings: readonly StringPart[]): boolean {
  const { capacityAh, crankingA } = tables.devices.largeBank;
  const ampereHours = strings.reduce((sum, string) => sum + string.capacityAh, 0);
  const cranking = strings.reduce((sum, string) => sum + (string.crankingA ?? 0), 0);
  return isOver(ampereHours, capacityAh.value) || isOver(cranking, crankingA.value);
}

/** With a device at each string, one string's device breaks what the others send, or what its own does. */
function faultA({ near, whole }: MainDevice): number {
  const sum = (some: readonly StringPart[]) =>
    some.reduce((soFar, { shortCircuitA }) => soFar + (shortCircuitA ?? 0), 0);
  const beyond = whole.filter((string) => !near.includes(string));
  return Math.max(sum(near), sum(beyond));
}

function bankVerdict(context: CheckContext, main: MainDevice): Verdict {
  const { device, whole } = main;
  const { mainA, mainV, fromShortA } = context.tables.devices.largeBank;
  const { interruptA } = device;
  if (interruptA === undefined) return ELSEWHERE;
  const isHigh = !isUnder(interruptA, mainA.value) && !isUnder(device.ratingV ?? 0, mainV.value);
  if (isHigh) return PASS;
  const unsaid = whole.filter(({ shortCircuitA }) => shortCircuitA === undefined);
  const told = whole.filter(({ shortCircuitA }) => shortCircuitA !== undefined);
  const shortA = faultA(main);
  if (!isOver(shortA, interruptA)) {
    if (unsaid.length === 0) return PASS;
    return missing(
      `${shortList(unsaid.map((string) => field(string, 'shortCircuitA')))}: what the main device of a large bank has to break`,
      ...unsaid.map((string) => wanted(string, 'shortCircuitA')),
    );
  }
  const [short, breaks] = apart(shortA, interruptA, 'A');
  const enough = isOver(shortA, fromShortA.value) ? ` (${amps(mainA.value)} at ${volts(mainV.value)} would do)` : '';
  return {
    kind: 'fail',
    severity: clauseOf('big-bank-needs-more', context).status === 'common-practice' ? 'look' : 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: shortA, unit: 'A' },
    limit: { value: interruptA, unit: 'A' },
    excess: shortA / interruptA,
    message: `${titleOf(device)} can break ${breaks}; it lies next to a large bank (${list(whole.map(nameOf))}) of ${short} short-circuit current by the maker's figures${enough}.`,
    basis: together(
      bigBankNeedsMore.basisFor(context),
      ...told.slice(0, 1).map((string) => entered(string, 'shortCircuitA')),
    ),
    others: whole.map(({ id }) => id),
  };
}
