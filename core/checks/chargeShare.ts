/** What charges what, and how much of it each string would get. */
import type { ChargerPart, ControllerPart, ConverterPart, StringPart } from '../job/part.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Nets, SinglePart } from './wiring.ts';
import { isOpen, netsOf, polesOf } from './wiring.ts';

export type ChargingPart = ChargerPart | ControllerPart | ConverterPart;

export function isCharging(part: SinglePart): part is ChargingPart {
  return part.kind === 'charger' || part.kind === 'controller' || part.kind === 'converter';
}

/** A charging part with the strings whose two terminals lie on its output's nets. */
export interface Charge {
  readonly charger: ChargingPart;
  readonly strings: readonly StringPart[];
  /** Strings that it reaches only through a diode, or as one of several in series. */
  readonly indirect: readonly StringPart[];
}

/** What can charge what in a case: parts that are on, through what is closed. */
export function chargesIn(context: CheckContext, one: SolvedCase): readonly Charge[] {
  const direct = netsOf(one.parts, (part) => !isOpen(part) && part.kind !== 'diode');
  const strings = one.parts.filter((part) => part.kind === 'string');
  return one.parts.filter(isCharging).flatMap((charger) => {
    if (charger.kind !== 'controller' && !charger.on) return [];
    const output = polesOf(charger).find(({ role }) => role === 'source')!;
    const own = strings.filter((string) => spans(direct, string, output));
    const indirect = strings.filter(
      (string) =>
        !own.includes(string) &&
        (spans(context.nets, string, output) ||
          (own.length === 0 && context.volts.sharesBank(string.plus, output.plus, output.minus))),
    );
    return own.length + indirect.length === 0 ? [] : [{ charger, strings: own, indirect }];
  });
}

function spans(
  nets: Nets,
  string: StringPart,
  output: { plus: StringPart['plus']; minus: StringPart['minus'] },
): boolean {
  return nets.same(string.plus, output.plus) && nets.same(string.minus, output.minus);
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
 * Each string's share, by capacity among the strings in parallel with it, of what the charging parts on its nets can give at once:
 * I_k = (C_k / ΣC) Σ I_limit. A controller gives no more than its array: array power at the case's sun over nominal volts
 * (`pwm`: the array's own current).
 */
export function bulkChargeShares(context: CheckContext, one: SolvedCase): readonly StringShare[] {
  const charges = chargesIn(context, one);
  const shares: StringShare[] = [];
  for (const string of one.parts) {
    if (string.kind !== 'string') continue;
    const own = charges.filter(({ strings }) => strings.includes(string));
    const indirect = charges.find((charge) => charge.indirect.includes(string));
    if (own.length === 0 && indirect === undefined) continue;
    if (indirect !== undefined) {
      const missing = `share of ${indirect.charger.kind} ${indirect.charger.id} in string ${string.id}: it lies behind a diode or in series with others`;
      shares.push({ string, missing });
      continue;
    }
    const totalA = own.reduce((sum, { charger }) => sum + mostA(context, one, charger), 0);
    const capacityAh = own[0]!.strings.reduce((sum, { capacityAh: own }) => sum + own, 0);
    const shareA = (totalA * string.capacityAh) / capacityAh;
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
