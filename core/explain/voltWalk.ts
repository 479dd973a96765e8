/** The potential along the way from a source through a load and back. */

import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { partsInCase } from '../job/job.ts';
import type { JunctionId, PartId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { withoutPairs } from '../network/wiring.ts';
import { alongA, type Route, routeFrom, routesTo } from './route.ts';
import type { NoWalk, VoltWalk, WalkSide, WalkStep, WalkStepKind, WalkTotals } from './walk.ts';
import { loadPort, sourcePorts } from './walkPorts.ts';
import { type Stretch, Wires } from './wires.ts';

export interface WalkRequest {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly point: OperatingPoint;
  readonly load: PartId;
  /** Else the one that feeds the load most. */
  readonly source?: PartId;
}

/**
 * Walks from a source's minus through the source, out along the largest currents to the load's plus, through the load, and back.
 * Each step's change is taken from the part itself: rest volts, current times resistance, volts across it; so the sum round
 * the loop is a check of Kirchhoff's voltage rule, and each end must meet the potential that the solve gives the junction.
 */
export function voltWalk({ job, operatingCase, point, load, source }: WalkRequest): VoltWalk | NoWalk {
  if (point.outcome !== 'solved') return no(`case ${point.case} has no operating point to walk through`);
  const parts = withoutPairs(partsInCase(job, operatingCase));
  const byId = (id: PartId) => parts.find((part) => part.id === id);
  const taker = byId(load);
  const port = taker === undefined ? undefined : loadPort(taker, point);
  if (port === undefined) return no(`${load} takes nothing in case ${point.case}`);
  const wires = new Wires(parts, point);
  if (source === undefined) {
    const [route] = routesTo(port, { parts, wires, point });
    return route === undefined
      ? no(`no source reaches both poles of ${load} by what is closed`)
      : walkAlong(route, point);
  }
  const giver = byId(source);
  const route = routeFrom(giver === undefined ? [] : sourcePorts(giver, point), port, wires);
  if (route === undefined) return no(`${source} does not reach both poles of ${load} by what is closed`);
  return walkAlong(route, point);
}

function no(reason: string): NoWalk {
  return { ok: false, reason };
}

function walkAlong({ source, load, out, back }: Route, point: OperatingPoint): VoltWalk {
  const walk = new Footsteps(point.junctions.get(source.minus) ?? 0);
  const { emfV, sagV, currentA } = source;
  const inside = sagV === undefined ? source.plus : null;
  walk.step('source', 'source', source.part, source.minus, inside, emfV, currentA);
  if (sagV !== undefined) walk.step('sag', 'source', source.part, null, source.plus, -sagV, currentA);
  for (const stretch of out) walk.along(stretch, 'out');
  walk.step('load', 'load', load.part, load.plus, load.minus, -load.voltageV, load.currentA);
  for (const stretch of back) walk.along(stretch, 'back');
  const { steps } = walk;
  const totals: WalkTotals = {
    outV: lost(steps, 'out'),
    backV: lost(steps, 'back'),
    loadV: load.voltageV,
    sagV: sagV ?? 0,
    otherSourcesV: walk.otherSourcesV,
  };
  const closureV = steps.reduce((sum, { changeV }) => sum + changeV, 0);
  return { ok: true, source: source.part, load: load.part, steps, emfV, totals, closureV };
}

function lost(steps: readonly WalkStep[], side: WalkSide): number {
  const sum = steps.reduce(
    (soFar, step) => (step.side === side && step.kind === 'part' ? soFar - step.changeV : soFar),
    0,
  );
  return sum === 0 ? 0 : sum;
}

/** Puts one foot before the other, each step beginning where the last one ended. */
class Footsteps {
  readonly steps: WalkStep[] = [];
  otherSourcesV = 0;
  private atV: number;

  constructor(startV: number) {
    this.atV = startV;
  }

  step(
    kind: WalkStepKind,
    side: WalkSide,
    part: PartId,
    from: JunctionId | null,
    to: JunctionId | null,
    changeV: number,
    currentA: number | null,
    segment?: number,
  ): void {
    const startV = this.atV;
    this.atV = startV + changeV;
    // Volts that change nothing need no current to be known.
    const powerW = changeV === 0 ? 0 : currentA === null ? null : Math.abs(changeV) * currentA;
    const heatW = powerW === null ? null : kind === 'source' || kind === 'load' ? powerW : Math.abs(powerW);
    const where = segment === undefined ? {} : { segment };
    this.steps.push({ kind, side, part, ...where, from, to, startV, endV: this.atV, changeV, currentA, powerW: heatW });
  }

  along(stretch: Stretch, side: 'out' | 'back'): void {
    const { wire, forward } = stretch;
    const [from, to] = forward ? [wire.from, wire.to] : [wire.to, wire.from];
    const currentA = alongA(stretch);
    if (wire.emfV !== undefined) {
      const sagV = wire.fallV + wire.emfV;
      if (forward) {
        this.step('source', side, wire.part, from, null, wire.emfV, currentA);
        this.step('sag', side, wire.part, null, to, -sagV, currentA);
      } else {
        this.step('sag', side, wire.part, from, null, sagV, currentA);
        this.step('load', side, wire.part, null, to, -wire.emfV, currentA);
      }
      this.otherSourcesV += forward ? -wire.fallV : wire.fallV;
      return;
    }
    const fallV = forward ? wire.fallV : -wire.fallV;
    this.step('part', side, wire.part, from, to, fallV === 0 ? 0 : -fallV, currentA, wire.segment);
  }
}
