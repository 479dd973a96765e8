/** All that stands behind one fuse or breaker: its window, its faults, its band beside its neighbours', what its cable stands. */
import { CheckContext } from '../../checks/checkContext.ts';
import { ADIABATIC_S } from '../../checks/clearingRules.ts';
import { drawnFaults } from '../../checks/faultFigures.ts';
import { protectedCablesOf } from '../../checks/protectedCables.ts';
import { nearestAhead } from '../../checks/protectionFigures.ts';
import { type SeriesPair, seriesPairs } from '../../checks/seriesDevices.ts';
import { startsIn } from '../../checks/surgeMeltRules.ts';
import { startedPoint } from '../../checks/surgeRules.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { type Device, isDevice } from '../../network/wiring.ts';
import type { Clearing, DeviceBand, DeviceFault, FaultMethod } from '../../protection/answer.ts';
import { clearingOf } from '../../protection/clearing.ts';
import { deviceBandOf } from '../../protection/deviceBand.ts';
import { faultLevel } from '../../protection/faultLevel.ts';
import { type DeviceFaultRow, type FaultSummary, faultSummary } from '../../protection/faultSummary.ts';
import { type LetThrough, worstLetThrough } from '../../protection/letThrough.ts';
import { type Selectivity, selectivityOf } from '../../protection/selectivity.ts';
import { type Withstand, withstandOf } from '../../protection/withstand.ts';
import type { Tables } from '../../tables/tables.ts';
import { deviceWindow, type FuseWindow } from './fuseWindow.ts';

/** A device in series, nearer the source or nearer the load, and whether the nearer of the two opens alone. */
export interface DeviceBeside {
  readonly device: PartId;
  readonly ratingA: number;
  readonly band: DeviceBand | { readonly missing: string };
  readonly selectivity: Selectivity;
}

/** What flows through a device while something starts. */
export interface SurgePoint {
  readonly part: PartId;
  readonly case: string;
  readonly currentA: number;
  readonly seconds: number;
}

export interface DeviceStudy extends DeviceFaultRow {
  readonly kind: 'fuse' | 'breaker';
  readonly ratingA: number;
  readonly window: FuseWindow | { readonly missing: string };
  readonly band: DeviceBand | { readonly missing: string };
  /** At the highest fault; `clearing` is at the lowest. */
  readonly atHighest: Clearing | null;
  /** The nearest device ahead of it that serves more, and of those behind it the one with the largest rating. */
  readonly upstream: DeviceBeside | null;
  readonly downstream: DeviceBeside | null;
  /** The cable of those that it protects that stands least; null where no size is known. */
  readonly withstand: (Withstand & { readonly cable: PartId }) | null;
  /** The most that it lets through, over all faults that it opens within five seconds. */
  readonly letThrough: LetThrough | null;
  /** Starts that take more through it than its rating. */
  readonly surges: readonly SurgePoint[];
}

export interface ProtectionStudy extends FaultSummary {
  readonly method: FaultMethod;
  readonly devices: readonly DeviceStudy[];
  readonly assumed: readonly string[];
}

export interface ProtectionStudyRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly method: FaultMethod;
  /** Answers at hand, found by the id of their case. */
  readonly points?: readonly OperatingPoint[];
}

/**
 * The study of every fuse and breaker of a job. Faults are those of the drawing as the rules take them: everything closed and on, and
 * what is assumed of a string over its whole range.
 */
export function protectionStudy(request: ProtectionStudyRequest): ProtectionStudy {
  const { job, tables, method, points = [] } = request;
  const context = new CheckContext({ job, tables, points });
  const study = faultLevel(drawnFaults(context, method));
  const summary = faultSummary({ job, tables, studies: [study] });
  const facts: Facts = {
    rows: new Map(summary.devices.map((row) => [row.id, row])),
    pairs: seriesPairs(context),
    surges: surgesOf(context),
  };
  const devices = context.drawn.filter(isDevice).map((device) => deviceStudy(context, device, facts));
  return { ...summary, method, devices, assumed: study.assumed };
}

interface Facts {
  readonly rows: ReadonlyMap<PartId, DeviceFaultRow>;
  readonly pairs: readonly SeriesPair[];
  readonly surges: ReadonlyMap<PartId, readonly SurgePoint[]>;
}

function deviceStudy(context: CheckContext, device: Device, { rows, pairs, surges }: Facts): DeviceStudy {
  const { tables } = context;
  const row = rows.get(device.id)!;
  const band = deviceBandOf(device, tables);
  const beside = (one: Device | null, pair: (other: Device) => SeriesPair): DeviceBeside | null => {
    if (one === null) return null;
    const inSeries = pair(one);
    const faultA = rows.get(inSeries.downstream.id)?.fault?.highestA ?? null;
    const selectivity = selectivityOf({ ...inSeries, faultA }, tables);
    return { device: one.id, ratingA: one.ratingA, band: deviceBandOf(one, tables), selectivity };
  };
  return {
    ...row,
    kind: device.kind,
    ratingA: device.ratingA,
    window: deviceWindow(context, device),
    band,
    atHighest: 'missing' in band || row.fault === null ? null : clearingOf({ band, currentA: row.fault.highestA }),
    upstream: beside(nearestAhead(device, pairs), (upstream) => ({ upstream, downstream: device })),
    downstream: beside(largestBehind(device, pairs), (downstream) => ({ upstream: device, downstream })),
    withstand: leastWithstand(context, device),
    letThrough: letThroughOf(band, row.fault),
    surges: surges.get(device.id) ?? [],
  };
}

function largestBehind(device: Device, pairs: readonly SeriesPair[]): Device | null {
  const behind = pairs.flatMap(({ upstream, downstream }) => (upstream === device ? [downstream] : []));
  return behind.reduce<Device | null>(
    (largest, one) => (largest === null || one.ratingA > largest.ratingA ? one : largest),
    null,
  );
}

function leastWithstand(context: CheckContext, device: Device): DeviceStudy['withstand'] {
  let least: DeviceStudy['withstand'] = null;
  for (const cable of protectedCablesOf(context).of(device)) {
    const withstand = withstandOf(cable, context.tables);
    if ('missing' in withstand || (least !== null && least.k2s2 <= withstand.k2s2)) continue;
    least = { ...withstand, cable: cable.id };
  }
  return least;
}

function letThroughOf(band: DeviceStudy['band'], fault: DeviceFault | null): LetThrough | null {
  if ('missing' in band || fault === null || fault.lowestA === null) return null;
  return worstLetThrough(band, { lowA: fault.lowestA, highA: fault.highestA }, ADIABATIC_S);
}

/** What starts on top of a case, as each device sees it; the worst of each load. */
function surgesOf(context: CheckContext): ReadonlyMap<PartId, readonly SurgePoint[]> {
  const found = new Map<PartId, Map<PartId, SurgePoint>>();
  for (const one of context.cases) {
    for (const start of startsIn(context, one)) {
      const { part } = start;
      if (part.surgeS === undefined) continue;
      const point = startedPoint(context, start);
      if (point.outcome !== 'solved') continue;
      for (const device of context.drawn.filter(isDevice)) {
        const currentA = Math.abs(point.parts.get(device.id)?.currentA ?? 0);
        const known = found.get(device.id) ?? new Map<PartId, SurgePoint>();
        if (currentA <= device.ratingA || currentA <= (known.get(part.id)?.currentA ?? 0)) continue;
        found.set(device.id, known.set(part.id, { part: part.id, case: one.id, currentA, seconds: part.surgeS }));
      }
    }
  }
  return new Map([...found].map(([id, points]) => [id, [...points.values()]]));
}
