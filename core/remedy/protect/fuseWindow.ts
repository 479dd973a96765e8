/** The window of a fuse: the current that flows, with its margin, at most the fuse, at most what the wire admits. */
import { CheckContext } from '../../checks/checkContext.ts';
import { allowanceOver } from '../../checks/fuseRules.ts';
import { protectedCablesOf } from '../../checks/protectedCables.ts';
import { isOver, isUnder } from '../../checks/tally.ts';
import { amps } from '../../checks/wording.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { CablePart, PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import type { Device } from '../../network/wiring.ts';
import { isDevice } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import { needOf } from './need.ts';

/** What a window is made of. */
export interface WindowFigures {
  /** The most that flows. */
  readonly loadA: number;
  /** The same with the practice's factor on what lasts for hours. */
  readonly continuousA: number;
  /** Rating in place; null: none yet. */
  readonly fuseA: number | null;
  /** Ampacity of the wire that admits least, as it lies. */
  readonly wireA: number;
  /** Largest device that the practice admits over that wire: a factor on `wireA`, or the next standard size. */
  readonly allowedA: number;
  /** In words: `150 % of the ampacity`, `next standard size up`. */
  readonly how: string;
  /** Cap for the wire's gauge, whatever its ampacity. */
  readonly capA?: number;
}

export interface FuseWindow extends WindowFigures {
  /** Standard ratings of the practice between `continuousA` and what the wire admits. */
  readonly standardInside: readonly number[];
  /** The rating in place lies in the window; with none in place, a standard rating does. */
  readonly fits: boolean;
  /** One sentence with the figures. */
  readonly words: string;
  /** The cable that admits least; absent where the figures came by themselves. */
  readonly cable?: PartId;
}

export interface FuseWindowRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  /** A fuse or breaker, against every cable that it protects; or a cable, with the smallest device that protects it. */
  readonly part: PartId;
  /** Answers at hand, found by the id of their case; the others are solved here. */
  readonly points?: readonly OperatingPoint[];
}

/** The window by its figures: load ≤ fuse ≤ wire, and the standard ratings of a series inside it. */
export function windowFrom(figures: WindowFigures, ratingsA: readonly number[]): FuseWindow {
  const { fuseA, loadA, continuousA } = figures;
  const mostA = upperOf(figures);
  const standardInside = ratingsA.filter((ratingA) => !isUnder(ratingA, continuousA) && !isOver(ratingA, mostA));
  const fits = fuseA === null ? standardInside.length > 0 : !isUnder(fuseA, continuousA) && !isOver(fuseA, mostA);
  return { ...figures, standardInside, fits, words: wordsOf() };

  function wordsOf(): string {
    const span = `${amps(continuousA)} ≤ fuse ≤ ${amps(mostA)}`;
    const inside =
      standardInside.length > 0
        ? `standard inside: ${standardInside.map((ratingA) => amps(ratingA)).join(', ')}`
        : `none fits: ${isOver(continuousA, mostA) ? 'cable too thin' : 'no standard rating lies between'}`;
    return `${span}; ${[...inPlace(), inside].join('; ')}`;
  }

  function inPlace(): readonly string[] {
    if (fuseA === null) return [];
    if (isUnder(fuseA, loadA))
      return [`${amps(fuseA)} is under the running current ${amps(loadA)}: it will open in use`];
    if (isUnder(fuseA, continuousA)) return [`${amps(fuseA)} has no margin for current that lasts`];
    if (isOver(fuseA, mostA)) return [`${amps(fuseA)} does not protect a cable of ${amps(figures.wireA)}`];
    return [`${amps(fuseA)} lies inside`];
  }
}

/** The largest rating that a window admits. */
export function upperOf({ allowedA, capA }: Pick<WindowFigures, 'allowedA' | 'capA'>): number {
  return Math.min(allowedA, capA ?? Number.POSITIVE_INFINITY);
}

/** The standard ratings that the practice of a job means, rising. */
export function standardRatings({ practice, tables }: Pick<CheckContext, 'practice' | 'tables'>): readonly number[] {
  return tables.devices.ratings.get(practice.standardRatings)?.ratingsA ?? [];
}

/**
 * The window of one fuse, breaker or cable of a job. What is missing, in words, where the part is none of these, protects nothing,
 * or a current, a size or the nominal volts are not known.
 */
export function fuseWindowOf(request: FuseWindowRequest): FuseWindow | { readonly missing: string } {
  const context = contextOf(request);
  const part = context.drawn.find(({ id }) => id === request.part);
  if (part === undefined) return { missing: `a part ${request.part}` };
  if (isDevice(part)) return deviceWindow(context, part);
  return part.kind === 'cable' ? cableWindow(context, part) : { missing: `a window: ${part.id} is a ${part.kind}` };
}

/** The window of a device against the cable that admits least of all that it protects. */
export function deviceWindow(context: CheckContext, device: Device): FuseWindow | { readonly missing: string } {
  const need = needOf(context, device.id);
  if ('missing' in need) return need;
  let least: Omit<WindowFigures, 'loadA' | 'continuousA' | 'fuseA'> | undefined;
  let binding: CablePart | undefined;
  for (const cable of protectedCablesOf(context).of(device)) {
    const figures = wireFigures(context, cable, device);
    if ('missing' in figures) return figures;
    if (least !== undefined && upperOf(least) <= upperOf(figures)) continue;
    [least, binding] = [figures, cable];
  }
  if (least === undefined || binding === undefined)
    return { missing: `a cable that ${device.kind} ${device.id} protects` };
  const figures = { loadA: need.loadA, continuousA: need.mostA, fuseA: device.ratingA, ...least };
  return { ...windowFrom(figures, standardRatings(context)), cable: binding.id };
}

function cableWindow(context: CheckContext, cable: CablePart): FuseWindow | { readonly missing: string } {
  const need = needOf(context, cable.id);
  if ('missing' in need) return need;
  const wire = wireFigures(context, cable, cable);
  if ('missing' in wire) return wire;
  const protects = protectedCablesOf(context);
  const ratings = context.drawn.flatMap((part) =>
    isDevice(part) && protects.of(part).includes(cable) ? [part.ratingA] : [],
  );
  const fuseA = ratings.length === 0 ? null : Math.min(...ratings);
  const figures = { loadA: need.loadA, continuousA: need.mostA, fuseA, ...wire };
  return { ...windowFrom(figures, standardRatings(context)), cable: cable.id };
}

/** What a cable admits over it, for a device between two junctions. */
export function wireFigures(
  context: CheckContext,
  cable: CablePart,
  between: Pick<Device, 'from' | 'to'>,
): Omit<WindowFigures, 'loadA' | 'continuousA' | 'fuseA'> | { readonly missing: string } {
  const allowance = allowanceOver(context, { cable, between });
  if ('missing' in allowance) return allowance;
  const { ampacityA, largest, capA } = allowance;
  return {
    wireA: ampacityA,
    allowedA: largest.ratingA,
    how: largest.how,
    ...(capA === undefined ? {} : { capA }),
  };
}

interface Known {
  readonly tables: Tables;
  readonly points: readonly OperatingPoint[] | undefined;
  readonly context: CheckContext;
}
const ofJob = new WeakMap<CheckedJob, Known>();

/** A screen asks for every device of a job, one after the other. */
function contextOf({ job, tables, points }: FuseWindowRequest): CheckContext {
  const known = ofJob.get(job);
  if (known !== undefined && known.tables === tables && known.points === points) return known.context;
  const context = new CheckContext({ job, tables, ...(points === undefined ? {} : { points }) });
  ofJob.set(job, { tables, points, context });
  return context;
}
