/** What a solved case says of one bank: how it shares, what it loses, and its volts where it is tapped. */
import { stringSource } from '../../battery/stringSource.ts';
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import type { JunctionId, PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { ambientOf } from '../../network/circuit.ts';
import type { SinglePart } from '../../network/wiring.ts';
import { isWiring, joined, polesOf } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { BankMeasure, BankTerminals } from '../answer.ts';
import { LEAST_RATE_PER_H } from '../sharing/bankCurrents.ts';
import type { Pole, Row } from './row.ts';

export interface SolvedBank {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly row: Row;
  /** As they stand in the case, pairs as their two cables. */
  readonly parts: readonly SinglePart[];
  readonly point: OperatingPoint;
}

/** Current of each branch in the order of the row, discharge positive; `undefined` where the case has no answer. */
export function branchCurrents({ row, point }: Pick<SolvedBank, 'row' | 'point'>): readonly number[] | undefined {
  if (point.outcome !== 'solved') return undefined;
  const currents = row.branches.map(({ branch }) => point.parts.get(branch.strings[0]!.id)?.currentA ?? undefined);
  return currents.every((current) => current !== undefined) ? currents : undefined;
}

/** share / fair share - 1 of each branch. */
export function deviationsOf(row: Row, currentsA: readonly number[]): readonly number[] {
  const totalA = sum(currentsA);
  return currentsA.map((currentA, k) => {
    const fairShare = row.branches[k]!.branch.capacityAh / row.bank.capacityAh;
    return currentA / totalA / fairShare - 1;
  });
}

/** The bank carries so little that shares of it mean nothing. */
export function isIdle(row: Row, totalA: number): boolean {
  return Math.abs(totalA) < LEAST_RATE_PER_H * row.bank.capacityAh;
}

/** `undefined` where the case has no answer or the bank carries next to nothing. */
export function measureBank(solved: SolvedBank): BankMeasure | undefined {
  const { row } = solved;
  const currentsA = branchCurrents(solved);
  if (currentsA === undefined || isIdle(row, sum(currentsA))) return undefined;
  const deviations = deviationsOf(row, currentsA);
  const worst = indexOfLargest(deviations);
  const terminals = terminalsOf(solved);
  return {
    worst: row.branches[worst]!.branch.strings[0]!.id,
    spread: Math.abs(deviations[worst]!),
    worstA: currentsA[worst]!,
    bankV: voltsBetween(solved.point, terminals),
    lostW: lostIn(solved, currentsA),
    strings: row.branches.flatMap(({ branch }, k) =>
      branch.strings.map(({ id }) => ({
        id,
        currentA: currentsA[k]!,
        fairA: (sum(currentsA) * branch.capacityAh) / row.bank.capacityAh,
        deviation: deviations[k]!,
      })),
    ),
  };
}

function voltsBetween({ junctions }: OperatingPoint, { plus, minus }: BankTerminals): number {
  return (junctions.get(plus) ?? 0) - (junctions.get(minus) ?? 0);
}

/** In strings and in the wiring of the bank, W. */
function lostIn({ job, tables, operatingCase, row, point }: SolvedBank, currentsA: readonly number[]): number {
  const context = { model: point.model, ambientDegC: ambientOf(job, operatingCase), tables: tables.chemistry };
  const inStrings = row.branches.map(
    ({ branch }, k) =>
      sum(branch.strings.map((part) => stringSource(part, context).resistanceOhm.value + part.linkOhm)) *
      currentsA[k]! ** 2,
  );
  return sum(inStrings) + sum(row.wiring.map(({ id }) => point.parts.get(id)?.powerW ?? 0));
}

/** Where most of the current leaves the bank on each pole. */
export function terminalsOf({ row, parts, point }: Pick<SolvedBank, 'row' | 'parts' | 'point'>): BankTerminals {
  const ours = new Set<PartId>([...row.wiring, ...row.bank.strings].map(({ id }) => id));
  const others = parts.filter((part) => !ours.has(part.id));
  return { plus: tapOf('plus', row, others, point), minus: tapOf('minus', row, others, point) };
}

function tapOf(pole: Pole, row: Row, others: readonly SinglePart[], point: OperatingPoint): JunctionId {
  const through = new Map<JunctionId, number>();
  for (const part of others) {
    const answer = point.parts.get(part.id);
    const currentA = Math.max(...[answer?.currentA, answer?.inputA, answer?.outputA].map((one) => Math.abs(one ?? 0)));
    for (const junction of touched(part)) {
      if (row.junctions[pole].has(junction)) through.set(junction, (through.get(junction) ?? 0) + currentA);
    }
  }
  let best: JunctionId | undefined;
  for (const [junction, currentA] of through) {
    if (best === undefined || currentA > through.get(best)!) best = junction;
  }
  return best ?? row.branches[0]!.own[pole].end;
}

function touched(part: SinglePart): readonly JunctionId[] {
  return isWiring(part) ? joined(part) : polesOf(part).flatMap(({ plus, minus }) => [plus, minus]);
}

/** Of the cables in the wiring of the bank; null where it has none of stated length. */
export function cableMetres({ wiring }: Row): number | null {
  const cables = wiring.filter((part) => part.kind === 'cable');
  return cables.length === 0 ? null : sum(cables.map(({ lengthM, inParallel }) => lengthM * inParallel));
}

export function indexOfLargest(values: readonly number[]): number {
  let best = 0;
  values.forEach((value, k) => {
    if (Math.abs(value) > Math.abs(values[best]!)) best = k;
  });
  return best;
}

export function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
