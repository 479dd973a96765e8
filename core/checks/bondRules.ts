/** Bonds to earth, hull or chassis against the smallest that the practice allows and the lead of the battery. */
import { areaOf } from '../conductor/size.ts';
import type { BondPart, CablePart, JunctionId } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import { bondWithstand } from './bondWithstand.ts';
import type { CheckContext } from './checkContext.ts';
import type { Rule } from './rule.ts';
import { isUnder, missing, missingField, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { titleOf, withEdition } from './wording.ts';

const NO_LEAST: Basis = {
  source: 'SRC-PRACTICE',
  text: 'the chosen practice names no smallest bond, common practice, no source',
  status: 'common-practice',
};

export const bondTooSmall: Rule = {
  id: 'bond-too-small',
  family: 'cable',
  kinds: ['bond'],
  title: 'Bond too small',
  compares:
    'area of each bond with the smallest of the practice, where the book asks with the lead of the battery whose pole it bonds, and of a bond to earth with what the current of a fault to earth asks for until each device opens: S at least the square root of I²t, over k',
  remedy: 'Use a larger bond, good for the fault current until the fuse opens.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.smallestBond?.basis ?? NO_LEAST, judge),
  run: (context) => {
    const tally = new Tally(bondTooSmall, bondTooSmall.basisFor(context));
    for (const bond of context.drawn) {
      if (bond.kind === 'bond') tally.judge([bond.id], bondVerdicts(context, bond));
    }
    return tally.outcome();
  },
};

function bondVerdicts(context: CheckContext, bond: BondPart): readonly Verdict[] {
  if (bond.size === undefined) return [missingField(bond, 'size')];
  const area = areaOf(bond.size, context.tables.conductors);
  if ('missing' in area) return [missing(area.missing, wanted(bond, 'size'))];
  return [
    leastVerdict(context, bond, area.value),
    ...leadVerdicts(context, bond, area.value),
    ...bondWithstand(context, bond, area.value),
  ];
}

function leastVerdict(context: CheckContext, bond: BondPart, areaMm2: number): Verdict {
  const least = context.practice.smallestBond;
  if (least === undefined) return PASS;
  const area = areaOf(least.size, context.tables.conductors);
  if ('missing' in area || !isUnder(areaMm2, area.value)) return PASS;
  return tooSmall(context, bond, {
    areaMm2,
    leastMm2: area.value,
    message: `${sizeText(least.size)} is the smallest that the practice allows`,
    basis: least.basis,
  });
}

/** A bond right at a pole of a string is to be no smaller than the lead at its other pole, the one that is not bonded. */
function leadVerdicts(context: CheckContext, bond: BondPart, areaMm2: number): readonly Verdict[] {
  const basis = context.practice.bondAtLeastLead;
  if (basis === undefined) return [];
  return context.drawn.flatMap((string): readonly Verdict[] => {
    if (string.kind !== 'string') return [];
    const other = otherPole(string, [bond.from, bond.to]);
    if (other === undefined) return [];
    return leadsAt(context, other).map((lead): Verdict => {
      if (lead.size === undefined) return missingField(lead, 'size');
      const area = areaOf(lead.size, context.tables.conductors);
      if ('missing' in area) return missing(area.missing, wanted(lead, 'size'));
      const leadMm2 = area.value * lead.inParallel;
      if (!isUnder(areaMm2, leadMm2)) return PASS;
      return tooSmall(context, bond, {
        areaMm2,
        leastMm2: leadMm2,
        message: `the battery lead ${lead.id} is ${lead.inParallel === 1 ? '' : `${lead.inParallel} × `}${sizeText(lead.size)}, and a bond at a pole of the battery should be no smaller`,
        basis,
        others: [lead.id],
      });
    });
  });
}

function otherPole(
  { plus, minus }: { readonly plus: JunctionId; readonly minus: JunctionId },
  ends: readonly JunctionId[],
): JunctionId | undefined {
  if (ends.includes(minus)) return plus;
  return ends.includes(plus) ? minus : undefined;
}

function leadsAt({ meetings }: CheckContext, junction: JunctionId): readonly CablePart[] {
  return (meetings.get(junction) ?? []).flatMap(({ part }) => (part.kind === 'cable' ? [part] : []));
}

function tooSmall(
  context: CheckContext,
  bond: BondPart,
  at: {
    readonly areaMm2: number;
    readonly leastMm2: number;
    readonly message: string;
    readonly basis: Basis;
    readonly others?: readonly CablePart['id'][];
  },
): Verdict {
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: at.areaMm2, unit: 'mm2' },
    limit: { value: at.leastMm2, unit: 'mm2' },
    excess: at.leastMm2 / at.areaMm2,
    message: `${titleOf(bond)} is ${bond.size === undefined ? 'of no size' : sizeText(bond.size)}; ${at.message}.`,
    basis: withEdition(at.basis, context),
    ...(at.others === undefined ? {} : { others: at.others }),
  };
}
