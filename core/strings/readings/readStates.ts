/** Readings taken in one state of the system, and what they say of each string. */
import type { CheckedJob, OperatingCase, Reading } from '../../job/job.ts';
import { caseById, partsInCase } from '../../job/job.ts';
import type { JunctionId, PartId, StringPart } from '../../job/part.ts';
import { closedNets, type SinglePart, withoutPairs } from '../../network/wiring.ts';
import { type Bank, type Branch, banksOf } from '../banks.ts';
import { meterError } from './meter.ts';
import { type OwnRun, ownRunOf } from './ownRun.ts';
import type { VoltReading } from './readVolts.ts';
import type { Measured } from './twoLoads.ts';

type CurrentReading = Extract<Reading, { quantity: 'current' }>;

/** One case and `set`; readings that name no case belong together, to the job as drawn. */
export interface ReadState {
  readonly caseId: string | undefined;
  readonly set: Reading['set'];
  readonly operatingCase: OperatingCase;
  readonly parts: readonly SinglePart[];
  readonly banks: readonly Bank[];
  readonly volts: readonly VoltReading[];
  readonly currents: readonly CurrentReading[];
  readonly shunts: ReadonlySet<PartId>;
}

/** A voltage reading between the two sides of a string. */
export interface AcrossString {
  readonly plus: JunctionId;
  readonly minus: JunctionId;
  readonly measured: Measured;
  /** How far from the string's own terminals it was read: 0 at them, 1 within its own leads, 2 and 3 beyond. */
  readonly away: number;
}

export function caseName({ caseId }: ReadState): string {
  return caseId ?? 'as drawn';
}

export function readStates(job: CheckedJob): readonly ReadState[] {
  const groups = new Map<string, Reading[]>();
  for (const reading of job.readings) {
    const key = JSON.stringify([reading.case, reading.set]);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [reading]);
    else group.push(reading);
  }
  return [...groups.values()].map((readings) => stateOf(job, readings));
}

function stateOf(job: CheckedJob, readings: readonly Reading[]): ReadState {
  const { case: caseId, set } = readings[0]!;
  const operatingCase = (caseId === undefined ? soleCase(job) : caseById(job, caseId)) ?? asDrawn;
  const parts = withoutPairs(partsInCase(job, operatingCase));
  return {
    caseId,
    set,
    operatingCase,
    parts,
    banks: banksOf(parts),
    volts: readings.filter((reading) => reading.quantity === 'voltage'),
    currents: readings.filter((reading) => reading.quantity === 'current'),
    shunts: new Set(parts.filter(({ kind }) => kind === 'shunt').map(({ id }) => id)),
  };
}

function soleCase(job: CheckedJob): OperatingCase | undefined {
  return job.cases.length === 1 ? job.cases[0] : undefined;
}

const asDrawn: OperatingCase = {
  id: 'as-drawn',
  label: undefined,
  ambientDegC: undefined,
  irradianceWPerM2: undefined,
  surge: undefined,
  changed: new Map(),
};

/** Nothing that feeds or takes is on, so that the strings have only each other. */
export function isRest({ caseId, operatingCase, parts }: ReadState): boolean {
  if (caseId === 'at-rest') return true;
  return parts.every((part) => {
    if ('on' in part) return !part.on;
    return part.kind !== 'array' || operatingCase.irradianceWPerM2 === 0;
  });
}

export function branchOf({ banks }: ReadState, string: PartId): Branch | undefined {
  return banks.flatMap(({ branches }) => branches).find(({ strings }) => strings.some(({ id }) => id === string));
}

export function runIn({ parts }: ReadState, string: PartId): OwnRun | undefined {
  const now = parts.find((part): part is StringPart => part.kind === 'string' && part.id === string);
  return now === undefined ? undefined : ownRunOf(now, parts);
}

/** Amps of a string, discharge positive; its own reading before that of its wiring, the last where it was read again. */
export function ampsOf(state: ReadState, string: PartId): Measured | undefined {
  const run = runIn(state, string);
  if (run === undefined) return undefined;
  const mine = state.currents.filter(({ part }) => run.carriers.has(part));
  const found = mine.filter(({ part }) => part === string).at(-1) ?? mine.at(-1);
  if (found === undefined) return undefined;
  return { value: found.valueA * run.carriers.get(found.part)!, error: meterError(found, state.shunts) };
}

/** Readings between the two sides of a string's branch, nearest to its own terminals first. */
export function voltsAcross(state: ReadState, string: PartId): readonly AcrossString[] {
  const run = runIn(state, string);
  const branch = branchOf(state, string);
  if (run === undefined || branch === undefined) return [];
  const nets = closedNets(state.parts);
  const found = new Map<string, AcrossString>();
  for (const reading of state.volts) {
    for (const [plus, minus, sign] of [
      [reading.plus, reading.minus, 1],
      [reading.minus, reading.plus, -1],
    ] as const) {
      const own = plus === run.string.plus && minus === run.string.minus;
      if (!own && !(nets.same(plus, branch.plus) && nets.same(minus, branch.minus))) continue;
      const outside = [plus, minus].filter((junction) => !run.junctions.has(junction)).length;
      const measured = { value: sign * reading.valueV, error: meterError(reading, state.shunts) };
      found.set(JSON.stringify([plus, minus]), { plus, minus, measured, away: own ? 0 : 1 + outside });
    }
  }
  const nearest = [...found.values()];
  nearest.sort((a, b) => a.away - b.away);
  return nearest;
}
