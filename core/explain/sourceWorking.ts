/** The working of strings, arrays and chargers. */
import { factsOf, stringSource } from '../battery/stringSource.ts';
import { partsInCase } from '../job/job.ts';
import type { ArrayPart, ChargerPart, StringPart } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import { closedNets, withoutPairs } from '../network/wiring.ts';
import { arrayCurve, currentAt, maximumPower } from '../solar/arrayCurve.ts';
import { figure, type Lines, product, signed } from './lines.ts';
import { lowerHalfA } from './walkPorts.ts';
import type { FigureOrigin, PartRequest } from './workingLine.ts';

/** Sun where a case does not say: full, as on the label; as the solve takes it. */
const FULL_SUN_W_PER_M2 = 1000;

export function stringWorking(part: StringPart, request: PartRequest, lines: Lines): void {
  const { job, operatingCase, point, tables } = request;
  const ambientDegC = ambientOf(job, operatingCase);
  const context = { model: point.model, ambientDegC, tables: tables.chemistry };
  const { emfV, resistanceOhm } = stringSource(part, context);
  const { cells, temperatureDegC } = factsOf(part, context);
  const origin = (field: string, { origin: from, low, high }: typeof emfV): readonly FigureOrigin[] => [
    { field, origin: from, range: [low, high] },
  ];
  lines.add({
    name: 'Rest volts',
    formula: part.emfV === undefined ? 'E = cells · E_cell(charge, temperature)' : 'E',
    values:
      part.emfV === undefined
        ? `${cells} × ${figure(emfV.value / cells, 'V')} at ${figure(part.stateOfCharge * 100, '1')} % and ${figure(temperatureDegC, '1')} °C`
        : 'as given',
    value: emfV.value,
    unit: 'V',
    origins: origin('emfV', emfV),
    basis: emfV.basis,
  });
  const ohm = resistanceOhm.value + part.linkOhm;
  lines.add({
    name: `Resistance, links included (${point.model === 'slow' ? 'over minutes' : 'in the first second'})`,
    formula: 'R = R_string + R_links',
    values: `${figure(resistanceOhm.value, 'ohm')} + ${figure(part.linkOhm, 'ohm')}`,
    value: ohm,
    unit: 'ohm',
    origins: [...origin('resistanceOhm', resistanceOhm), ...lines.origin('linkOhm')],
    basis: resistanceOhm.basis,
  });
  lines.networkCurrent('Current out of the plus pole');
  terminals(part, { emfV: emfV.value, ohm, request }, lines);
  rateAndShare(part, request, lines);
  power(part, { emfV: emfV.value, ohm, request }, lines);
}

interface Inside {
  readonly emfV: number;
  readonly ohm: number;
  readonly request: PartRequest;
}

function terminals(part: StringPart, { emfV, ohm, request }: Inside, lines: Lines): void {
  const { currentA } = lines.answer;
  const plain = part.midpoint === undefined;
  const lowerA = lowerHalfA(part, request.point);
  const sagV = plain ? product(currentA, ohm) : halves(product(currentA, ohm / 2), product(lowerA, ohm / 2));
  lines.add({
    name: 'Volts at the terminals',
    formula: plain ? 'V = E − I · R' : 'V = E − (I_upper + I_lower) · R / 2',
    values: plain
      ? `${figure(emfV, 'V')} − ${signed(currentA, 'A')} × ${figure(ohm, 'ohm')}`
      : `${figure(emfV, 'V')} − (${figure(currentA, 'A')} + ${signed(lowerA, 'A')}) × ${figure(ohm, 'ohm')} / 2`,
    value: sagV === null ? null : emfV - sagV,
    unit: 'V',
    answers: 'voltageV',
  });
}

function halves(upper: number | null, lower: number | null): number | null {
  return upper === null || lower === null ? null : upper + lower;
}

function power(part: StringPart, { emfV, ohm, request }: Inside, lines: Lines): void {
  const { currentA, voltageV } = lines.answer;
  const name =
    currentA !== null && currentA < 0 ? 'Power delivered (negative: it is being charged)' : 'Power delivered';
  if (part.midpoint === undefined) {
    lines.add({
      name,
      formula: 'P = V · I',
      values: `${figure(voltageV, 'V')} × ${signed(currentA, 'A')}`,
      value: product(voltageV, currentA),
      unit: 'W',
      answers: 'powerW',
    });
    return;
  }
  const half = (a: number | null) => product(a, a === null ? null : emfV / 2 - (a * ohm) / 2);
  const lowerA = lowerHalfA(part, request.point);
  lines.add({
    name,
    formula: 'P = I_upper · (E − I_upper · R) / 2 + I_lower · (E − I_lower · R) / 2',
    values: [currentA, lowerA]
      .map((a) => `${signed(a, 'A')} × (${figure(emfV, 'V')} − ${signed(a, 'A')} × ${figure(ohm, 'ohm')}) / 2`)
      .join(' + '),
    value: halves(half(currentA), half(lowerA)),
    unit: 'W',
    answers: 'powerW',
  });
}

/** How hard the string works for its size, and beside its neighbours. */
function rateAndShare(part: StringPart, { job, operatingCase, point }: PartRequest, lines: Lines): void {
  const { currentA } = lines.answer;
  if (currentA === null) return;
  lines.add({
    name: 'Rate',
    formula: '|I| / C',
    values: `${figure(Math.abs(currentA), 'A')} / ${figure(part.capacityAh, 'Ah')}`,
    value: Math.abs(currentA) / part.capacityAh,
    unit: '1/h',
    origins: lines.origin('capacityAh'),
  });
  const parts = withoutPairs(partsInCase(job, operatingCase));
  const nets = closedNets(parts);
  const beside = parts.filter(
    (other) => other.kind === 'string' && nets.same(other.plus, part.plus) && nets.same(other.minus, part.minus),
  );
  const currents = beside.map(({ id }) => point.parts.get(id)?.currentA ?? null);
  const totalA = currents.reduce<number>((sum, a) => sum + (a ?? 0), 0);
  if (beside.length < 2 || totalA === 0 || currents.includes(null)) return;
  lines.add({
    name: `Share of the ${beside.length} strings side by side`,
    formula: 'I / ΣI',
    values: `${figure(currentA, 'A')} / (${currents.map((a) => signed(a, 'A')).join(' + ')})`,
    value: currentA / totalA,
    unit: '1',
  });
}

export function arrayWorking(part: ArrayPart, { job, operatingCase }: PartRequest, lines: Lines): void {
  const irradianceWPerM2 = operatingCase.irradianceWPerM2 ?? FULL_SUN_W_PER_M2;
  const label = lines.origin('vocV', 'iscA', 'vmpV', 'impA', 'modulesInSeries', 'stringsInParallel');
  if (irradianceWPerM2 <= 0) {
    lines.add({ name: 'Current', formula: 'I = 0', values: 'dark', value: 0, unit: 'A', answers: 'currentA' });
    return;
  }
  const curve = arrayCurve(part, { irradianceWPerM2, ambientDegC: ambientOf(job, operatingCase) });
  const peak = maximumPower(curve);
  const basis = {
    source: 'SRC-SOLAR-FOUR-PARAMETER',
    text: 'single-diode curve through the label, moved to sun and temperature',
    status: 'from-memory',
  } as const;
  lines.add({
    name: 'The most it could give',
    formula: 'P = V · I at the knee of its curve',
    values: `${figure(peak.voltageV, 'V')} × ${figure(peak.currentA, 'A')} in ${figure(irradianceWPerM2, 'W/m2')}, cells at ${figure(curve.cellDegC, '1')} °C`,
    value: peak.powerW,
    unit: 'W',
    origins: label,
    basis,
  });
  lines.networkVolts([part.plus, part.minus]);
  const { voltageV } = lines.answer;
  const currentA = voltageV === null ? null : currentAt(curve, voltageV).currentA;
  lines.add({
    name: 'Current',
    formula: 'I of its curve at V',
    values: `at ${figure(voltageV, 'V')}`,
    value: currentA,
    unit: 'A',
    answers: 'currentA',
    origins: label,
    basis,
  });
  delivered(lines, voltageV, currentA);
}

export function chargerWorking(part: ChargerPart, lines: Lines): void {
  const { state } = lines.answer;
  if (!part.on || state === 'idle' || state === 'off') {
    const values = part.on ? 'what is joined to it stands above its set-point' : 'off';
    lines.add({ name: 'Current', formula: 'I = 0', values, value: 0, unit: 'A', answers: 'currentA' });
    return;
  }
  heldOrLimited(part, { volts: 'voltageV', amps: 'currentA', ends: [part.plus, part.minus] }, lines);
  delivered(lines, lines.answer.voltageV, lines.answer.currentA);
}

/** A source that holds its set-point, or gives its limit where that is not enough to reach it. */
export function heldOrLimited(
  { outputA, setpointV, field }: { readonly outputA: number; readonly setpointV: number; readonly field?: string },
  at: {
    readonly volts: 'voltageV' | 'outputV';
    readonly amps: 'currentA' | 'outputA';
    readonly ends: readonly [plus: string, minus: string];
  },
  lines: Lines,
): void {
  if (lines.answer.state === 'voltage-held') {
    const origins = lines.origin(field ?? 'setpointV');
    const values = `held at its set-point, since that takes less than its ${figure(outputA, 'A')}`;
    lines.add({ name: 'Volts', formula: 'V = V_set', values, value: setpointV, unit: 'V', answers: at.volts, origins });
    lines.networkCurrent('Current', at.amps);
    return;
  }
  const origins = lines.origin('outputA');
  const values = `at its limit: more would be needed for its ${figure(setpointV, 'V')}`;
  lines.add({ name: 'Current', formula: 'I = I_limit', values, value: outputA, unit: 'A', answers: at.amps, origins });
  lines.networkVolts(at.ends, at.volts);
}

function delivered(lines: Lines, voltageV: number | null, currentA: number | null): void {
  lines.add({
    name: 'Power delivered',
    formula: 'P = V · I',
    values: `${figure(voltageV, 'V')} × ${signed(currentA, 'A')}`,
    value: product(voltageV, currentA),
    unit: 'W',
    answers: 'powerW',
  });
}
