/** Heat around cables and fuses that the cases of the job do not reach. */

import type { CablePart, FusePart } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import { COMMON_PRACTICE } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import type { WantedField } from './finding.ts';
import type { Rule } from './rule.ts';
import { ELSEWHERE, isOver, isUnder, missing, PASS, sizeWanted, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, degrees, shortList, titleOf, together } from './wording.ts';

const AMBIENT_MAX: WantedField = { part: null, field: 'site.ambientMaxDegC' };

/**
 * The other rules rate a cable in the air of each case. Where the site grows hotter than any case says, and the cable has no air
 * of its own given, its ampacity is looked at once more in the hottest air.
 */
export const hotPlace: Rule = {
  id: 'hot-place',
  family: 'cable',
  kinds: ['cable'],
  title: 'Cable has no room for the hottest air of the site',
  compares:
    'largest current solved in each cable with its ampacity corrected for the hottest air of the site (for one with an ambientDegC of its own: for that air)',
  remedy:
    'Allow for the heat (a case with the hottest air, or a larger cable), or lead the cable around the hot space.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => clauseOf('hot-place', judge),
  run: (context) => {
    const tally = new Tally(hotPlace, hotPlace.basisFor(context));
    const hottest = context.job.site.ambientMaxDegC;
    const unsaid: CablePart[] = [];
    for (const cable of context.drawn) {
      if (cable.kind !== 'cable' || context.steady.length === 0) continue;
      if (hottest === undefined && cable.ambientDegC === undefined) unsaid.push(cable);
      else {
        const verdicts = context.steady.map((one) => heatVerdict(context, cable, one, hottest));
        tally.judge([cable.id], verdicts);
      }
    }
    if (unsaid.length > 0) {
      const gap = missing('ambientMaxDegC of the site: how hot it gets around the cables', AMBIENT_MAX);
      tally.judge(
        unsaid.map(({ id }) => id),
        [gap],
      );
    }
    return tally.outcome();
  },
};

function heatVerdict(
  context: CheckContext,
  drawn: CablePart,
  one: SolvedCase,
  hottestDegC: number | undefined,
): Verdict {
  const cable = one.part(drawn.id) as CablePart;
  const { currentA, undetermined } = one.answer(drawn.id);
  if (currentA === null) {
    return missing(`current in cable ${drawn.id} in case ${one.id}: ${undetermined ?? 'not determined'}`);
  }
  const carriedA = Math.abs(currentA);
  const inCase = context.ampacityOf(cable, one.ambientDegC);
  const degC = Math.max(one.ambientDegC, hottestDegC ?? one.ambientDegC);
  const inHeat = context.ampacityOf(cable, degC);
  if ('missing' in inCase || 'missing' in inHeat) {
    return missing('missing' in inHeat ? inHeat.missing : `ampacity of cable ${cable.id}`, ...sizeWanted(cable));
  }
  // Too much already in the air of the case: told by the rule for overloaded cables.
  if (isOver(carriedA, inCase.finalA)) return ELSEWHERE;
  if (!isOver(carriedA, inHeat.finalA)) return PASS;
  const [carried, allowed] = apart(carriedA, inHeat.finalA, 'A');
  const size = cable.size === undefined ? '' : ` (${sizeText(cable.size)})`;
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: inHeat.finalA, unit: 'A' },
    excess: inHeat.finalA > 0 ? carriedA / inHeat.finalA : Number.POSITIVE_INFINITY,
    message: `${titleOf(cable)}${size} carries ${carried}; in the ${degrees(degC)} that the site can reach it may carry ${allowed} (${amps(inCase.finalA)} at the ${degrees(one.ambientDegC)} of the case).`,
    basis: together(hotPlace.basisFor(context), { text: inHeat.basis.text, status: inHeat.status }),
  };
}

/** A gG fuse-link loses half a percent of its rating for each kelvin above 40 °C, by one maker's application guide. */
const FUSE_FROM_DEG_C = 40;
const FUSE_LOSS_PER_K = 0.005;
/** No fuse place of this trade is hotter than that: a fuse that carries its current there need not be asked about. */
const HOTTEST_PLACE_DEG_C = 80;

const FUSE_HEAT: Basis = {
  source: 'SRC-FUSE-HEAT',
  text: "0.5 % per kelvin above 40 °C for gG fuse-links, one maker's application guide",
  status: 'published',
};
const OTHER_FUSE_HEAT = together(FUSE_HEAT, {
  text: `taken for a fuse of another type, ${COMMON_PRACTICE.text}; the maker's own curve governs`,
  status: 'common-practice',
});

export const fuseWarm: Rule = {
  id: 'fuse-warm',
  family: 'fuse',
  kinds: ['fuse'],
  title: 'Fuse in a hot place carries less than its rating',
  compares:
    'largest current solved in each fuse with its rating less 0.5 % for each kelvin above 40 °C of its ambientDegC (else of the hottest air of the site)',
  remedy:
    "Take the next rating, checking the cable again, or cool the place; for other types than gG use the maker's curve.",
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => FUSE_HEAT,
  run: (context) => {
    const tally = new Tally(fuseWarm, FUSE_HEAT);
    const unsaid: FusePart[] = [];
    for (const fuse of context.drawn) {
      if (fuse.kind !== 'fuse') continue;
      const verdicts = context.steady.flatMap((one) => {
        const now = one.part(fuse.id) as FusePart;
        return now.state === 'open' ? [] : [warmVerdict(context, now, one)];
      });
      if (verdicts.includes(UNSAID)) unsaid.push(fuse);
      else tally.judge([fuse.id], verdicts);
    }
    if (unsaid.length > 0)
      tally.judge(
        unsaid.map(({ id }) => id),
        [unsaidGap(unsaid)],
      );
    return tally.outcome();
  },
};

/** The place of a fuse is not known, and matters. */
const UNSAID: Verdict = missing('ambientDegC');

function unsaidGap(fuses: readonly FusePart[]): Verdict {
  const words = `ambientMaxDegC of the site, or ambientDegC of ${shortList(fuses.map(({ id }) => `fuse ${id}`))}`;
  return missing(words, AMBIENT_MAX, ...fuses.map((fuse) => wanted(fuse, 'ambientDegC')));
}

/** In · (1 − 0.005 (T − 40 °C)) above 40 °C. */
export function ratingInHeatA(ratingA: number, degC: number): number {
  return ratingA * Math.max(0, 1 - FUSE_LOSS_PER_K * Math.max(0, degC - FUSE_FROM_DEG_C));
}

function warmVerdict(context: CheckContext, fuse: FusePart, one: SolvedCase): Verdict {
  const { currentA, undetermined } = one.answer(fuse.id);
  if (currentA === null) {
    return missing(`current in fuse ${fuse.id} in case ${one.id}: ${undetermined ?? 'not determined'}`);
  }
  const carriedA = Math.abs(currentA);
  if (isOver(carriedA, fuse.ratingA)) return ELSEWHERE;
  if (!isOver(carriedA, ratingInHeatA(fuse.ratingA, HOTTEST_PLACE_DEG_C))) return PASS;
  const { ambientMaxDegC } = context.job.site;
  const given =
    fuse.ambientDegC ?? (ambientMaxDegC === undefined ? undefined : Math.max(ambientMaxDegC, one.ambientDegC));
  const degC = given ?? one.ambientDegC;
  const leftA = ratingInHeatA(fuse.ratingA, degC);
  if (!isUnder(leftA, carriedA)) return given === undefined ? UNSAID : PASS;
  const [carried, left] = apart(carriedA, leftA, 'A');
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: leftA, unit: 'A' },
    excess: leftA > 0 ? carriedA / leftA : Number.POSITIVE_INFINITY,
    message: `${titleOf(fuse)}, ${amps(fuse.ratingA)}, carries ${carried} in a place of ${degrees(degC)}, where it holds about ${left}.`,
    basis: fuse.type === 'gG' ? FUSE_HEAT : OTHER_FUSE_HEAT,
  };
}
