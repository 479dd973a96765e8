/** What charges what, and how much of it each string would get. */
import type { ChargerPart, ControllerPart, ConverterPart, DiodePart, StringPart } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import { closedNets, polesOf, throughDiodes } from '../network/wiring.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { banksOf } from './systemVolts.ts';

export type ChargingPart = ChargerPart | ControllerPart | ConverterPart;

function isCharging(part: SinglePart): part is ChargingPart {
  return part.kind === 'charger' || part.kind === 'controller' || part.kind === 'converter';
}

/** A string that a charging part reaches, and the diodes on the way. */
interface ChargedString {
  readonly string: StringPart;
  readonly diodes: readonly DiodePart[];
}

export interface Charge {
  readonly charger: ChargingPart;
  /** Strings whose two terminals its output reaches, itself or through diodes. */
  readonly strings: readonly ChargedString[];
  /** Where it reaches none whole: strings that it charges as several in series. */
  readonly inSeries: readonly StringPart[];
}

/** What can charge what in a case: parts that are on, through what is closed, along the diodes. */
export function chargesIn(one: SolvedCase): readonly Charge[] {
  let charges = ofCase.get(one);
  if (charges === undefined) {
    charges = findCharges(one);
    ofCase.set(one, charges);
  }
  return charges;
}

const ofCase = new WeakMap<SolvedCase, readonly Charge[]>();

function findCharges(one: SolvedCase): readonly Charge[] {
  const nets = closedNets(one.parts);
  const diodes = one.parts.filter((part) => part.kind === 'diode');
  const strings = one.parts.filter((part) => part.kind === 'string');
  const banks = banksOf(one.parts, nets);
  return one.parts.filter(isCharging).flatMap((charger): readonly Charge[] => {
    if (charger.kind !== 'controller' && !charger.on) return [];
    const output = polesOf(charger).find(({ role }) => role === 'source')!;
    const out = throughDiodes(nets.of(output.plus)!, 'along', { nets, diodes });
    const back = throughDiodes(nets.of(output.minus)!, 'against', { nets, diodes });
    const reached = strings.flatMap((string): readonly ChargedString[] => {
      const [plus, minus] = [out.get(nets.of(string.plus)!), back.get(nets.of(string.minus)!)];
      return plus === undefined || minus === undefined ? [] : [{ string, diodes: [...plus, ...minus] }];
    });
    if (reached.length > 0) return [{ charger, strings: reached, inSeries: [] }];
    const bank = banks.get(nets.of(output.plus)!);
    const isAcross = bank !== undefined && bank === banks.get(nets.of(output.minus)!);
    const inSeries = isAcross ? strings.filter((string) => banks.get(nets.of(string.plus)!) === bank) : [];
    return inSeries.length > 0 ? [{ charger, strings: [], inSeries }] : [];
  });
}

export type StringShare =
  | {
      readonly string: StringPart;
      readonly shareA: number;
      readonly totalA: number;
      readonly chargers: readonly ChargingPart[];
    }
  | { readonly string: StringPart; readonly missing: string };

/**
 * Each string's share, by capacity among the strings that the same charging parts reach, of what these can give at once:
 * I_k = Σ over them of I_limit C_k / ΣC. A controller gives no more than its array: array power at the case's sun over nominal volts
 * (`pwm`: the array's own current).
 */
export function bulkChargeShares(context: CheckContext, one: SolvedCase): readonly StringShare[] {
  const charges = chargesIn(one);
  const shares: StringShare[] = [];
  for (const string of one.parts) {
    if (string.kind !== 'string') continue;
    const series = charges.find(({ inSeries }) => inSeries.includes(string));
    if (series !== undefined) {
      const { charger } = series;
      shares.push({
        string,
        missing: `share of ${charger.kind} ${charger.id} in string ${string.id}: it is one of several in series`,
      });
      continue;
    }
    const own = charges.filter(({ strings }) => strings.some((charged) => charged.string === string));
    let shareA = 0;
    let totalA = 0;
    for (const { charger, strings } of own) {
      const givesA = mostA(context, one, charger);
      totalA += givesA;
      shareA += (givesA * string.capacityAh) / strings.reduce((sum, charged) => sum + charged.string.capacityAh, 0);
    }
    if (totalA > 0) shares.push({ string, shareA, totalA, chargers: own.map(({ charger }) => charger) });
  }
  return shares;
}

/** IEC 61215 standard test conditions: the sun of the figures on a module's label. */
const STANDARD_SUN_W_PER_M2 = 1000;

/** The most that a charging part can give in a case, A. */
export function mostA(context: CheckContext, one: SolvedCase, charger: ChargingPart): number {
  if (charger.kind !== 'controller') return charger.outputA;
  const sun = (one.operatingCase.irradianceWPerM2 ?? STANDARD_SUN_W_PER_M2) / STANDARD_SUN_W_PER_M2;
  const arrays = one.parts.filter(
    (part) =>
      part.kind === 'array' &&
      context.nets.same(part.plus, charger.from.plus) &&
      context.nets.same(part.minus, charger.from.minus),
  );
  const nominalV = context.volts.nominalBetween(charger.to.plus, charger.to.minus);
  let availableA = 0;
  for (const array of arrays) {
    if (array.kind !== 'array') continue;
    const arrayA = array.stringsInParallel * array.impA;
    if (charger.type === 'pwm') availableA += arrayA * sun;
    else if (nominalV === undefined) return charger.outputA;
    else availableA += (arrayA * array.modulesInSeries * array.vmpV * sun) / nominalV;
  }
  return Math.min(charger.outputA, availableA);
}
