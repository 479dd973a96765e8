/** What conductors are to be, whatever they carry: no thinner than the book's least, and on boats of stranded copper. */
import { areaOf } from '../conductor/size.ts';
import type { CablePart } from '../job/part.ts';
import type { SmallestConductor } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext } from './checkContext.ts';
import type { Judge, Rule } from './rule.ts';
import { isUnder, missing, missingField, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { field, shortList, titleOf, withEdition } from './wording.ts';

/** For a practice that names none. */
const NO_LEAST: Basis = {
  source: 'SRC-PRACTICE',
  text: 'the chosen practice names none, common practice, no source',
  status: 'common-practice',
};

export const cableTooThin: Rule = {
  id: 'cable-too-thin',
  family: 'cable',
  kinds: ['cable'],
  title: 'Cable thinner than the practice allows at all',
  compares:
    'area of one conductor of each cable with the smallest that the practice allows, laid on its own or inside a sheath',
  remedy: 'Use at least the smallest size of the practice.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.smallestSingle?.basis ?? NO_LEAST, judge),
  run: (context) => {
    const tally = new Tally(cableTooThin, cableTooThin.basisFor(context));
    for (const cable of context.drawn) {
      if (cable.kind === 'cable') tally.judge([cable.id], thinVerdicts(context, cable));
    }
    return tally.outcome();
  },
};

export function thinVerdicts(context: CheckContext, cable: CablePart): readonly Verdict[] {
  const { smallestSingle: single, smallestSheathed: sheathed } = context.practice;
  if (single === undefined || !appliesTo(context, cable, single)) return [];
  if (cable.size === undefined) return [missingField(cable, 'size')];
  const area = areaOf(cable.size, context.tables.conductors);
  if ('missing' in area) return [missing(area.missing, wanted(cable, 'size'))];
  const [singleMm2, sheathedMm2] = [areaOfLeast(context, single), areaOfLeast(context, sheathed ?? single)];
  const [strictest, least] =
    cable.sheathed === true && sheathed !== undefined ? [sheathed, sheathedMm2] : [single, singleMm2];
  if (!isUnder(area.value, least)) return [PASS];
  // In between, the sheath decides.
  if (cable.sheathed === undefined && !isUnder(area.value, sheathedMm2)) {
    return [missingField(cable, 'sheathed', `: ${sizeText(cable.size)} is allowed inside a sheath only`)];
  }
  return [
    {
      kind: 'fail',
      severity: 'fix',
      case: context.cases[0]?.id ?? '',
      measured: { value: area.value, unit: 'mm2' },
      limit: { value: least, unit: 'mm2' },
      excess: least / area.value,
      message: `${titleOf(cable)} is ${sizeText(cable.size)}; the smallest that the practice allows ${cable.sheathed === true ? 'in a sheath' : 'on its own'} is ${sizeText(strictest.size)}.`,
      basis: withEdition(strictest.basis, context),
    },
  ];
}

/** A book's least for low volts says nothing about a cable at more. */
function appliesTo({ volts }: CheckContext, cable: CablePart, { belowV }: SmallestConductor): boolean {
  if (belowV === undefined) return true;
  const volt = volts.nominalAt(cable.from) ?? volts.highestAt(cable.from)?.volts;
  return volt === undefined || isUnder(volt, belowV);
}

function areaOfLeast({ tables }: Pick<Judge, 'tables'>, { size }: SmallestConductor): number {
  const area = areaOf(size, tables.conductors);
  return 'missing' in area ? 0 : area.value;
}

/** For a practice without such a rule: where it comes from. */
const BOATS_ONLY: Basis = {
  source: 'SRC-CFR33-183-425',
  text: '33 CFR 183.425; the chosen practice does not ask for it',
  status: 'published',
};

export const wrongMetalOrSolid: Rule = {
  id: 'wrong-metal-or-solid',
  family: 'cable',
  kinds: ['cable'],
  title: 'Solid or aluminium conductor on a boat',
  compares: 'metal and stranding of each cable with stranded copper, where the practice asks for it',
  remedy: 'Use stranded copper, tinned where it is damp.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.strandedCopperOnly ?? BOATS_ONLY, judge),
  run: (context) => {
    const tally = new Tally(wrongMetalOrSolid, wrongMetalOrSolid.basisFor(context));
    if (context.practice.strandedCopperOnly === undefined) return tally.outcome();
    const cables = context.drawn.filter((part): part is CablePart => part.kind === 'cable');
    const unsaid = cables.filter((cable) => wrongOf(cable) === undefined && isUnsaid(cable));
    for (const cable of cables) if (!unsaid.includes(cable)) tally.judge([cable.id], [metalVerdict(context, cable)]);
    if (unsaid.length > 0) {
      const wants = unsaid.flatMap((cable) =>
        (['metal', 'stranding'] as const).flatMap((name) => (cable[name] === undefined ? [{ cable, name }] : [])),
      );
      const words = shortList(wants.map(({ cable, name }) => field(cable, name)));
      // One line for all of them: it is one question, what was laid here.
      const gap = missing(words, ...wants.map(({ cable, name }) => wanted(cable, name)));
      tally.judge(
        unsaid.map(({ id }) => id),
        [gap],
      );
    }
    return tally.outcome();
  },
};

function isUnsaid({ metal, stranding }: CablePart): boolean {
  return metal === undefined || stranding === undefined;
}

function wrongOf({ metal, stranding }: CablePart): string | undefined {
  const words = [...(metal === 'aluminium' ? ['aluminium'] : []), ...(stranding === 'solid' ? ['solid'] : [])];
  return words.length === 0 ? undefined : words.join(' and ');
}

function metalVerdict(context: CheckContext, cable: CablePart): Verdict {
  const wrong = wrongOf(cable);
  if (wrong === undefined) return PASS;
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: 1, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: 1,
    message: `${titleOf(cable)} is ${wrong}: the practice asks for stranded copper, which stands movement and damp.`,
  };
}
