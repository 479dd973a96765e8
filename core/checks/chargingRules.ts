/** Charge volts and charge temperature against the chemistry. */
import { cellsPerBlock } from '../battery/cells.ts';
import { type ChargeWindow, chargeWindow, limitOf } from '../battery/limits.ts';
import type { DiodePart, StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { type ChargingPart, chargesIn, mostA } from './chargeShare.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, isUnder, missing, missingField, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { apart, degrees, titleOf, together, volts } from './wording.ts';

const CHEMISTRY_WINDOW: Basis = {
  source: 'SRC-BAT-LIMIT-PRACTICE',
  text: 'charge volts of the chemistry by cell, with temperature compensation',
  status: 'common-practice',
};

export const chargerVoltsOff: Rule = {
  id: 'charger-volts-off',
  family: 'charging',
  kinds: ['charger', 'controller', 'converter'],
  title: 'Charger set to the wrong volts',
  compares:
    'set-point of each charger, controller and charging converter with the window from float to absorption volts of the chemistry times the cells in series, at the temperature of the string',
  remedy: 'Reset the charger, or choose the profile for this chemistry and temperature.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CHEMISTRY_WINDOW,
  run: (context) => eachCharge(context, chargerVoltsOff, voltsVerdict),
};

export const coldCharge: Rule = {
  id: 'cold-charge',
  family: 'charging',
  kinds: ['charger', 'controller', 'converter'],
  title: 'Lithium charged below its lowest temperature',
  compares:
    'temperature of each lithium string (its own, else the air of the case, else the coldest air of the site) with the lowest at which its chemistry may be charged, wherever something can charge it',
  remedy: 'Warm the string, or fit a control that blocks charging below the limit.',
  byPractice: false,
  reads: 'drawing',
  basisFor: ({ tables }) => limitOf('lfp', 'chargeLowestDegC', tables.chemistry)?.basis ?? CHEMISTRY_WINDOW,
  run: (context) => eachCharge(context, coldCharge, coldVerdict),
};

type Judgement = (context: CheckContext, at: ChargeAt) => readonly Verdict[];
interface ChargeAt {
  readonly charger: ChargingPart;
  readonly string: StringPart;
  readonly one: SolvedCase;
  /** Diodes between the two. */
  readonly diodes: readonly DiodePart[];
  /** One of several in series: its volts are not the charger's. */
  readonly isInSeries: boolean;
}

/** One verdict list for each charging part and string over all cases in which the one can charge the other. */
function eachCharge(context: CheckContext, rule: Rule, judgement: Judgement): RuleOutcome {
  const tally = new Tally(rule, rule.basisFor(context));
  const found = new Map<string, { parts: readonly [ChargingPart['id'], StringPart['id']]; verdicts: Verdict[] }>();
  for (const one of context.cases) {
    for (const { charger, strings, inSeries } of chargesIn(one)) {
      const charged = [
        ...strings.map((entry) => ({ ...entry, isInSeries: false })),
        ...inSeries.map((string) => ({ string, diodes: [], isInSeries: true })),
      ];
      for (const entry of charged) {
        const key = JSON.stringify([charger.id, entry.string.id]);
        const known = found.get(key) ?? { parts: [charger.id, entry.string.id] as const, verdicts: [] };
        known.verdicts.push(...judgement(context, { charger, one, ...entry }));
        found.set(key, known);
      }
    }
  }
  for (const { parts, verdicts } of found.values()) tally.judge(parts, verdicts);
  return tally.outcome();
}

const voltsVerdict: Judgement = (context, { charger, string, one, diodes, isInSeries }) => {
  if (isInSeries) {
    return [missing(`volts of ${charger.kind} ${charger.id} at string ${string.id}: it is one of several in series`)];
  }
  const unknown = diodes.find(({ forwardV }) => forwardV === undefined);
  if (unknown !== undefined)
    return [missingField(unknown, 'forwardV', `: it lies between ${charger.id} and string ${string.id}`)];
  // A diode keeps its forward volts from the string.
  const keptV = diodes.reduce((sum, { forwardV }) => sum + (forwardV ?? 0), 0);
  const { chemistry, blockNominalV, blocksInSeries } = string;
  const count = cellsPerBlock(chemistry, blockNominalV, context.tables.chemistry);
  if (!count.known) return [missing(`${count.missing} (string ${string.id})`, wanted(string, 'blockNominalV'))];
  const cells = blocksInSeries * count.cells;
  const temperatureDegC = string.temperatureDegC ?? one.ambientDegC;
  const window = chargeWindow({ chemistry, cells, temperatureDegC }, context.tables.chemistry);
  const plain = chargeWindow({ chemistry, cells, temperatureDegC: REFERENCE_DEG_C }, context.tables.chemistry);
  if (window.absorptionV === undefined) return [missing(`absorption volts of ${chemistry} (string ${string.id})`)];
  const setpointV = (charger.kind === 'converter' ? charger.outputV : charger.setpointV) - keptV;
  const { lowV, highV } = bounds(window);
  const isHigh = isOver(setpointV, highV);
  if (!isHigh && !isUnder(setpointV, lowV)) return [PASS];
  const limitV = isHigh ? highV : lowV;
  const [set, bound] = apart(setpointV, limitV, 'V');
  const atReference = bounds(plain);
  const onlyCompensation = !isOver(setpointV, atReference.highV) && !isUnder(setpointV, atReference.lowV);
  const equalises = isHigh && window.equaliseV !== undefined && !isOver(setpointV, window.equaliseV.high);
  const doubt = onlyCompensation
    ? '; a charger that compensates by itself does right'
    : equalises
      ? `; it equalises (${volts(window.equaliseV.low)} to ${volts(window.equaliseV.high)}), which is for hours under watch and not for every day`
      : '';
  return [
    {
      kind: 'fail',
      severity: onlyCompensation || equalises ? 'look' : 'fix',
      case: one.id,
      measured: { value: setpointV, unit: 'V' },
      limit: { value: limitV, unit: 'V' },
      excess: isHigh ? setpointV / limitV : limitV / setpointV,
      message: `${titleOf(charger)} is set to ${set}${keptV > 0 ? ` behind ${volts(keptV)} of diodes` : ''}; ${nameOf(string)} (${chemistry}, ${cells} cells at ${degrees(temperatureDegC)}) is charged at ${isHigh ? 'no more than' : 'no less than'} ${bound}${doubt}.`,
      basis: windowBasis(window, isHigh),
    },
  ];
};

/** Charge volts of the tables are for 25 °C. */
const REFERENCE_DEG_C = 25;

function bounds({ absorptionV, floatV }: ChargeWindow): { readonly lowV: number; readonly highV: number } {
  const highV = absorptionV?.high ?? Number.POSITIVE_INFINITY;
  return { lowV: Math.min(floatV?.low ?? highV, absorptionV?.low ?? highV), highV };
}

/** The bound that was broken, and the compensation where it moved it. */
function windowBasis({ absorptionV, floatV, compensationVPerK }: ChargeWindow, isHigh: boolean): Basis {
  const bound = isHigh ? absorptionV : (floatV ?? absorptionV);
  const moved = compensationVPerK !== undefined && compensationVPerK.value !== 0 ? compensationVPerK : undefined;
  const used = [bound, moved].flatMap((banded) => (banded === undefined ? [] : [banded.basis]));
  return together(CHEMISTRY_WINDOW, ...used);
}

const coldVerdict: Judgement = (context, { string, one, charger }) => {
  const { chemistry } = string;
  // Plating of lithium is what the rule is about; other chemistries have their own limits.
  if ((chemistry !== 'lfp' && chemistry !== 'nmc') || mostA(context, one, charger) === 0) return [];
  const lowest = limitOf(chemistry, 'chargeLowestDegC', context.tables.chemistry);
  if (lowest === undefined) return [missing(`lowest charge temperature of ${chemistry} (string ${string.id})`)];
  const { site } = context.job;
  const isTold = string.temperatureDegC ?? one.operatingCase.ambientDegC ?? site.ambientDesignDegC;
  const coldest = string.temperatureDegC === undefined ? site.ambientMinDegC : undefined;
  const at = { charger, string, one, lowestDegC: lowest.value, basis: lowest.basis };
  if (isTold !== undefined && isUnder(isTold, lowest.value))
    return [tooCold({ ...at, degC: isTold, severity: 'stop' })];
  if (coldest !== undefined && isUnder(coldest, lowest.value))
    return [tooCold({ ...at, degC: coldest, severity: 'look' })];
  return [
    isTold === undefined
      ? missing(
          `temperatureDegC of string ${string.id}, or ambientDegC of case ${one.id}`,
          wanted(string, 'temperatureDegC'),
        )
      : PASS,
  ];
};

function tooCold(at: {
  readonly charger: ChargingPart;
  readonly string: StringPart;
  readonly one: SolvedCase;
  readonly degC: number;
  readonly lowestDegC: number;
  readonly severity: 'stop' | 'look';
  readonly basis: Basis;
}): Verdict {
  const { charger, string, one, degC, lowestDegC, severity } = at;
  const [cold, limit] = apart(degC, lowestDegC, 'degC');
  const when = severity === 'stop' ? `is at ${cold}` : `has no temperature of its own and the site falls to ${cold}`;
  return {
    kind: 'fail',
    severity,
    case: one.id,
    measured: { value: degC, unit: 'degC' },
    limit: { value: lowestDegC, unit: 'degC' },
    // Temperatures have no ratio: one kelvin counts as one per cent.
    excess: 1 + (lowestDegC - degC) / 100,
    message: `${titleOf(string)} (${string.chemistry}) ${when} while ${charger.kind} ${nameOf(charger)} can charge it; below ${limit} lithium plates out and the cells are spoilt.`,
    basis: at.basis,
  };
}
