/** What a device may have to break against what it can. */
import type { Device } from '../network/wiring.ts';
import { isDevice } from '../network/wiring.ts';
import type { DeviceFault } from '../protection/answer.ts';
import type { Basis } from '../tables/status.ts';
import { entered } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { faultsOf } from './faultFigures.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together } from './wording.ts';

const BREAKS_FAULT: Basis = {
  source: 'SRC-INTERRUPT',
  text: 'NEC (NFPA 70), numbering of 2023, 110.9, second-hand; IEC 60364-4-43 cl. 432.3 and 434.5.1; ABYC E-11, breaker table',
  status: 'published',
};

export const interruptTooLow: Rule = {
  id: 'interrupt-too-low',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse or breaker cannot break the fault current',
  compares:
    'interruptA of each fuse and breaker with the most that a bolted fault right behind it can send through it: every source together, everything closed, strings full, cables cold, assumed figures at the end that gives most',
  remedy:
    'Fit a device with a higher direct-current interrupting rating, or a current-limiting fuse tested with it ahead of it.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => BREAKS_FAULT,
  run: runInterrupt,
};

function runInterrupt(context: CheckContext): RuleOutcome {
  const tally = new Tally(interruptTooLow, BREAKS_FAULT);
  for (const device of context.drawn) {
    if (!isDevice(device)) continue;
    // A rating that is not given is told as such.
    if (device.interruptA === undefined) tally.judge([device.id], [ELSEWHERE]);
    else {
      const fault = faultsOf(context).devices.get(device.id);
      if (fault !== undefined)
        tally.judge([device.id], [interruptVerdict(context, { ...device, interruptA: device.interruptA }, fault)]);
    }
  }
  return tally.outcome();
}

function interruptVerdict(
  context: CheckContext,
  device: Device & { readonly interruptA: number },
  { at, highestA, fromBothSides }: DeviceFault,
): Verdict {
  const { interruptA } = device;
  if (!isOver(highestA, interruptA)) return PASS;
  const faults = faultsOf(context);
  const kindestA = faults.kindestHighestA(device.id);
  const mayHold = kindestA !== undefined && !isOver(kindestA, interruptA);
  const [fault, breaks] = apart(highestA, interruptA, 'A');
  return {
    kind: 'fail',
    severity: mayHold ? 'look' : 'stop',
    case: context.cases[0]?.id ?? '',
    measured: { value: highestA, unit: 'A' },
    limit: { value: interruptA, unit: 'A' },
    excess: highestA / interruptA,
    message: () =>
      `${titleOf(device)} can break ${breaks}, and a fault at ${at} can send ${fault} through it${fromBothSides ? ' (sources lie on both sides)' : ''}${faults.assumed}${rangeWords(kindestA, mayHold)}.`,
    basis: together(BREAKS_FAULT, entered(device, 'interruptA')),
  };
}

function rangeWords(kindestA: number | undefined, mayHold: boolean): string {
  if (kindestA === undefined) return '';
  return mayHold
    ? `; with the softest strings that may be assumed it is ${amps(kindestA)}, which the device breaks: measure the strings`
    : `, and with the softest of them it is still ${amps(kindestA)}`;
}
