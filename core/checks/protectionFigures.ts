/** What an inspector asks of the protection of a job: its faults as the rules take them, and what each device and cable makes of them. */
import type { PartId } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { Clearing, DeviceBand, DeviceFault } from '../protection/answer.ts';
import { clearingOf } from '../protection/clearing.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import { faultLevel } from '../protection/faultLevel.ts';
import { faultSummary, type JunctionFaultRow } from '../protection/faultSummary.ts';
import { type LetThrough, worstLetThrough } from '../protection/letThrough.ts';
import { type Selectivity, selectivityOf } from '../protection/selectivity.ts';
import { type Withstand, withstandOf } from '../protection/withstand.ts';
import { CheckContext, type CheckRequest } from './checkContext.ts';
import { ADIABATIC_S } from './clearingRules.ts';
import { drawnFaults } from './faultFigures.ts';
import { protectedCablesOf } from './protectedCables.ts';
import { type SeriesPair, seriesPairs } from './seriesDevices.ts';

export interface DeviceFigures {
  readonly device: Device;
  /** Null where no source reaches it. */
  readonly fault: DeviceFault | null;
  /** The most through it at the first instant by the battery branch of IEC 61660-1. */
  readonly iecHighestA: number | null;
  readonly band: DeviceBand | { readonly missing: string };
  /** How it answers the lowest fault; null where its band or that fault is not known. */
  readonly atLowest: Clearing | null;
  /** The nearest device ahead of it that serves more; null where none is, or others feed it too. */
  readonly upstream: Device | null;
}

/** What one device may let through a cable that it protects. */
export interface CableFigures {
  readonly cable: PartId;
  readonly device: PartId;
  readonly withstand: Withstand;
  /** Over all faults from the lowest to the highest. Null: none of them surely opens the device within `ADIABATIC_S`. */
  readonly letThrough: LetThrough | null;
}

export interface PairFigures extends SeriesPair {
  readonly selectivity: Selectivity;
}

export interface ProtectionFigures {
  /** By plain Thévenin, between poles. */
  readonly poles: readonly JunctionFaultRow[];
  readonly earth: readonly JunctionFaultRow[];
  /** The same with the battery branch of IEC 61660-1. */
  readonly iec: { readonly poles: readonly JunctionFaultRow[]; readonly earth: readonly JunctionFaultRow[] };
  readonly devices: readonly DeviceFigures[];
  /** Each protected cable with the device that leaves it the least to spare. */
  readonly cables: readonly CableFigures[];
  readonly pairs: readonly PairFigures[];
  /** One sentence each, beginning with the field that would settle it. */
  readonly assumed: readonly string[];
}

/** Faults of the drawing, everything closed and on, by both methods; nothing is solved where the answers of all cases are given. */
export function protectionFigures(request: CheckRequest): ProtectionFigures {
  const context = new CheckContext(request);
  const { job, tables } = context;
  const plain = faultLevel(drawnFaults(context, 'plain'));
  const iec = faultLevel(drawnFaults(context, 'iec-61660'));
  const { poles, earth } = faultSummary({ job, tables, studies: [plain] });
  const faults = new Map(plain.devices.map((fault) => [fault.device, fault]));
  const pairs = seriesPairs(context);
  const facts = { faults, pairs, iec: new Map(iec.devices.map((fault) => [fault.device, fault.highestA])) };
  const devices = context.drawn.filter(isDevice).map((device) => deviceFigures(context, device, facts));
  return {
    poles,
    earth,
    iec: faultSummary({ job, tables, studies: [iec] }),
    devices,
    cables: cableFigures(context, devices),
    pairs: pairs.map((pair) => {
      const faultA = faults.get(pair.downstream.id)?.highestA ?? null;
      return { ...pair, selectivity: selectivityOf({ ...pair, faultA }, tables) };
    }),
    assumed: plain.assumed,
  };
}

interface DeviceFacts {
  readonly faults: ReadonlyMap<PartId, DeviceFault>;
  readonly iec: ReadonlyMap<PartId, number>;
  readonly pairs: readonly SeriesPair[];
}

function deviceFigures({ tables }: CheckContext, device: Device, { faults, iec, pairs }: DeviceFacts): DeviceFigures {
  const fault = faults.get(device.id) ?? null;
  const band = deviceBandOf(device, tables);
  const lowestA = fault?.lowestA ?? null;
  const atLowest = 'missing' in band || lowestA === null ? null : clearingOf({ band, currentA: lowestA });
  const iecHighestA = iec.get(device.id) ?? null;
  return { device, fault, iecHighestA, band, atLowest, upstream: nearestAhead(device, pairs) };
}

/** Of those ahead the nearest is the one that has most ahead of itself. */
export function nearestAhead(device: Device, pairs: readonly SeriesPair[]): Device | null {
  const ahead = (of: Device) => pairs.filter(({ downstream }) => downstream === of).map(({ upstream }) => upstream);
  return ahead(device).reduce<Device | null>(
    (nearest, one) => (nearest === null || ahead(one).length > ahead(nearest).length ? one : nearest),
    null,
  );
}

function cableFigures(context: CheckContext, devices: readonly DeviceFigures[]): readonly CableFigures[] {
  const found = new Map<PartId, CableFigures>();
  for (const { device, fault, band } of devices) {
    // Where only electronic sources feed it nothing much flows, and nothing can be counted on to open it.
    if ('missing' in band || fault === null || fault.lowestA === null) continue;
    const letThrough = worstLetThrough(band, { lowA: fault.lowestA, highA: fault.highestA }, ADIABATIC_S);
    for (const cable of protectedCablesOf(context).of(device)) {
      const withstand = withstandOf(cable, context.tables);
      if ('missing' in withstand) continue;
      const figures = { cable: cable.id, device: device.id, withstand, letThrough };
      const known = found.get(cable.id);
      if (known === undefined || shareUsed(figures) > shareUsed(known)) found.set(cable.id, figures);
    }
  }
  return context.drawn.flatMap(({ id }) => found.get(id) ?? []);
}

/** Share of what the cable stands; nothing is known to bound it where the device need not open. */
export function shareUsed({ withstand, letThrough }: CableFigures): number {
  return letThrough === null ? Number.POSITIVE_INFINITY : letThrough.i2t / withstand.k2s2;
}
