/** Volts of arrays at the controllers that they feed: the most in the coldest air, the least in the hottest. */
import type { ArrayPart, ControllerPart, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { arrayCurve, currentAt, maximumPower } from '../solar/arrayCurve.ts';
import type { PracticeTable } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import { type ArrayChain, chainsBetween } from './arrayCircuits.ts';
import { COMMON_PRACTICE, entered } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import type { WantedField } from './finding.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, isUnder, missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { apart, degrees, list, titleOf, together, volts } from './wording.ts';

/** Volts by the maker's coefficient. */
const COLD_FORMULA: Basis = {
  source: 'SRC-NEC-690-7',
  text: "NEC (NFPA 70) 690.7(A), numbering of 2023, maker's coefficient: modules · Voc (1 + beta (Tmin − 25 °C))",
  status: 'published',
};
/** Cell temperature of the figures on a module's label (IEC 61215 standard test conditions). */
const STANDARD_TEST_DEG_C = 25;

export const pvVoltsCold: Rule = {
  id: 'pv-volts-cold',
  family: 'solar',
  kinds: ['controller'],
  title: 'Array gives more volts in the cold than the controller stands',
  compares:
    "open-circuit volts of the arrays at each controller's input in the coldest air of the site, by the module's coefficient (else by the table for crystalline silicon), with its maxInputV",
  remedy: 'Put fewer modules in series, or use a controller for more volts.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => COLD_FORMULA,
  run: (context) => eachController(context, pvVoltsCold, coldVerdict),
};

/** What a tracking controller wants above the battery's volts; makers ask for 1 to 5 V. */
const HEADROOM_V = 1;
/** A switching controller ties the array to the battery: below this part of its best current it is starved. */
const SWITCHED_PART = 0.9;

const HOT_BASIS: Basis = {
  ...COMMON_PRACTICE,
  text: `volts of the hot array by its curve; ${HEADROOM_V} V above the charge volts for a tracking controller, 90 % of its best current at them for a switching one, common practice, no source; the controller's own data govern`,
};

export const pvVoltsHot: Rule = {
  id: 'pv-volts-hot',
  family: 'solar',
  kinds: ['controller'],
  title: 'Hot array has too few volts to charge',
  compares:
    'volts at the best point of the arrays at full sun in the hottest air of the site with the set-point of the controller and a margin; at a switching controller, the current left at the set-point',
  remedy: 'Put one more module in series, within the largest volts of the controller.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => HOT_BASIS,
  run: (context) => eachController(context, pvVoltsHot, hotVerdict),
};

type Judgement = (context: CheckContext, controller: ControllerPart, chains: readonly ArrayChain[]) => Verdict;

function eachController(context: CheckContext, rule: Rule, judgement: Judgement): RuleOutcome {
  const tally = new Tally(rule, rule.basisFor(context));
  for (const controller of context.drawn) {
    if (controller.kind !== 'controller') continue;
    const chains = chainsBetween(context, controller.from);
    if (chains.length > 0) tally.judge([controller.id], [judgement(context, controller, chains)]);
  }
  return tally.outcome();
}

const AMBIENT_MIN: WantedField = { part: null, field: 'site.ambientMinDegC' };
const AMBIENT_MAX: WantedField = { part: null, field: 'site.ambientMaxDegC' };

const coldVerdict: Judgement = (context, controller, chains) => {
  const coldest = context.job.site.ambientMinDegC;
  const found = chains.map((chain) => coldChain(chain, coldest, context.practice));
  const most = found.reduce((a, b) => (b.volts > a.volts ? b : a));
  if (isOver(most.volts, controller.maxInputV)) {
    const [has, stands] = apart(most.volts, controller.maxInputV, 'V');
    return {
      kind: 'fail',
      severity: 'stop',
      case: context.cases[0]?.id ?? '',
      measured: { value: most.volts, unit: 'V' },
      limit: { value: controller.maxInputV, unit: 'V' },
      excess: most.volts / controller.maxInputV,
      message: `${titleOf(controller)} stands ${stands} at its input; ${namesOf(most.chain)} can give ${has}${coldest === undefined ? ' at 25 °C already' : ` open at ${degrees(coldest)}`}${most.byTable ? ' (no vocPerDegC given: by the table for crystalline silicon)' : ''}.`,
      basis: together(most.basis, entered(controller, 'maxInputV')),
      others: idsOf(most.chain),
    };
  }
  const gap = found.find((one) => one.missing !== undefined)?.missing;
  return gap === undefined ? PASS : missing(gap.words, gap.field);
};

interface ColdVolts {
  readonly chain: ArrayChain;
  readonly volts: number;
  readonly byTable: boolean;
  readonly basis: Basis;
  readonly missing: { readonly words: string; readonly field: WantedField } | undefined;
}

function coldChain(chain: ArrayChain, coldest: number | undefined, practice: PracticeTable): ColdVolts {
  const each = chain.map((array) => openVoltsAt(array, coldest, practice));
  return {
    chain,
    volts: each.reduce((sum, one) => sum + one.volts, 0),
    byTable: each.some(({ byTable }) => byTable),
    basis: together(each[0]!.basis, ...each.slice(1).map(({ basis }) => basis)),
    missing: each.find((one) => one.missing !== undefined)?.missing,
  };
}

/**
 * U = modules · Voc · factor, factor = 1 + beta (T − 25 °C), or by temperature from the table for crystalline silicon where beta
 * is not given; never below 1. Without a temperature, or colder than the table, the volts of the label and what is missing.
 */
export function openVoltsAt(
  array: ArrayPart,
  coldestDegC: number | undefined,
  practice: Pick<PracticeTable, 'solar'>,
): Omit<ColdVolts, 'chain'> {
  const standardV = array.modulesInSeries * array.vocV;
  const plain = { volts: standardV, byTable: false, basis: COLD_FORMULA };
  if (coldestDegC === undefined) {
    return { ...plain, missing: { words: 'ambientMinDegC of the site: how cold it gets', field: AMBIENT_MIN } };
  }
  if (array.vocPerDegC !== undefined) {
    const factor = Math.max(1, 1 + array.vocPerDegC * (coldestDegC - STANDARD_TEST_DEG_C));
    return { ...plain, volts: standardV * factor, missing: undefined };
  }
  if (coldestDegC >= STANDARD_TEST_DEG_C) return { ...plain, missing: undefined };
  const row = practice.solar.coldFactors.find(({ downToDegC }) => coldestDegC >= downToDegC);
  if (row === undefined) {
    const words = `vocPerDegC of array ${array.id}: ${degrees(coldestDegC)} is colder than the table for crystalline silicon`;
    return { ...plain, missing: { words, field: wanted(array, 'vocPerDegC') } };
  }
  const { value, basis } = row.factor;
  return { volts: standardV * value, byTable: true, basis, missing: undefined };
}

const FULL_SUN_W_PER_M2 = 1000;

const hotVerdict: Judgement = (context, controller, chains) => {
  const { ambientMaxDegC, ambientDesignDegC } = context.job.site;
  // The design air is no hotter than the hottest: what fails in it fails.
  const hottest = ambientMaxDegC ?? ambientDesignDegC;
  if (hottest === undefined) return missing('ambientMaxDegC of the site: how hot it gets', AMBIENT_MAX);
  const isSwitched = controller.type === 'pwm';
  const worst = chains
    .map((chain) => (isSwitched ? switchedChain(chain, hottest, controller) : trackedChain(chain, hottest, controller)))
    .reduce((a, b) => (b.has / b.wants < a.has / a.wants ? b : a));
  if (isUnder(worst.has, worst.wants)) {
    const [has, wants] = apart(worst.has, worst.wants, worst.unit);
    const air = `in full sun at ${degrees(hottest)}`;
    return {
      kind: 'fail',
      severity: 'look',
      case: context.cases[0]?.id ?? '',
      measured: { value: worst.has, unit: worst.unit },
      limit: { value: worst.wants, unit: worst.unit },
      excess: worst.has > 0 ? worst.wants / worst.has : Number.POSITIVE_INFINITY,
      message: isSwitched
        ? `${namesOf(worst.chain)} has ${has} left at the ${volts(controller.setpointV)} of ${nameOf(controller)} ${air}; ${wants} would be nine tenths of its best current.`
        : `${namesOf(worst.chain)} has its best point at ${has} ${air}; ${nameOf(controller)}, set to ${volts(controller.setpointV)}, wants ${wants} or more.`,
      others: idsOf(worst.chain),
    };
  }
  return ambientMaxDegC === undefined ? missing('ambientMaxDegC of the site: how hot it gets', AMBIENT_MAX) : PASS;
};

interface HotChain {
  readonly chain: ArrayChain;
  readonly has: number;
  readonly wants: number;
  readonly unit: 'V' | 'A';
}

function trackedChain(chain: ArrayChain, ambientDegC: number, { setpointV }: ControllerPart): HotChain {
  const has = chain.reduce((sum, array) => sum + bestPoint(array, ambientDegC).voltageV, 0);
  return { chain, has, wants: setpointV + HEADROOM_V, unit: 'V' };
}

/** Arrays in series share the volts of the set-point by their open-circuit volts. */
function switchedChain(chain: ArrayChain, ambientDegC: number, { setpointV }: ControllerPart): HotChain {
  const wholeV = chain.reduce((sum, array) => sum + array.modulesInSeries * array.vocV, 0);
  const parts = chain.map((array) => {
    const ownV = (setpointV * array.modulesInSeries * array.vocV) / wholeV;
    const { currentA } = currentAt(arrayCurve(array, { irradianceWPerM2: FULL_SUN_W_PER_M2, ambientDegC }), ownV);
    return { has: Math.max(0, currentA), wants: SWITCHED_PART * bestPoint(array, ambientDegC).currentA };
  });
  const least = parts.reduce((a, b) => (b.has / b.wants < a.has / a.wants ? b : a));
  return { chain, ...least, unit: 'A' };
}

function bestPoint(array: ArrayPart, ambientDegC: number) {
  return maximumPower(arrayCurve(array, { irradianceWPerM2: FULL_SUN_W_PER_M2, ambientDegC }));
}

function namesOf(chain: ArrayChain): string {
  return `${chain.length === 1 ? 'array' : 'arrays'} ${list(chain.map(nameOf))}`.replace(/^a/u, 'A');
}

function idsOf(chain: ArrayChain): readonly PartId[] {
  return chain.map(({ id }) => id);
}
