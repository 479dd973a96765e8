/** An operating point told in sentences: what the case sets, what came out, or why nothing did. */
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { caseById } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import type { OperatingPoint, PartAnswer } from '../network/answer.ts';
import { amps, percent, plain, scientific, volts, watts } from './figures.ts';
import { fieldWords, join } from './wording.ts';

/** Strings named one by one in a sentence; beyond this they are only counted. */
const STRINGS_TOLD = 4;

/** True where figures may be printed: the case was solved and its sums hold. */
export function hasFigures(point: OperatingPoint): boolean {
  return point.outcome === 'solved' && point.proof.holds;
}

/** The answer of a case in one or two sentences. */
export function answerLine(job: CheckedJob, point: OperatingPoint): string {
  if (point.outcome === 'collapse') return collapseLine(job, point);
  if (point.outcome === 'unsupplied') {
    const reasons = point.remarks.map(({ message }) => sentence(message));
    return ['No source reaches the loads, so there is no operating point.', ...reasons].join(' ');
  }
  if (!point.proof.holds) {
    return `The sums of this case do not close (largest junction remainder ${scientific(point.proof.worstJunctionA)} A), so its figures are withheld.`;
  }
  const told = [stringsLine(job, point), loadsLine(job, point), stoppedLine(job, point), heatLine(point)];
  return told.filter((words) => words !== '').join(' ');
}

function collapseLine(job: CheckedJob, { collapse }: OperatingPoint): string {
  if (collapse === undefined)
    return 'The network cannot deliver what the loads ask for, so there is no operating point.';
  const name = partName(job, collapse.load);
  return `${name} asks for ${watts(collapse.wantedW)} W; the network can deliver ${watts(collapse.largestDeliverableW)} W to it at most, so there is no operating point. ${sentence(collapse.message)}`;
}

function stringsLine(job: CheckedJob, point: OperatingPoint): string {
  const currents = job.parts.flatMap((part) => {
    const currentA = part.kind === 'string' ? point.parts.get(part.id)?.currentA : undefined;
    return currentA === undefined || currentA === null ? [] : [{ id: part.id, currentA }];
  });
  if (currents.length === 0) return '';
  const totalA = currents.reduce((sum, { currentA }) => sum + currentA, 0);
  const isOne = currents.length === 1;
  const verb = totalA < 0 ? (isOne ? 'is charged with' : 'are charged with') : isOne ? 'delivers' : 'deliver';
  const bank = `The ${isOne ? 'battery' : 'battery strings'} ${verb} ${amps(Math.abs(totalA))} A${isOne ? '' : ' together'}`;
  if (isOne || currents.length > STRINGS_TOLD) return `${bank}.`;
  const agree = currents.every(({ currentA }) => currentA >= 0 === totalA >= 0);
  return `${bank} (${currents.map(({ id, currentA }) => `${id} ${amps(agree ? Math.abs(currentA) : currentA)} A`).join(', ')}).`;
}

function loadsLine(job: CheckedJob, point: OperatingPoint): string {
  const fed = job.parts.flatMap((part) => {
    if (part.kind !== 'load' && part.kind !== 'inverter') return [];
    const answer = point.parts.get(part.id);
    if (answer === undefined || answer.voltageV === null || answer.currentA === null || answer.currentA === 0)
      return [];
    return [{ part, voltageV: answer.voltageV }];
  });
  const lowest = fed.reduce<(typeof fed)[number] | undefined>(
    (low, next) => (low === undefined || next.voltageV < low.voltageV ? next : low),
    undefined,
  );
  if (lowest === undefined) return 'No load draws current.';
  const where = `${volts(lowest.voltageV)} V at ${partName(job, lowest.part.id)}`;
  return fed.length === 1 ? `The load has ${where}.` : `Lowest of ${fed.length} loads: ${where}.`;
}

/** Loads that are switched on and get nothing: the answer that matters most to whoever stands before them. */
function stoppedLine(job: CheckedJob, point: OperatingPoint): string {
  const inState = (state: string): readonly string[] =>
    job.parts.filter(({ id }) => point.parts.get(id)?.state === state).map(({ id }) => partName(job, id));
  const dropped = inState('dropped-out');
  const unfed = inState('unfed');
  const told = [
    dropped.length === 0 ? '' : `Dropped out for want of volts: ${join(dropped)}.`,
    unfed.length === 0 ? '' : `Not fed: ${join(unfed)}.`,
  ];
  return told.filter((words) => words !== '').join(' ');
}

function heatLine({ proof }: OperatingPoint): string {
  if (proof.powerInW === 0) return '';
  return `${watts(proof.heatW)} W of ${watts(proof.powerInW)} W (${percent(proof.heatW / proof.powerInW)} %) turns to heat in wiring and batteries.`;
}

/** The proof of balance in one line, as at the foot of the drawing. */
export function balanceLine({ proof }: OperatingPoint): string {
  return `in ${watts(proof.powerInW)} W = out ${watts(proof.powerOutW)} W + heat ${watts(proof.heatW)} W; largest junction remainder ${proof.worstJunctionA.toFixed(3)} A`;
}

/** What a case sets apart from the drawing, e.g. `air −5 °C; F3 open; S2 at 40 % charge`. */
export function conditionsLine(job: CheckedJob, caseId: string): string {
  const operatingCase = caseById(job, caseId);
  if (operatingCase === undefined) return '';
  const told = [...surroundings(operatingCase), ...changes(job, operatingCase)];
  return told.length === 0 ? 'As drawn.' : `${upperFirst(told.join('; '))}.`;
}

function surroundings({ ambientDegC, irradianceWPerM2, surge }: OperatingCase): readonly string[] {
  return [
    ...(ambientDegC === undefined ? [] : [`air ${plain(ambientDegC)} °C`]),
    ...(irradianceWPerM2 === undefined ? [] : [`sun ${plain(irradianceWPerM2)} W/m²`]),
    ...(surge === undefined ? [] : [`${surge} starting up`]),
  ];
}

/** Changes of the same kind are told together: `L1, L2 and L3 off`. */
function changes(job: CheckedJob, { changed }: OperatingCase): readonly string[] {
  const groups = new Map<string, string[]>();
  for (const part of job.parts) {
    const now = changed.get(part.id);
    if (now === undefined) continue;
    for (const words of differences(part, now)) groups.set(words, [...(groups.get(words) ?? []), part.id]);
  }
  return [...groups].map(([words, ids]) => `${join(ids)} ${words}`);
}

const BOOKKEEPING: ReadonlySet<string> = new Set(['id', 'kind', 'given', 'origin', 'range', 'at', 'label', 'note']);

function differences(before: Part, now: Part): readonly string[] {
  return Object.keys(now).flatMap((field) => {
    const value: unknown = Reflect.get(now, field);
    if (BOOKKEEPING.has(field) || JSON.stringify(value) === JSON.stringify(Reflect.get(before, field))) return [];
    if (field === 'on') return [value === true ? 'on' : 'off'];
    if (field === 'state') return [String(value)];
    if (field === 'stateOfCharge') return [`at ${percent(Number(value))} % charge`];
    return [`${fieldWords(field)} ${typeof value === 'number' ? plain(value) : 'changed'}`];
  });
}

/** `L1 (Fridge)`, or the bare id where the part has no label. */
export function partName(job: CheckedJob, id: string): string {
  const part = job.parts.find((candidate) => candidate.id === id || id.startsWith(`${candidate.id}.`));
  return part?.label === undefined || part.label === '' || part.label === id ? id : `${id} (${part.label})`;
}

/** Several parts by name; the two conductors of a run are told as one. */
export function partNames(job: CheckedJob, ids: readonly string[]): string {
  const told = ids.flatMap((id) => {
    const run = id.replace(/\.(?:plus|minus)$/, '');
    const isBoth = run !== id && ids.includes(`${run}.plus`) && ids.includes(`${run}.minus`);
    if (!isBoth) return [partName(job, id)];
    return id.endsWith('.plus') ? [`${partName(job, run)}, both conductors`] : [];
  });
  return told.join(', ');
}

/** The state of a part in plain words; the engine's own words read well, only the hyphens go. */
export function stateText({ state }: PartAnswer): string {
  return state === undefined ? '' : state.replaceAll('-', ' ');
}

export function sentence(text: string): string {
  const trimmed = text.trim();
  if (trimmed === '') return '';
  const first = upperFirst(trimmed);
  return /[.!?]$/.test(first) ? first : `${first}.`;
}
function upperFirst(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
