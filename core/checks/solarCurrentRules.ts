/** Controllers and array cables against what the arrays can drive. */
import type { Ampacity } from '../conductor/ampacity.ts';
import type { CablePart, ControllerPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { type ArrayChain, arrayCurrents, chainIscA, chainsBetween } from './arrayCircuits.ts';
import { entered } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import type { Rule } from './rule.ts';
import { isOver, isUnder, missing, missingField, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, list, titleOf, together, withEdition } from './wording.ts';

export const controllerAmps: Rule = {
  id: 'controller-amps',
  family: 'solar',
  kinds: ['controller'],
  title: 'Array gives more amperes than the controller is made for',
  compares:
    '1.25 times the short-circuit current of the arrays at each controller: of a switching one with its outputA, of a tracking one (which limits its own output) with its maxInputA',
  remedy: 'Use a larger controller, or share the array between two.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.solar.currentFactor.basis, judge),
  run: (context) => {
    const tally = new Tally(controllerAmps, controllerAmps.basisFor(context));
    for (const controller of context.drawn) {
      if (controller.kind !== 'controller') continue;
      const chains = chainsBetween(context, controller.from);
      if (chains.length > 0) tally.judge([controller.id], [controllerVerdict(context, controller, chains)]);
    }
    return tally.outcome();
  },
};

function controllerVerdict(context: CheckContext, controller: ControllerPart, chains: readonly ArrayChain[]): Verdict {
  const { currentFactor } = context.practice.solar;
  const arrayA = currentFactor.value * chains.reduce((sum, chain) => sum + chainIscA(chain), 0);
  const isSwitched = controller.type === 'pwm';
  const limitA = isSwitched ? controller.outputA : controller.maxInputA;
  if (limitA === undefined)
    return missingField(controller, 'maxInputA', ': the largest array short-circuit current that it stands');
  if (!isOver(arrayA, limitA)) return PASS;
  const [gives, stands] = apart(arrayA, limitA, 'A');
  const arrays = [...new Set(chains.flat())];
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: arrayA, unit: 'A' },
    limit: { value: limitA, unit: 'A' },
    excess: arrayA / limitA,
    message: `${titleOf(controller)} is made for ${stands}${isSwitched ? '' : ' at its input'}; ${list(arrays.map(nameOf))} can give ${gives} (${currentFactor.value} times the short-circuit current).`,
    basis: together(controllerAmps.basisFor(context), entered(controller, isSwitched ? 'outputA' : 'maxInputA')),
    others: arrays.map(({ id }) => id),
  };
}

/** Named for the trade's 1.56 = 1.25 · 1.25. */
export const pvCable: Rule = {
  id: 'pv-cable-156',
  family: 'solar',
  kinds: ['array'],
  title: 'Array cable too small for a bright day',
  compares:
    'ampacity of each cable that carries array current alone: after correction with 1.25 times the short-circuit current of the arrays on it, and (where the book asks) before correction with 1.25 · 1.25 = 1.5625 times',
  remedy: 'Use a larger array cable.',
  byPractice: true,
  reads: 'drawing',
  basisFor: ({ practice, ...judge }) =>
    withEdition((practice.solar.cableFactor ?? practice.solar.currentFactor).basis, { practice, ...judge }),
  run: (context) => {
    const tally = new Tally(pvCable, pvCable.basisFor(context));
    const carried = arrayCurrents(context);
    for (const cable of context.drawn) {
      const arrayA = carried.get(cable.id);
      if (cable.kind !== 'cable' || arrayA === undefined) continue;
      tally.judge(
        [cable.id],
        context.cases.map((one) => cableVerdict(context, { cable, arrayA, case: one.id, degC: one.ambientDegC })),
      );
    }
    return tally.outcome();
  },
};

interface ArrayCable {
  readonly cable: CablePart;
  readonly arrayA: number;
  readonly case: string;
  readonly degC: number;
}

function cableVerdict(context: CheckContext, at: ArrayCable): Verdict {
  const ampacity = context.ampacityOf(at.cable, at.degC);
  if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(at.cable));
  const { currentFactor, cableFactor } = context.practice.solar;
  const corrected = needs(context, at, { ampacity, holdsA: ampacity.finalA, factor: currentFactor.value, when: '' });
  if (corrected !== undefined || cableFactor === undefined) return corrected ?? PASS;
  const uncorrected = context.uncorrectedAmpacityOf(at.cable, ampacity);
  if ('missing' in uncorrected) return missing(uncorrected.missing, ...sizeWanted(at.cable));
  const holdsA = uncorrected.finalA;
  return needs(context, at, { ampacity, holdsA, factor: cableFactor.value, when: ' before correction' }) ?? PASS;
}

function needs(
  context: CheckContext,
  { cable, arrayA, case: id }: ArrayCable,
  at: { readonly ampacity: Ampacity; readonly holdsA: number; readonly factor: number; readonly when: string },
): Verdict | undefined {
  const neededA = at.factor * arrayA;
  if (!isUnder(at.holdsA, neededA)) return undefined;
  const [needed, holds] = apart(neededA, at.holdsA, 'A');
  const size = cable.size === undefined ? '' : ` (${sizeText(cable.size)})`;
  return {
    kind: 'fail',
    severity: 'fix',
    case: id,
    measured: { value: neededA, unit: 'A' },
    limit: { value: at.holdsA, unit: 'A' },
    excess: at.holdsA > 0 ? neededA / at.holdsA : Number.POSITIVE_INFINITY,
    message: `${titleOf(cable)}${size} carries arrays of ${amps(arrayA)} short-circuit current; it should be good for ${needed}${at.when} (${at.factor} times) and is good for ${holds}.`,
    basis: together(pvCable.basisFor(context), { text: at.ampacity.basis.text, status: at.ampacity.status }),
  };
}
