/** Cables that grow thinner on their way with no new fuse where they do. */
import type { CablePart, JunctionId } from '../job/part.ts';
import { type Device, isDevice, isWiring, joined } from '../network/wiring.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { largestDevice } from './fuseRules.ts';
import { protectedCablesOf } from './protectedCables.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, isUnder, missing, NOMINAL_VOLTS, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together } from './wording.ts';

export const cableShrinks: Rule = {
  id: 'cable-shrinks',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Cable grows thinner with no fuse where it does',
  compares:
    'where a cable that a fuse or breaker protects is followed by one of less ampacity: rating of the device with the largest that the practice allows over the thinner one',
  remedy: 'Put a fuse where the cable grows thinner, or run the larger size through.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('cable-shrinks', judge),
  run: runShrinks,
};

/** A cable right behind another, the way the device sees them. */
interface Step {
  readonly thick: CablePart;
  readonly thin: CablePart;
}

function runShrinks(context: CheckContext): RuleOutcome {
  const tally = new Tally(cableShrinks, cableShrinks.basisFor(context));
  const ambientDegC = Math.max(...context.cases.map((one) => one.ambientDegC));
  const verdicts = new Map<CablePart['id'], Verdict[]>();
  for (const device of context.drawn) {
    if (!isDevice(device)) continue;
    for (const step of stepsFrom(context, device)) {
      const verdict = stepVerdict(context, device, { ...step, ambientDegC });
      if (verdict === undefined) continue;
      verdicts.set(step.thin.id, [...(verdicts.get(step.thin.id) ?? []), verdict]);
    }
  }
  for (const [id, found] of verdicts) tally.judge([id], found);
  return tally.outcome();
}

/** Each cable that the device protects with the one before it, walking away from the device on both sides. */
function stepsFrom(context: CheckContext, device: Device): readonly Step[] {
  const own = new Set(protectedCablesOf(context).of(device));
  const steps: Step[] = [];
  if (own.size < 2) return steps;
  for (const start of [device.from, device.to]) {
    const before = new Map<JunctionId, CablePart | undefined>([[start, undefined]]);
    for (const [junction, thick] of before) {
      for (const { part } of context.meetings.get(junction) ?? []) {
        if (!isWiring(part) || isDevice(part) || (part.kind === 'cable' && !own.has(part))) continue;
        const fresh = joined(part).filter((end) => !before.has(end));
        if (part.kind === 'cable' && thick !== undefined && fresh.length > 0) steps.push({ thick, thin: part });
        for (const end of fresh) before.set(end, part.kind === 'cable' ? part : thick);
      }
    }
  }
  return steps;
}

/** `undefined` where the second cable may carry as much as the first. */
function stepVerdict(
  context: CheckContext,
  device: Device,
  { thick, thin, ambientDegC }: Step & { readonly ambientDegC: number },
): Verdict | undefined {
  const [wide, narrow] = [context.ampacityOf(thick, ambientDegC), context.ampacityOf(thin, ambientDegC)];
  if ('missing' in narrow) return missing(narrow.missing, ...sizeWanted(thin));
  // The thick one lacks a size: the fuse's own rule tells it.
  if ('missing' in wide || !isUnder(narrow.finalA, wide.finalA)) return undefined;
  const nominalV = context.volts.nominalAt(device.from) ?? context.volts.nominalAt(device.to);
  const allowed = largestDevice({ ampacityA: narrow.finalA, nominalV }, context);
  if ('missing' in allowed) return missing(`${allowed.missing} (cable ${thin.id})`, NOMINAL_VOLTS);
  if (!isOver(device.ratingA, allowed.ratingA)) return PASS;
  const [rated, most] = apart(device.ratingA, allowed.ratingA, 'A');
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: device.ratingA, unit: 'A' },
    limit: { value: allowed.ratingA, unit: 'A' },
    excess: device.ratingA / allowed.ratingA,
    message: `${titleOf(thin)}${sizeOf(thin)} follows ${thick.id}${sizeOf(thick)} with no fuse where it begins; it may carry ${amps(narrow.finalA)}, and the next fuse before it, ${device.id}, is ${rated} (${most} is the most allowed over it).`,
    basis: together(cableShrinks.basisFor(context), { text: narrow.basis.text, status: narrow.status }),
    others: [thick.id, device.id],
  };
}

function sizeOf({ size, inParallel }: CablePart): string {
  if (size === undefined) return '';
  return ` (${inParallel === 1 ? '' : `${inParallel} x `}${sizeText(size)})`;
}
