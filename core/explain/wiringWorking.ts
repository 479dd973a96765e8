/** The working of cables, devices, joints, bars and diodes. */

import { conductorResistance } from '../conductor/resistance.ts';
import { heatingLaw } from '../conductor/temperature.ts';
import type { BondPart, BusbarPart, CablePart, DiodePart } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import { conductorModel } from '../network/conductorModel.ts';
import { isOpen, type WiringPart } from '../network/wiring.ts';
import { figure, type Lines, product, signed } from './lines.ts';
import type { FigureOrigin, PartRequest } from './workingLine.ts';

/** Volts that a silicon isolator keeps where its label says nothing; common practice, as the solve takes it. */
const DEFAULT_DIODE_V = 0.6;

export function wiringWorking(part: WiringPart, request: PartRequest, lines: Lines): void {
  switch (part.kind) {
    case 'cable':
      lines.networkCurrent();
      cable(part, request, lines);
      return;
    case 'busbar':
      bar(part, lines);
      return;
    case 'diode':
      diode(part, lines);
      return;
    case 'shunt':
      lines.networkCurrent();
      lines.add({
        name: 'Resistance',
        formula: 'R = U_rated / I_rated',
        values: `${figure(part.ratingMv / 1000, 'V')} / ${figure(part.ratingA, 'A')}`,
        value: part.ratingMv / 1000 / part.ratingA,
        unit: 'ohm',
        origins: lines.origin('ratingMv', 'ratingA'),
      });
      dropAndHeat(lines, part.ratingMv / 1000 / part.ratingA);
      return;
    case 'bond':
      lines.networkCurrent();
      dropAndHeat(lines, bondOhm(part, request, lines));
      return;
    default:
      device(part, lines);
  }
}

function device(part: Extract<WiringPart, { kind: 'fuse' | 'breaker' | 'switch' | 'joint' }>, lines: Lines): void {
  if (isOpen(part)) {
    lines.add({ name: 'Current', formula: 'I = 0', values: 'open', value: 0, unit: 'A', answers: 'currentA' });
    return;
  }
  lines.networkCurrent();
  const ohm = part.resistanceOhm ?? 0;
  const given = part.resistanceOhm !== undefined;
  lines.add({
    name: 'Resistance',
    formula: 'R',
    values: given ? 'as given' : 'not given, taken as none',
    value: ohm,
    unit: 'ohm',
    origins: lines.origin('resistanceOhm'),
  });
  dropAndHeat(lines, ohm);
}

/** V = I R and P = I² R, the last two lines of everything that is a resistance. */
function dropAndHeat(lines: Lines, ohm: number | null, origins: readonly FigureOrigin[] = []): void {
  const { currentA } = lines.answer;
  const sizeA = currentA === null ? null : Math.abs(currentA);
  const dropV = product(sizeA, ohm);
  lines.add({
    name: 'Drop',
    formula: 'V = I · R',
    values: `${figure(sizeA, 'A')} × ${figure(ohm, 'ohm')}`,
    value: dropV,
    unit: 'V',
    answers: 'dropV',
    origins,
  });
  lines.add({
    name: 'Heat',
    formula: 'P = I² · R',
    values: `(${figure(sizeA, 'A')})² × ${figure(ohm, 'ohm')}`,
    value: product(dropV, sizeA),
    unit: 'W',
    answers: 'powerW',
    origins,
  });
}

function cable(part: CablePart, request: PartRequest, lines: Lines): void {
  const { job, operatingCase, tables } = request;
  const { practice } = job;
  const caseDegC = ambientOf(job, operatingCase);
  const detail = `${practice} ${caseDegC}`;
  const model = conductorModel(part, { practice, ambientDegC: caseDegC, tables, detail });
  const endOhm = part.endOhm / part.inParallel;
  const ends = `${figure(part.endOhm, 'ohm')} / ${part.inParallel}`;
  if (part.resistanceOhm !== undefined) {
    lines.add({
      name: 'Resistance with its ends',
      formula: 'R = R_measured + R_ends / n',
      values: `${figure(part.resistanceOhm, 'ohm')} + ${ends}`,
      value: part.resistanceOhm + endOhm,
      unit: 'ohm',
      origins: lines.origin('resistanceOhm', 'endOhm', 'inParallel'),
    });
    dropAndHeat(lines, part.resistanceOhm + endOhm);
    return;
  }
  const metal = conductorResistance(part, { practice, tables: tables.conductors });
  if ('missing' in metal) return;
  lines.add({
    name: 'Resistance of the metal at 20 °C',
    formula: 'R20 = r · L / n, r from the table',
    values: `${metal.working.slice(0, -1).join('; ')}${metal.working.length > 1 ? '; ' : ''}${figure(perMetre(part, metal.at20Ohm), 'ohm')} a metre × ${figure(part.lengthM, 'm')} / ${part.inParallel}`,
    value: metal.at20Ohm,
    unit: 'ohm',
    origins: lines.origin('size', 'lengthM', 'inParallel', 'metal', 'stranding'),
    basis: metal.basis,
  });
  const degC = temperature(part, { request, caseDegC, kelvinPerA2: model.temperature?.kelvinPerA2 ?? 0 }, lines);
  const ohm = degC === null ? null : metal.at20Ohm * (1 + metal.alphaPerK * (degC - 20)) + endOhm;
  lines.add({
    name: 'Resistance at that temperature, with its ends',
    formula: 'R = R20 · (1 + α · (T − 20 °C)) + R_ends / n',
    values: `${figure(metal.at20Ohm, 'ohm')} × (1 + ${figure(metal.alphaPerK, '1/K')} × (${degreesText(degC)} − 20 °C)) + ${ends}`,
    value: ohm,
    unit: 'ohm',
    origins: lines.origin('endOhm', 'inParallel'),
    basis: metal.basis,
  });
  dropAndHeat(lines, ohm);
}

/** Ohms of one metre; nothing to divide by where the length is nought. */
function perMetre({ lengthM, inParallel }: CablePart, at20Ohm: number): number {
  return lengthM > 0 ? (at20Ohm * inParallel) / lengthM : 0;
}

/** Writes how warm the conductor is; null where its current is not determined. */
function temperature(
  part: CablePart,
  {
    request,
    caseDegC,
    kelvinPerA2,
  }: { readonly request: PartRequest; readonly caseDegC: number; readonly kelvinPerA2: number },
  lines: Lines,
): number | null {
  const name = 'Temperature of the conductor';
  const ambientDegC = part.ambientDegC ?? caseDegC;
  if (part.conductorDegC !== undefined || kelvinPerA2 === 0) {
    const value = part.conductorDegC ?? ambientDegC;
    const values = part.conductorDegC === undefined ? 'the air around it, own warming left out' : 'as given';
    const origins = lines.origin(part.conductorDegC === undefined ? 'ambientDegC' : 'conductorDegC');
    lines.add({ name, formula: 'T', values, value, unit: 'degC', answers: 'conductorDegC', origins });
    return value;
  }
  const { job, tables } = request;
  const law = heatingLaw(part, { practice: job.practice, ambientDegC, tables: tables.conductors });
  if ('missing' in law) return null;
  const { currentA } = lines.answer;
  const value = currentA === null ? null : law.ambientDegC + law.riseAtRatedK * (currentA / law.ampacityA) ** 2;
  lines.add({
    name,
    formula: 'T = T_air + ΔT_rated · (I / I_rated)²',
    values: `${degreesText(law.ambientDegC)} + ${figure(law.riseAtRatedK, 'K')} × (${figure(currentA === null ? null : Math.abs(currentA), 'A')} / ${figure(law.ampacityA, 'A')})²`,
    value,
    unit: 'degC',
    answers: 'conductorDegC',
    origins: lines.origin('ambientDegC', 'insulationDegC', 'run', 'loadedConductors'),
    basis: {
      source: 'SRC-SQUARE-ROOT-LAW',
      text: 'rise with the square of the current, from the ampacity table of the practice',
      status: law.status,
    },
  });
  return value;
}

/** More decimals than a temperature is shown with, since it is a step on the way here. */
function degreesText(degC: number | null): string {
  return degC === null ? '?' : `${figure(degC, '1')} °C`;
}

function bondOhm(part: BondPart, { job, operatingCase, tables }: PartRequest, lines: Lines): number {
  const { size, lengthM } = part;
  const found =
    size === undefined || lengthM === undefined
      ? undefined
      : conductorResistance(
          { lengthM, size, inParallel: 1, metal: undefined, stranding: undefined },
          { practice: job.practice, tables: tables.conductors },
        );
  const degC = ambientOf(job, operatingCase);
  const known = found !== undefined && !('missing' in found) ? found : undefined;
  const ohm = known === undefined ? 0 : known.at20Ohm * (1 + known.alphaPerK * (degC - 20));
  lines.add({
    name: 'Resistance',
    formula: known === undefined ? 'R' : 'R = R20 · (1 + α · (T − 20 °C))',
    values:
      known === undefined
        ? 'no size and length given, taken as none'
        : `${figure(known.at20Ohm, 'ohm')} × (1 + ${figure(known.alphaPerK, '1/K')} × (${degreesText(degC)} − 20 °C))`,
    value: ohm,
    unit: 'ohm',
    origins: lines.origin('size', 'lengthM'),
    ...(known === undefined ? {} : { basis: known.basis }),
  });
  return ohm;
}

function diode(part: DiodePart, lines: Lines): void {
  const { state, currentA } = lines.answer;
  if (state === 'blocking') {
    const values = 'blocking: its volts are below its forward volts';
    lines.add({ name: 'Current', formula: 'I = 0', values, value: 0, unit: 'A', answers: 'currentA' });
    return;
  }
  lines.networkCurrent();
  const forwardV = part.forwardV ?? DEFAULT_DIODE_V;
  const slopeOhm = part.slopeOhm ?? 0;
  const slopeV = product(currentA, slopeOhm);
  const value = slopeV === null ? null : forwardV + slopeV;
  lines.add({
    name: 'Volts across it',
    formula: 'V = V_forward + I · R_slope',
    values: `${figure(forwardV, 'V')} + ${figure(currentA, 'A')} × ${figure(slopeOhm, 'ohm')}`,
    value: value === null ? null : Math.abs(value),
    unit: 'V',
    answers: 'dropV',
    origins: lines.origin('forwardV', 'slopeOhm'),
  });
  lines.add({
    name: 'Heat',
    formula: 'P = V · I',
    values: `${figure(value, 'V')} × ${figure(currentA, 'A')}`,
    value: product(value, currentA),
    unit: 'W',
    answers: 'powerW',
  });
}

function bar(part: BusbarPart, lines: Lines): void {
  const segments = lines.answer.segmentsA ?? [];
  const all = segments.every((a) => a !== null);
  const known = segments.filter((a) => a !== null);
  const fullest = known.reduce((most, a) => Math.max(most, Math.abs(a)), 0);
  const { segmentOhm } = part;
  const inBrackets = segments.map((a) => signed(a, 'A'));
  lines.add({
    name: 'Current in the fullest segment',
    formula: 'I = largest |I_k|, each from ΣI = 0 at its taps',
    values: inBrackets.join(', '),
    value: all ? fullest : null,
    unit: 'A',
    answers: 'currentA',
  });
  lines.add({
    name: 'Drop from end to end',
    formula: 'V = |ΣI_k| · R_segment',
    values: `|${inBrackets.join(' + ')}| × ${figure(segmentOhm, 'ohm')}`,
    value: product(Math.abs(known.reduce((sum, a) => sum + a, 0)), segmentOhm),
    unit: 'V',
    answers: 'dropV',
    origins: lines.origin('segmentOhm'),
  });
  lines.add({
    name: 'Heat',
    formula: 'P = ΣI_k² · R_segment',
    values: `(${segments.map((a) => `(${figure(a, 'A')})²`).join(' + ')}) × ${figure(segmentOhm, 'ohm')}`,
    value: product(
      known.reduce((sum, a) => sum + a * a, 0),
      segmentOhm,
    ),
    unit: 'W',
    answers: 'powerW',
    origins: lines.origin('segmentOhm'),
  });
}
