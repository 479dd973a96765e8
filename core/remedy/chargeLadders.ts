/** Chargers, controllers and converters set otherwise; strings kept warm. */
import { chargeWindow } from '../battery/limits.ts';
import { factsOf } from '../battery/stringSource.ts';
import { setInCase } from '../draft/cases.ts';
import { setField } from '../draft/fields.ts';
import { partsInCase } from '../job/job.ts';
import type { ChargerPart, ControllerPart, ConverterPart, Part, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Candidate, type Ladder, relabelled, stepped } from './candidate.ts';

type Charging = ChargerPart | ControllerPart | ConverterPart;

function isCharging(part: Part | undefined): part is Charging {
  return part?.kind === 'charger' || part?.kind === 'controller' || part?.kind === 'converter';
}

/** Another set-point: the usual absorption volts of the string, then the bound that was missed. */
export function otherSetpoint(bench: Bench, [chargerId, stringId]: readonly PartId[]): readonly Ladder[] {
  const charger = chargerId === undefined ? undefined : bench.inCase(chargerId);
  const string = stringId === undefined ? undefined : bench.inCase(stringId);
  if (!isCharging(charger) || string?.kind !== 'string') return [];
  const { measured, limit } = bench.finding;
  // What a diode on the way keeps from the string is added to what the string should get.
  const keptV = setpointOf(charger) - measured.value;
  const context = { ambientDegC: ambientOf(bench.job, bench.operatingCase), tables: bench.tables.chemistry };
  const { cells, temperatureDegC } = factsOf(string, context);
  const usual = chargeWindow(
    { chemistry: string.chemistry, cells, temperatureDegC },
    bench.tables.chemistry,
  ).absorptionV;
  const bound = measured.value > limit.value ? down(limit.value + keptV) : up(limit.value + keptV);
  const wanted = usual === undefined ? [] : [Number((usual.value + keptV).toFixed(1))];
  return [...wanted, bound].map((volts) => stepped([setpoint(bench, charger, volts)]));
}

/** Set-points that hold a load below the most that it stands. */
export function lowerSetpoints(bench: Bench): readonly Ladder[] {
  const { limit } = bench.finding;
  const rungs = partsInCase(bench.job, bench.operatingCase).flatMap((part): readonly Candidate[] =>
    isCharging(part) && setpointOf(part) > limit.value ? [setpoint(bench, part, down(limit.value))] : [],
  );
  return rungs.map((rung) => stepped([rung]));
}

function setpointOf(charger: Charging): number {
  return charger.kind === 'converter' ? charger.outputV : charger.setpointV;
}

function setpoint(bench: Bench, charger: Charging, volts: number): Candidate {
  const field = charger.kind === 'converter' ? 'outputV' : 'setpointV';
  const text = (value: number) => formatQuantity({ value, unit: 'V' });
  const label = `${titleOf(charger)}: set to ${text(volts)} instead of ${text(setpointOf(charger))}`;
  const amount = Math.abs(volts - setpointOf(charger));
  return { edit: bench.set(charger, field, volts, label), cost: 'a setting', effort: 'setting', amount };
}

/** Settings are made in tenths of a volt. */
function down(volts: number): number {
  return Math.floor(Number((volts * 10).toFixed(6))) / 10;
}
function up(volts: number): number {
  return Math.ceil(Number((volts * 10).toFixed(6))) / 10;
}

/** Charge currents limited in proportion, of every charging part named or, where none is, of each that gives. */
export function weakerCharge(bench: Bench): readonly Ladder[] {
  const { finding, point } = bench;
  const share = finding.limit.value / finding.measured.value;
  if (!(share > 0 && share < 1)) return [];
  const named = finding.parts.map((id) => bench.inCase(id)).filter(isCharging);
  const giving = partsInCase(bench.job, bench.operatingCase)
    .filter(isCharging)
    .filter(({ id }) => (point.parts.get(id)?.currentA ?? 0) > 0);
  return (named.length > 0 ? named : giving).map((charger) => {
    const amps = (value: number) => formatQuantity({ value, unit: 'A' });
    const limits = [share, share * share, share / 2].map((part) => Math.max(1, Math.floor(charger.outputA * part)));
    const rungs = limits.map((outputA): Candidate => {
      const label = `${titleOf(charger)}: limited to ${amps(outputA)} instead of ${amps(charger.outputA)}`;
      const edit = bench.set(charger, 'outputA', outputA, label);
      return { edit, cost: 'a setting', effort: 'setting', amount: charger.outputA - outputA };
    });
    return stepped(rungs);
  });
}

/** No charge while it is cold: the charger off in the case; or the string kept at the least temperature. */
export function noColdCharge(bench: Bench, [chargerId, stringId]: readonly PartId[]): readonly Ladder[] {
  const { finding } = bench;
  const ladders: Ladder[] = [];
  const string = stringId === undefined ? undefined : bench.inCase(stringId);
  const charger = chargerId === undefined ? undefined : bench.inCase(chargerId);
  if (charger !== undefined && 'on' in charger) ladders.push(offInCase(bench, charger));
  if (string?.kind === 'string') {
    const degC = Math.ceil(finding.limit.value);
    const label = `String ${nameOf(string)}: kept at ${formatQuantity({ value: degC, unit: 'degC' })} or above`;
    const change = { part: string.id, field: 'temperatureDegC', value: degC, origin: 'guess' } as const;
    const edit = relabelled(setField(change), label);
    ladders.push(stepped([{ edit, cost: 'a heated box, or a warmer place', effort: 'part-in', amount: degC }]));
  }
  return ladders;
}

/** The part off in the case that the finding is about. */
export function offInCase(bench: Bench, part: Part): Ladder {
  const id = bench.operatingCase.id;
  const label = `${titleOf(part)}: off in case ${id}`;
  const edit = relabelled(setInCase({ case: id, part: part.id, field: 'on', value: false }), label);
  return stepped([{ edit, cost: 'a habit: it stays off then', effort: 'setting', amount: 1 }]);
}

function titleOf(part: Part): string {
  return `${part.kind.charAt(0).toUpperCase()}${part.kind.slice(1)} ${nameOf(part)}`;
}
