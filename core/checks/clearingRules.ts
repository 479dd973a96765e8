/** Whether the weakest fault opens a device in time, and whether the cables behind it stand what it lets through. */
import type { CablePart } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { Clearing, DeviceBand, DeviceFault } from '../protection/answer.ts';
import { clearingOf, provenance, timeText } from '../protection/clearing.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import { worstLetThrough } from '../protection/letThrough.ts';
import { adiabaticTimeS, type Withstand, withstandOf } from '../protection/withstand.ts';
import type { Basis } from '../tables/status.ts';
import type { CheckContext } from './checkContext.ts';
import { faultsOf } from './faultFigures.ts';
import type { WantedField } from './finding.ts';
import { protectedCablesOf } from './protectedCables.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, missing, PASS, sizeWanted, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, shortList, titleOf, together } from './wording.ts';

const OPENS_IN_TIME: Basis = {
  source: 'SRC-FAULT-CLEARING',
  text: 'IEC 60364-4-43 cl. 434.5.2 (principle); the time is the setting faultClearS, 5 s by common practice',
  status: 'from-memory',
};
const STANDS_LET_THROUGH: Basis = {
  source: 'SRC-LET-THROUGH',
  text: 'IEC 60364-4-43 cl. 434.5.2, I²t against k²S², and table 43A, second-hand',
  status: 'published',
};
/** The form with all heat kept in the metal holds up to here (IEC 60364-4-43 434.5.2). */
export const ADIABATIC_S = 5;

export const faultTooWeak: Rule = {
  id: 'fault-too-weak',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'A weak fault may not open the fuse or breaker in time',
  compares:
    'the least current that a bolted fault at the far end of what each fuse or breaker protects sends through it (cables hot, strings at their weakest, the weakest bank alone) with the current that surely opens it within faultClearS of the settings, or before its cables are too hot',
  remedy: 'Use a smaller or faster fuse, a thicker cable, or a shorter run.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => OPENS_IN_TIME,
  run: (context) => eachTimedDevice(context, faultTooWeak, OPENS_IN_TIME, (at) => [weakVerdict(at)]),
};

export const cableCooks: Rule = {
  id: 'cable-cooks',
  family: 'cable',
  kinds: ['fuse', 'breaker'],
  title: 'Cable does not stand what the fuse or breaker lets through',
  compares:
    'the most that each fuse or breaker lets through, I²t, for any fault from the weakest at the far end to the strongest right behind it, with k²S² of every cable that it protects',
  remedy: 'Use a larger cable, or a faster or current-limiting fuse.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => STANDS_LET_THROUGH,
  run: (context) => eachTimedDevice(context, cableCooks, STANDS_LET_THROUGH, cookVerdicts),
};

interface TimedFault {
  readonly context: CheckContext;
  readonly device: Device;
  readonly fault: DeviceFault;
  readonly band: DeviceBand;
  readonly cables: readonly CablePart[];
}

function eachTimedDevice(
  context: CheckContext,
  rule: Rule,
  basis: Basis,
  judge: (at: TimedFault) => readonly Verdict[],
): RuleOutcome {
  const tally = new Tally(rule, basis);
  const fed = fedNets(context);
  const untimed = new Map<string, Device[]>();
  for (const device of context.drawn) {
    if (!isDevice(device) || !fed.has(context.nets.of(device.from)!)) continue;
    const band = deviceBandOf(device, context.tables);
    if ('missing' in band) {
      const name = device.kind === 'fuse' && device.type === undefined ? 'type' : 'curvePoints';
      const key = `${name} of ${device.kind}`;
      untimed.set(key, [...(untimed.get(key) ?? []), device]);
      continue;
    }
    const fault = faultsOf(context).devices.get(device.id);
    if (fault === undefined) continue;
    const cables = protectedCablesOf(context).of(device);
    tally.judge([device.id], judge({ context, device, fault, band, cables }));
  }
  for (const [what, devices] of untimed) judgeUntimed(tally, what, devices);
  return tally.outcome();
}

/** What a string feeds, everything closed. Electronic sources send little more into a fault than into a load. */
function fedNets({ drawn, nets }: CheckContext): ReadonlySet<number> {
  return new Set(drawn.flatMap((part) => (part.kind === 'string' ? [nets.of(part.plus)!, nets.of(part.minus)!] : [])));
}

/** Devices that lack the same figure are one question. */
function judgeUntimed(tally: Tally, what: string, devices: readonly Device[]): void {
  const ids = devices.map(({ id }) => id);
  const [plural, verb] = ids.length === 1 ? ['', 'it opens'] : ['s', 'they open'];
  const fields = devices.flatMap((device) => timesWanted(device));
  tally.judge(ids, [missing(`${what}${plural} ${shortList(ids)}: when ${verb}`, ...fields)]);
}

function timesWanted(device: Device): readonly WantedField[] {
  const untyped = device.kind === 'fuse' && device.type === undefined;
  return [...(untyped ? [wanted(device, 'type')] : []), wanted(device, 'curvePoints')];
}

function timesMissing(device: Device, what: string): Verdict {
  return missing(`${what}: when it opens`, ...timesWanted(device));
}

function weakVerdict(at: TimedFault): Verdict {
  const { context, device, fault, band } = at;
  const { lowestA } = fault;
  // Where only electronic sources feed it nothing can be counted on to open it, and nothing much flows either.
  if (lowestA === null) return ELSEWHERE;
  const { faultClearS } = context.job.settings;
  const clearing = clearingOf({ band, currentA: lowestA });
  if (clearing.clears === null) return timesMissing(device, `curvePoints of ${device.kind} ${device.id}`);
  if (clearing.clearS !== null && !isOver(clearing.clearS, faultClearS)) return PASS;
  const stands = clearing.clearS === null ? { timeS: 0 } : leastStandS(at, lowestA);
  if ('kind' in stands) return stands;
  const withinS = Math.max(faultClearS, stands.timeS);
  if (clearing.clearS !== null && !isOver(clearing.clearS, withinS)) return PASS;
  // Beyond the band its last time stands for all that is larger.
  if (clearing.beyond) return timesMissing(device, `curvePoints of ${device.kind} ${device.id} up to ${amps(lowestA)}`);
  return weakFailure(at, { lowestA, clearing, faultClearS });
}

/** The shortest time that a protected cable stands the current. */
function leastStandS({ context, cables }: TimedFault, currentA: number): { readonly timeS: number } | Verdict {
  let timeS = Number.POSITIVE_INFINITY;
  for (const cable of cables) {
    const withstand = withstandOf(cable, context.tables);
    if ('missing' in withstand) return missing(withstand.missing, ...sizeWanted(cable));
    timeS = Math.min(timeS, adiabaticTimeS({ ...withstand, currentA }));
  }
  return { timeS: Number.isFinite(timeS) ? timeS : 0 };
}

function weakFailure(
  at: TimedFault,
  { lowestA, clearing, faultClearS }: { lowestA: number; clearing: Clearing; faultClearS: number },
): Verdict {
  const { context, device, fault, band } = at;
  const neededA = openingCurrent(band, faultClearS);
  if (neededA === null)
    return timesMissing(device, `curvePoints of ${device.kind} ${device.id} down to ${timeText(faultClearS)}`);
  const faults = faultsOf(context);
  const kindestA = faults.kindestLowestA(device.id);
  const mayHold = kindestA !== undefined && !isOver(neededA, kindestA);
  const surelyLate = (clearing.holdS ?? 0) >= faultClearS;
  const [found, needed] = apart(lowestA, neededA, 'A');
  const behind = protectedIds(at);
  return {
    kind: 'fail',
    severity: mayHold || (band.from === 'generic' && !surelyLate) ? 'look' : 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: lowestA, unit: 'A' },
    limit: { value: neededA, unit: 'A' },
    excess: neededA / lowestA,
    message: () =>
      `${titleOf(device)} gets ${found} at least from a fault at ${fault.lowestAt ?? ''} to ${fault.lowestTo ?? ''}, the far end of what it protects; ${needed} surely opens it within ${timeText(faultClearS)} (${provenance(band)})${faults.assumed}${stiffWords(kindestA, mayHold)}.`,
    basis: together(OPENS_IN_TIME, band.basis),
    others: behind,
  };
}

function protectedIds({ cables }: TimedFault) {
  return cables.map(({ id }) => id);
}

function stiffWords(kindestA: number | undefined, mayHold: boolean): string {
  if (kindestA === undefined) return '';
  return mayHold
    ? `; with the stiffest strings that may be assumed it is ${amps(kindestA)}, which opens it: measure the strings`
    : `, and with the stiffest of them it is still ${amps(kindestA)}`;
}

/** The least current that surely opens a device within a time; null where its band does not say. */
function openingCurrent(band: DeviceBand, withinS: number): number | null {
  const opens = (currentA: number) => {
    const { clearS } = clearingOf({ band, currentA });
    return clearS !== null && clearS <= withinS;
  };
  let [low, high] = [band.ratingA / 2, band.points.at(-1)?.currentA ?? band.ratingA];
  if (!opens(high)) {
    // Only melting heat says anything beyond the last point.
    if (band.totalI2t === null) return null;
    high = Math.max(high, Math.sqrt(band.totalI2t / withinS)) * MOST_BEYOND;
    if (!opens(high)) return null;
  }
  for (let step = 0; step < BISECTIONS; step++) {
    const middle = Math.sqrt(low * high);
    if (opens(middle)) high = middle;
    else low = middle;
  }
  return high;
}
const BISECTIONS = 60;
const MOST_BEYOND = 100;

function cookVerdicts(at: TimedFault): readonly Verdict[] {
  const { context, fault, band, cables } = at;
  const range = { lowA: fault.lowestA ?? fault.highestA, highA: fault.highestA };
  const worst = worstLetThrough(band, range, ADIABATIC_S);
  return cables.map((cable): Verdict => {
    const withstand = withstandOf(cable, context.tables);
    if ('missing' in withstand) return missing(withstand.missing, ...sizeWanted(cable));
    // Nothing in the range opens it in that time: that is for the rule on weak faults.
    if (worst === null) return ELSEWHERE;
    return isOver(worst.i2t, withstand.k2s2) ? cookFailure(at, { cable, withstand, worst }) : PASS;
  });
}

function cookFailure(
  at: TimedFault,
  found: { cable: CablePart; withstand: Withstand; worst: NonNullable<ReturnType<typeof worstLetThrough>> },
): Verdict {
  const { context, device, band } = at;
  const { cable, withstand, worst } = found;
  const faults = faultsOf(context);
  const [through, stands] = apart(worst.i2t, withstand.k2s2, 'A2s');
  const decided = isDecided(at, found);
  const assumed = withstand.assumed.length === 0 ? '' : `, taken as ${withstand.assumed.join(' and ')}`;
  return {
    kind: 'fail',
    severity: decided ? 'stop' : 'look',
    case: context.cases[0]?.id ?? '',
    measured: { value: worst.i2t, unit: 'A2s' },
    limit: { value: withstand.k2s2, unit: 'A2s' },
    excess: worst.i2t / withstand.k2s2,
    message: () =>
      `${titleOf(device)} lets up to ${through} through in a fault of ${amps(worst.currentA)} (${provenance(band)}); cable ${cable.id} (${withstand.areaMm2.toPrecision(3)} mm²${assumed}) stands ${stands}${decided ? '' : undecidedWords(at)}${faults.assumed}.`,
    basis: together(STANDS_LET_THROUGH, withstand.basis, band.basis),
    others: [cable.id],
  };
}

/** A stop wants figures that leave no way out: the whole band beyond, no assumed string that would make it pass. */
function isDecided(at: TimedFault, found: Parameters<typeof cookFailure>[1]): boolean {
  const { context, device, band, fault } = at;
  const { worst, withstand } = found;
  if (worst.beyond) return false;
  const highA = faultsOf(context).kindestHighestA(device.id);
  if (highA !== undefined) {
    const lowA = Math.min(highA, faultsOf(context).kindestLowestA(device.id) ?? fault.lowestA ?? highA);
    const best = worstLetThrough(band, { lowA, highA }, ADIABATIC_S);
    if (best === null || !isOver(best.i2t, withstand.k2s2)) return false;
  }
  if (band.from === 'maker') return true;
  const { holdS } = clearingOf({ band, currentA: worst.currentA });
  return isOver(worst.currentA ** 2 * (holdS ?? 0), withstand.k2s2);
}

function undecidedWords({ band }: TimedFault): string {
  return band.from === 'generic' ? '; a maker’s curve may show less' : '; beyond what the figures settle';
}
