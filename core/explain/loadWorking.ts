/** The working of loads, inverters, controllers and converters. */
import type { ControllerPart, ConverterPart, InverterPart, LoadPart } from '../job/part.ts';
import { inverterDcPowerW } from '../network/inverter.ts';
import { figure, type Lines, product } from './lines.ts';
import { heldOrLimited } from './sourceWorking.ts';
import type { FigureOrigin, PartRequest } from './workingLine.ts';

/** Efficiencies where the label says nothing; common practice, as the solve takes them. */
const DEFAULT_CONVERTER_EFFICIENCY = 0.9;
const DEFAULT_TRACKER_EFFICIENCY = 0.95;

const WHY_NOTHING: Readonly<Record<string, string>> = {
  off: 'off',
  unfed: 'no closed path joins both its poles to a source',
  'dropped-out': 'dropped out: its volts fall below the least that it runs on',
};

/** What takes nothing has one line. */
function takesNothing(lines: Lines): boolean {
  const why = WHY_NOTHING[lines.answer.state ?? ''];
  if (why === undefined) return false;
  lines.add({ name: 'Current', formula: 'I = 0', values: why, value: 0, unit: 'A', answers: 'currentA' });
  return true;
}

export function loadWorking(part: LoadPart, { operatingCase }: PartRequest, lines: Lines): void {
  if (takesNothing(lines)) return;
  lines.networkVolts([part.plus, part.minus]);
  const starting = operatingCase.surge === part.id ? part.surgeW : undefined;
  const powerW = starting ?? part.powerW;
  if (powerW !== undefined) {
    drawsPower(lines, powerW, lines.origin(starting === undefined ? 'powerW' : 'surgeW'));
    return;
  }
  const { voltageV } = lines.answer;
  let currentA = part.currentA ?? null;
  if (part.resistanceOhm !== undefined) {
    currentA = voltageV === null ? null : voltageV / part.resistanceOhm;
    lines.add({
      name: 'Current',
      formula: 'I = V / R',
      values: `${figure(voltageV, 'V')} / ${figure(part.resistanceOhm, 'ohm')}`,
      value: currentA,
      unit: 'A',
      answers: 'currentA',
      origins: lines.origin('resistanceOhm'),
    });
  } else {
    const origins = lines.origin('currentA');
    lines.add({
      name: 'Current',
      formula: 'I',
      values: 'as given',
      value: currentA,
      unit: 'A',
      answers: 'currentA',
      origins,
    });
  }
  lines.add({
    name: 'Power taken',
    formula: 'P = V · I',
    values: `${figure(voltageV, 'V')} × ${figure(currentA, 'A')}`,
    value: product(voltageV, currentA),
    unit: 'W',
    answers: 'powerW',
  });
}

/** A load that takes the same power at any volts draws the more amperes, the fewer volts it gets. */
function drawsPower(lines: Lines, powerW: number, origins: readonly FigureOrigin[]): void {
  const { voltageV } = lines.answer;
  lines.add({
    name: 'Current',
    formula: 'I = P / V',
    values: `${figure(powerW, 'W')} / ${figure(voltageV, 'V')}`,
    value: powerW === 0 ? 0 : voltageV === null ? null : powerW / voltageV,
    unit: 'A',
    answers: 'currentA',
    origins,
  });
  lines.add({ name: 'Power taken', formula: 'P', values: 'set', value: powerW, unit: 'W', answers: 'powerW', origins });
}

export function inverterWorking(part: InverterPart, { operatingCase }: PartRequest, lines: Lines): void {
  if (takesNothing(lines)) return;
  const starting = operatingCase.surge === part.id ? part.surgeW : undefined;
  const acW = starting ?? part.acPowerW ?? 0;
  const { powerW, efficiency } = inverterDcPowerW(part, acW);
  const standbyW = part.standbyW ?? 0;
  const source = starting === undefined ? 'acPowerW' : 'surgeW';
  lines.add({
    name: 'Power on the battery side',
    formula: 'P = P_out / η, at least its standby',
    values:
      acW > 0
        ? `${figure(acW, 'W')} / ${figure(efficiency, '1')}, at least ${figure(standbyW, 'W')}`
        : `no output: standby ${figure(standbyW, 'W')}`,
    value: powerW,
    unit: 'W',
    origins: lines.origin(source, 'efficiency', 'standbyW'),
  });
  lines.networkVolts([part.plus, part.minus]);
  drawsPower(lines, powerW, lines.origin(source, 'efficiency'));
}

export function converterWorking(part: ConverterPart, lines: Lines): void {
  const { state, inputA } = lines.answer;
  if (!part.on || inputA === 0) {
    const values = part.on ? 'nothing reaches its input' : 'off';
    lines.add({ name: 'Output current', formula: 'I = 0', values, value: 0, unit: 'A', answers: 'outputA' });
    return;
  }
  if (state === 'off') {
    const values = 'what is joined to its output stands above its volts';
    lines.add({ name: 'Output current', formula: 'I = 0', values, value: 0, unit: 'A', answers: 'outputA' });
  } else {
    const { outputA, outputV: setpointV } = part;
    const ends = [part.to.plus, part.to.minus] as const;
    heldOrLimited({ outputA, setpointV, field: 'outputV' }, { volts: 'outputV', amps: 'outputA', ends }, lines);
  }
  const efficiency = part.efficiency ?? DEFAULT_CONVERTER_EFFICIENCY;
  passedOn({ from: part.from, efficiency, standbyW: part.standbyW ?? 0, idle: state === 'off' }, lines);
}

export function controllerWorking(part: ControllerPart, lines: Lines): void {
  const { state, inputA, outputA } = lines.answer;
  if (state === 'off') {
    const values = 'nothing to pass on, or what is joined to its output stands above its set-point';
    lines.add({ name: 'Output current', formula: 'I = 0', values, value: 0, unit: 'A', answers: 'outputA' });
    return;
  }
  const ends = [part.to.plus, part.to.minus] as const;
  if (state === 'voltage-held' || state === 'current-limited') {
    heldOrLimited(part, { volts: 'outputV', amps: 'outputA', ends }, lines);
  } else {
    lines.networkVolts(ends, 'outputV', 'Output volts');
    lines.networkCurrent('Output current', 'outputA');
  }
  if (part.type === 'mppt') {
    const efficiency = part.efficiency ?? DEFAULT_TRACKER_EFFICIENCY;
    passedOn({ from: part.from, efficiency, standbyW: 0, idle: false }, lines);
    return;
  }
  lines.networkVolts([part.from.plus, part.from.minus], 'inputV', 'Input volts');
  lines.add({
    name: 'Input current',
    formula: 'I_in = I_out',
    values: state === 'direct' ? 'the array is joined straight through' : 'it chops the array current to its need',
    value: outputA ?? null,
    unit: 'A',
    answers: 'inputA',
  });
  loss(
    lines,
    product(lines.answer.inputV ?? null, inputA ?? null),
    product(lines.answer.outputV ?? null, outputA ?? null),
  );
}

/** Output power over efficiency is what the input takes. */
function passedOn(
  at: {
    readonly from: { readonly plus: string; readonly minus: string };
    readonly efficiency: number;
    readonly standbyW: number;
    readonly idle: boolean;
  },
  lines: Lines,
): void {
  const { efficiency, standbyW } = at;
  const { outputV = null, outputA = null, inputV = null } = lines.answer;
  const outW = product(outputV, outputA);
  const inW = outW === null ? null : outW / efficiency + standbyW;
  lines.networkVolts([at.from.plus, at.from.minus], 'inputV', 'Input volts');
  lines.add({
    name: 'Input power',
    formula: standbyW > 0 ? 'P_in = V_out · I_out / η + P_standby' : 'P_in = V_out · I_out / η',
    values: `${figure(outputV, 'V')} × ${figure(outputA, 'A')} / ${figure(efficiency, '1')}${standbyW > 0 ? ` + ${figure(standbyW, 'W')}` : ''}`,
    value: inW,
    unit: 'W',
    origins: lines.origin('efficiency'),
  });
  lines.add({
    name: 'Input current',
    formula: 'I_in = P_in / V_in',
    values: `${figure(inW, 'W')} / ${figure(inputV, 'V')}`,
    value: inW === 0 ? 0 : inW === null || inputV === null ? null : inW / inputV,
    unit: 'A',
    answers: 'inputA',
  });
  loss(lines, inW, outW);
}

function loss(lines: Lines, inW: number | null, outW: number | null): void {
  lines.add({
    name: 'Lost inside',
    formula: 'P = P_in − P_out',
    values: `${figure(inW, 'W')} − ${figure(outW, 'W')}`,
    value: inW === null || outW === null ? null : inW - outW,
    unit: 'W',
    answers: 'powerW',
  });
}
