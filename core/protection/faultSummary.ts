/** Faults of several cases as one list: the highest and the lowest over all of them. */
import type { CheckedJob } from '../job/job.ts';
import type { JunctionId, PartId } from '../job/part.ts';
import { type Device, isDevice, withoutPairs } from '../network/wiring.ts';
import type { Tables } from '../tables/tables.ts';
import type { Clearing, DeviceFault, FaultCurrent, FaultStudy, JunctionFault } from './answer.ts';
import { clearingOf } from './clearing.ts';
import { deviceBandOf } from './deviceBand.ts';

export interface InCase {
  readonly case: string;
  readonly current: FaultCurrent;
}

export interface JunctionFaultRow {
  readonly junction: JunctionId;
  readonly to: JunctionId;
  readonly highest: InCase | null;
  readonly lowest: InCase | null;
  /** It lies in the same pole as `to`: what flows between the two is no fault but what the working current leaves there. */
  readonly samePole: boolean;
}

/** Below a quarter of the most volts of any junction one counts as of the same pole as `to`. */
const POLE_SHARE = 0.25;

/** A fuse or breaker of the job; `fault` is null where no source reaches it, or it is open in every case. */
export interface DeviceFaultRow {
  readonly id: PartId;
  readonly interruptA: number | null;
  /** Can it interrupt the highest current through it? Null where one of the two is not known. */
  readonly ok: boolean | null;
  readonly fault: DeviceFault | null;
  /** How it answers the lowest current that must make it open; null where its band is not known, or no such fault is. */
  readonly clearing: Clearing | null;
}

export interface FaultSummary {
  /** Between poles. */
  readonly poles: readonly JunctionFaultRow[];
  readonly earth: readonly JunctionFaultRow[];
  readonly devices: readonly DeviceFaultRow[];
}

/** The highest and the lowest of each junction and device over the studies of several cases (by one method). */
export function faultSummary(request: {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly studies: readonly FaultStudy[];
}): FaultSummary {
  const { job, tables, studies } = request;
  const devices = withoutPairs(job.parts).filter(isDevice);
  return { ...junctionRows(studies), devices: devices.map((device) => deviceRow(device, studies, tables)) };
}

function junctionRows(studies: readonly FaultStudy[]) {
  const rows = new Map<string, JunctionFaultRow>();
  for (const study of studies) {
    for (const fault of study.junctions) {
      const key = JSON.stringify([fault.junction, fault.to]);
      rows.set(key, widened(rows.get(key), fault, study.case));
    }
  }
  const all = withPoles([...rows.values()]);
  // A junction has one row between poles, its first, and perhaps one to earth.
  const seen = new Set<string>();
  const poles = all.filter(({ junction }) => !seen.has(junction) && seen.add(junction));
  return { poles, earth: all.filter((row) => !poles.includes(row)) };
}

function withPoles(rows: readonly JunctionFaultRow[]): readonly JunctionFaultRow[] {
  const most = new Map<JunctionId, number>();
  const volts = ({ highest }: JunctionFaultRow) => Math.abs(highest?.current.openV ?? 0);
  for (const row of rows) most.set(row.to, Math.max(most.get(row.to) ?? 0, volts(row)));
  return rows.map((row) => ({ ...row, samePole: volts(row) <= POLE_SHARE * most.get(row.to)! }));
}

function widened(known: JunctionFaultRow | undefined, fault: JunctionFault, id: string): JunctionFaultRow {
  const inCase = (current: FaultCurrent | null) => (current === null ? null : { case: id, current });
  const [highest, lowest] = [inCase(fault.highest), inCase(fault.lowest)];
  if (known === undefined) return { junction: fault.junction, to: fault.to, highest, lowest, samePole: false };
  const more = (highest?.current.firstA ?? -1) > (known.highest?.current.firstA ?? -1);
  const less = lowest !== null && (known.lowest === null || lowest.current.settledA < known.lowest.current.settledA);
  return { ...known, highest: more ? highest : known.highest, lowest: less ? lowest : known.lowest };
}

function deviceRow(device: Device, studies: readonly FaultStudy[], tables: Tables): DeviceFaultRow {
  const faults = studies.flatMap(({ devices }) => devices.filter((each) => each.device === device.id));
  const fault = faults.reduce<DeviceFault | null>(wider, null);
  const interruptA = device.interruptA ?? null;
  const ok = fault === null || interruptA === null ? null : interruptA >= fault.highestA;
  const band = deviceBandOf(device, tables);
  const lowestA = fault?.lowestA ?? null;
  const clearing = 'missing' in band || lowestA === null ? null : clearingOf({ band, currentA: lowestA });
  return { id: device.id, interruptA, ok, fault, clearing };
}

function wider(known: DeviceFault | null, fault: DeviceFault): DeviceFault {
  if (known === null) return fault;
  const most = fault.highestA > known.highestA ? fault : known;
  const isLess = fault.lowestA !== null && (known.lowestA === null || fault.lowestA < known.lowestA);
  const { lowestA, lowestAt, lowestTo } = isLess ? fault : known;
  return { ...most, lowestA, lowestAt, lowestTo, fromBothSides: known.fromBothSides || fault.fromBothSides };
}
