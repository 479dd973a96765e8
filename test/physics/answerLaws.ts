/** Each part's own law, evaluated again from the volts and amps of an answer. */
import { partsInCase } from '../../core/api.ts';
import {
  type CablePart,
  type ChargerPart,
  type ControllerPart,
  type ConverterPart,
  cablesOfPair,
  type DiodePart,
  type JunctionId,
  type LoadPart,
  type Part,
} from '../../core/job/part.ts';
import { inverterW } from './densePlan.ts';
import { outsideLaws } from './outsideLaws.ts';
import type { Answered } from './solveValue.ts';

/** A law that an answer breaks, and by how much, relative to the volts, amps or watts at stake. */
export interface Breach {
  readonly part: string;
  readonly law: string;
  readonly by: number;
}

/** Volts of the largest island, 1 V at least: what volts are relative to. */
function largestVolts({ point }: Answered): number {
  return Math.max(1, ...[...point.junctions.values()].map((volts) => Math.abs(volts ?? 0)));
}

/** NaN where either has no volts: then no law is kept, or none is asked for. */
function voltsBetween(point: Answered['point'], a: JunctionId, b: JunctionId): number {
  return (point.junctions.get(a) ?? Number.NaN) - (point.junctions.get(b) ?? Number.NaN);
}

export function brokenLaws(answer: Answered, tolerance: number): readonly Breach[] {
  return partsInCase(answer.job, answer.operatingCase)
    .flatMap((part) => breachesOf(part, answer))
    .filter(({ by }) => !(by <= tolerance));
}

function breachesOf(part: Part, answer: Answered): readonly Breach[] {
  const { point, job, operatingCase } = answer;
  const {
    currentA,
    state,
    outputA = null,
    outputV = null,
    inputA = null,
    inputV = null,
  } = point.parts.get(part.id) ?? {};
  const scaleV = largestVolts(answer);
  const across = (a: JunctionId, b: JunctionId): number => voltsBetween(point, a, b);
  const rest = { part: part.id, scaleV };
  switch (part.kind) {
    case 'cable':
    case 'pair':
      return (part.kind === 'pair' ? cablesOfPair(part) : [part]).flatMap((cable) => cableBreach(cable, answer));
    case 'joint':
    case 'shunt':
    case 'fuse':
    case 'breaker':
    case 'switch':
      return ohmic({ ...rest, volts: across(part.from, part.to), amps: currentA, ohm: ohmOf(part), state });
    case 'busbar':
      return part.junctions.slice(1).flatMap((to, k) => {
        const amps = point.parts.get(part.id)!.segmentsA![k]!;
        return ohmic({ ...rest, volts: across(part.junctions[k]!, to), amps, ohm: part.segmentOhm, state });
      });
    case 'string':
      return stringBreach(part, { amps: currentA!, across, scaleV });
    case 'diode':
      return diodeBreaches(part, { amps: currentA!, volts: across(part.from, part.to), scaleV });
    case 'load':
      return state === undefined
        ? loadBreach(part, { amps: currentA!, volts: across(part.plus, part.minus) })
        : nothing(part, currentA, state);
    case 'inverter':
      if (state !== undefined) return nothing(part, currentA, state);
      return [
        breach(
          part,
          'P = V I',
          across(part.plus, part.minus) * currentA! - inverterW(part),
          Math.max(1, inverterW(part)),
        ),
      ];
    case 'charger':
      if (!part.on) return nothing(part, currentA, 'off');
      return feedBreaches(part, { amps: currentA!, volts: across(part.plus, part.minus), limitA: part.outputA });
    case 'array': {
      const curve = operatingCase.irradianceWPerM2 === 0 ? undefined : outsideLaws(job).panel(part, operatingCase);
      // Within a microamp of open circuit the reference's curve is straightened.
      if (curve === undefined || Math.abs(currentA!) < 1e-5) return [];
      return [breach(part, 'array curve', currentA! - curve.currentA(across(part.plus, part.minus)), part.iscA)];
    }
    case 'converter':
      return converterBreaches(part, { inputA, inputV, outputA, outputV, state });
    case 'controller':
      return controllerBreaches(part, { inputA, inputV, outputA, outputV });
    default:
      return [];
  }
}

function breach(part: { readonly id: string }, law: string, gap: number, scale: number): Breach {
  return { part: part.id, law, by: Math.abs(gap) / scale };
}

function ohmOf(part: Extract<Part, { kind: 'joint' | 'shunt' | 'fuse' | 'breaker' | 'switch' }>): number {
  if (part.kind === 'shunt') return part.ratingMv / 1000 / part.ratingA;
  return part.resistanceOhm ?? 0;
}

function ohmic(at: {
  readonly part: string;
  readonly volts: number;
  readonly amps: number | null | undefined;
  readonly ohm: number;
  readonly scaleV: number;
  readonly state: string | undefined;
}): readonly Breach[] {
  if (at.state === 'open') return [breach({ id: at.part }, 'open: no current', at.amps ?? Number.NaN, 1)];
  if (Number.isNaN(at.volts)) return [];
  const dropV = at.amps === null && at.ohm === 0 ? 0 : at.ohm * at.amps!;
  return [breach({ id: at.part }, 'V = R I', at.volts - dropV, at.scaleV)];
}

function cableBreach(cable: CablePart, { point, job, operatingCase }: Answered): readonly Breach[] {
  const { currentA } = point.parts.get(cable.id)!;
  const volts = voltsBetween(point, cable.from, cable.to);
  const { inParallel, endOhm, resistanceOhm } = cable;
  const metal = resistanceOhm === undefined ? outsideLaws(job).conductor(cable, operatingCase) : undefined;
  const ohm = metal === undefined ? resistanceOhm! : metal.ohm + metal.ohmPerA2 * currentA! ** 2;
  return ohmic({
    part: cable.id,
    volts,
    amps: currentA,
    ohm: ohm + endOhm / inParallel,
    scaleV: largestVolts({ point } as Answered),
    state: undefined,
  });
}

function stringBreach(
  part: Extract<Part, { kind: 'string' }>,
  at: { readonly amps: number; readonly across: (a: JunctionId, b: JunctionId) => number; readonly scaleV: number },
): readonly Breach[] {
  const share = part.midpoint === undefined ? 1 : 0.5;
  const volts = at.across(part.plus, part.midpoint ?? part.minus);
  const ownV = share * (part.emfV! - (part.resistanceOhm! + part.linkOhm) * at.amps);
  return [breach(part, 'V = E - R I', volts - ownV, at.scaleV)];
}

function diodeBreaches(
  part: DiodePart,
  at: { readonly amps: number; readonly volts: number; readonly scaleV: number },
): readonly Breach[] {
  const { forwardV = 0.6, slopeOhm = 0 } = part;
  const beyondV = at.volts - forwardV - slopeOhm * at.amps;
  const conducting = at.amps > 1e-9;
  return [
    breach(part, 'one way', Math.min(at.amps, 0), 1),
    // A blocked diode may have any volts below its forward ones, or none that are defined.
    breach(
      part,
      conducting ? 'forward volts' : 'blocks below forward volts',
      conducting ? beyondV : Math.max(beyondV || 0, 0),
      at.scaleV,
    ),
  ];
}

function loadBreach(part: LoadPart, at: { readonly amps: number; readonly volts: number }): readonly Breach[] {
  if (part.powerW !== undefined)
    return [breach(part, 'P = V I', at.volts * at.amps - part.powerW, Math.max(1, part.powerW))];
  if (part.currentA !== undefined) return [breach(part, 'fixed current', at.amps - part.currentA, part.currentA)];
  return [breach(part, 'V = R I', at.volts / part.resistanceOhm! - at.amps, Math.max(1, Math.abs(at.amps)))];
}

function nothing(part: { readonly id: string }, amps: number | null | undefined, state: string): readonly Breach[] {
  return [breach(part, `${state}: no current`, amps ?? Number.NaN, 1)];
}

/** Never inwards, never above the limit; below the set point only at the limit, above it only with no current. */
function feedBreaches(
  part: Pick<ChargerPart, 'id' | 'setpointV'>,
  at: { readonly amps: number; readonly volts: number; readonly limitA: number },
): readonly Breach[] {
  const { amps, volts, limitA } = at;
  const belowV = part.setpointV - volts;
  return [
    breach(part, 'never takes current in', Math.min(amps, 0), 1),
    breach(part, 'never above its limit', Math.max(amps - limitA, 0), Math.max(1, limitA)),
    breach(
      part,
      'at its limit while below its set point',
      belowV > 1e-9 * volts ? amps - limitA : 0,
      Math.max(1, limitA),
    ),
    breach(part, 'no current above its set point', belowV < -1e-9 * volts ? amps : 0, 1),
  ];
}

interface PortAnswer {
  readonly inputA: number | null;
  readonly inputV: number | null;
  readonly outputA: number | null;
  readonly outputV: number | null;
}

function converterBreaches(
  part: ConverterPart,
  at: PortAnswer & { readonly state: string | undefined },
): readonly Breach[] {
  const { outputA, outputV, inputA, inputV } = at;
  if (!part.on || outputV === null || inputV === null) return nothing(part, outputA, at.state ?? 'off');
  const wantedW = (outputA! * outputV) / (part.efficiency ?? 0.9) + (part.standbyW ?? 0);
  return [
    ...feedBreaches({ id: part.id, setpointV: part.outputV }, { amps: outputA!, volts: outputV, limitA: part.outputA }),
    breach(part, 'input power pays for output power', inputA! * inputV - wantedW, Math.max(inputV, outputV, wantedW)),
  ];
}

function controllerBreaches(part: ControllerPart, at: PortAnswer): readonly Breach[] {
  const { inputA, inputV, outputA, outputV } = at;
  if (outputV === null || inputV === null) return nothing(part, outputA, 'unfed');
  const never = [
    breach(part, 'never backwards', Math.min(outputA!, 0), 1),
    breach(part, 'never above its limit', Math.max(outputA! - part.outputA, 0), part.outputA),
    breach(part, 'no current above its set point', outputV > part.setpointV * (1 + 1e-9) ? outputA! : 0, 1),
  ];
  if (part.type === 'pwm')
    return [...never, breach(part, 'direct: as much out as in', outputA! - inputA!, part.outputA)];
  const inputW = inputA! * inputV * (part.efficiency ?? 0.95);
  return [
    ...never,
    breach(
      part,
      'output power is input power times efficiency',
      outputA! * outputV - inputW,
      Math.max(inputV, outputV, inputW),
    ),
  ];
}
