/** A short inside one string of several: what the healthy ones send back through its fuse and its cables. */

import type { CablePart } from '../job/part.ts';
import type { Device } from '../network/wiring.ts';
import { clearingOf, provenance } from '../protection/clearing.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import { FaultNetwork } from '../protection/faultNetwork.ts';
import type { FaultState } from '../protection/faultState.ts';
import { withstandOf } from '../protection/withstand.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import type { Basis } from '../tables/status.ts';
import { ownDevices } from './branchDevices.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { ADIABATIC_S } from './clearingRules.ts';
import type { WantedField } from './finding.ts';
import { protectedCablesOf } from './protectedCables.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchName, branchTitle, idsOf, sharedBanks } from './sharedBanks.ts';
import { ELSEWHERE, isOver, missing, missingField, PASS, sizeWanted, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, list, together } from './wording.ts';

export const backfeedIntoBadString: Rule = {
  id: 'backfeed-into-bad-string',
  family: 'strings',
  kinds: ['string'],
  title: 'Healthy strings feed a failed one beyond what its fuse or cable stands',
  compares:
    'for each string of a bank, shorted inside beyond its own fuse: the current that all the others send into it, full and at their least resistance, with the interrupt rating of its fuse or breaker, and what that lets through with what its cables withstand',
  remedy: 'Fit string fuses whose interrupt rating covers the sum of all other strings.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => BACKFEED,
  run: runBackfeed,
};

const BACKFEED: Basis = {
  source: 'SRC-PRACTICE',
  text: "common practice for batteries, no source; the current after Kirchhoff's rules (1845), E / (R of the failed string's lead + R of the others in parallel)",
  status: 'common-practice',
};

/** Each branch in the first case in which its bank is the largest. */
function runBackfeed(context: CheckContext): RuleOutcome {
  const tally = new Tally(backfeedIntoBadString, BACKFEED);
  const judged = new Map<string, { readonly one: SolvedCase; readonly bank: Bank; readonly branch: Branch }>();
  for (const one of context.cases) {
    for (const bank of sharedBanks(one)) {
      for (const branch of bank.branches) {
        const key = idsOf(branch).join(' ');
        if (bank.branches.length > (judged.get(key)?.bank.branches.length ?? 0)) judged.set(key, { one, bank, branch });
      }
    }
  }
  const networks = new Map<SolvedCase, FaultNetwork>();
  for (const { one, bank, branch } of judged.values()) {
    const network = networks.get(one) ?? highestOf(context, one);
    networks.set(one, network);
    tally.judge(idsOf(branch), branchVerdicts({ context, one, bank, branch, network }));
  }
  for (const network of networks.values()) network.release();
  return tally.outcome();
}

/** The strings of a case full and at their least resistance, loads and chargers off. */
function highestOf({ job, tables }: CheckContext, { operatingCase }: SolvedCase): FaultNetwork {
  const moment = { most: true, settled: false };
  return new FaultNetwork({ job, tables, operatingCase, method: 'plain', figures: 'bounds', moment }, []);
}

interface FailedBranch {
  readonly context: CheckContext;
  readonly one: SolvedCase;
  readonly bank: Bank;
  readonly branch: Branch;
}

/** With the branch shorted from post to post: its own strings drive their current round the short, the others through its device. */
function branchVerdicts({ network, ...at }: FailedBranch & { readonly network: FaultNetwork }): readonly Verdict[] {
  const { context, one, bank, branch } = at;
  const devices = ownDevices(context, bank, branch);
  // A string without a device of its own is told as such.
  if (devices.length === 0) return [ELSEWHERE];
  const state = network.fault(branch.plus, branch.minus);
  if (state === null) return [missing(`current of a short inside ${branchName(branch)} in case ${one.id}`)];
  return devices.flatMap((device) => {
    const through = state.through(device.id);
    if (through === null) return [missing(`current in ${device.kind} ${device.id} with ${branchName(branch)} shorted`)];
    const fed: Backfeed = { ...at, device, state, backA: Math.abs(through) };
    return [deviceVerdict(fed), ...cablesAlong(fed).map((cable) => cableVerdict(fed, cable))];
  });
}

interface Backfeed extends FailedBranch {
  readonly device: Device;
  readonly state: FaultState;
  readonly backA: number;
}

function deviceVerdict({ one, bank, branch, device, state, backA }: Backfeed): Verdict {
  if (device.interruptA === undefined) return missingField(device, 'interruptA');
  if (!isOver(backA, device.interruptA)) return PASS;
  const [back, breaks] = apart(backA, device.interruptA, 'A');
  const others = bank.branches.filter((other) => other !== branch);
  return {
    kind: 'fail',
    severity: 'stop',
    case: one.id,
    measured: { value: backA, unit: 'A' },
    limit: { value: device.interruptA, unit: 'A' },
    excess: backA / device.interruptA,
    message: `${branchTitle(branch)} shorted inside: ${list(others.map((other) => shareOf(state, other)))} back into it through ${device.id}, ${back} in all; ${device.id} breaks ${breaks} at most${others.length === 1 ? ', and the fuse of the other string carries as much' : ''}.`,
    others: [device.id],
  };
}

/** Cables of the failed string's own way: what carries the whole of the current; of two strings those in series with the device. */
function cablesAlong({ context, one, bank, device, state, backA }: Backfeed): readonly CablePart[] {
  const own = protectedCablesOf(context).of(device);
  return one.parts.filter((part): part is CablePart => {
    if (part.kind !== 'cable' || !isSame(Math.abs(state.through(part.id) ?? 0), backA)) return false;
    return bank.branches.length > 2 || own.some(({ id }) => id === part.id);
  });
}

/** Of one current; a solve leaves the last digits open. */
function isSame(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-6 * b;
}

function cableVerdict({ context, one, branch, device, backA }: Backfeed, cable: CablePart): Verdict {
  const withstand = withstandOf(cable, context.tables);
  if ('missing' in withstand) return missing(withstand.missing, ...sizeWanted(cable));
  if (!isOver(backA ** 2 * ADIABATIC_S, withstand.k2s2)) return PASS;
  const band = deviceBandOf(device, context.tables);
  if ('missing' in band)
    return missing(`${band.missing}: whether cable ${cable.id} stands what it lets through`, ...timesWanted(device));
  const { letThroughI2t, clearS, beyond } = clearingOf({ band, currentA: backA });
  // A device that need not open is told as one that a fault is too weak for.
  if (letThroughI2t === null || clearS === null) return ELSEWHERE;
  if (!isOver(letThroughI2t, withstand.k2s2)) return PASS;
  // Beyond the last point the band gives a bound only: what passes by it passes, what does not is open.
  if (beyond) {
    const where = `whether cable ${cable.id} stands what it lets through lies beyond the last point of its band`;
    return missing(`curvePoints of ${device.kind} ${device.id}: ${where}`, ...timesWanted(device));
  }
  const [through, stands] = apart(letThroughI2t, withstand.k2s2, 'A2s');
  return {
    kind: 'fail',
    severity: 'stop',
    case: one.id,
    measured: { value: letThroughI2t, unit: 'A2s' },
    limit: { value: withstand.k2s2, unit: 'A2s' },
    excess: letThroughI2t / withstand.k2s2,
    message: `${branchTitle(branch)} shorted inside: the others send ${amps(backA)} back through cable ${cable.id}, and ${device.id} lets ${through} through (${provenance(band)}); the cable stands ${stands}.`,
    remedy: 'Fit faster string fuses or thicker string cables.',
    basis: together(BACKFEED, withstand.basis, band.basis),
    others: [cable.id, device.id],
  };
}

function timesWanted(device: Device): readonly WantedField[] {
  return device.kind === 'fuse' && device.type === undefined
    ? [wanted(device, 'type')]
    : [wanted(device, 'curvePoints')];
}

function shareOf(state: FaultState, branch: Branch): string {
  const currentA = state.through(branch.strings[0]!.id) ?? 0;
  return `${branchName(branch)} sends ${amps(Math.abs(currentA))}`;
}
