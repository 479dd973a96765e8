/**
 * The reference that the engine is held against: written from the job-file contract alone, dense and slow, sharing nothing
 * with the engine but the types of a checked job. Full modified nodal analysis, own search of the states of piecewise parts.
 */
import type { CheckedJob, OperatingCase } from '../../core/job/job.ts';
import { partsInCase } from '../../core/job/job.ts';
import type { ControllerPart, InverterPart, JunctionId, LoadPart, Part, PartId } from '../../core/job/part.ts';
import type { BranchState } from './denseBranch.ts';
import { type ArraySide, arraySideOf, holdInput, voltsForWatts } from './denseHarvest.ts';
import { type OutsideLaws, type PlannedBranch, planBranches } from './densePlan.ts';
import { type Screening, screen } from './denseScreening.ts';
import { type NamedSolution, NoSolution, solvePlanned, undeterminedShorts } from './denseSolve.ts';

export interface DenseAnswer {
  /** Against the island's 0 V; only junctions whose volts are defined. */
  readonly volts: ReadonlyMap<JunctionId, number>;
  /** Junctions whose volts are defined against each other. */
  readonly group: (junction: JunctionId) => JunctionId;
  /** Groups in which the contract names no 0 V (fed by a converter alone): volts are against any one junction. */
  readonly adrift: ReadonlySet<JunctionId>;
  /** By branch: part id, `<pair>.plus`, `<busbar>#0`, `<two-port>#in`, `<two-port>#out`, `<string>#low`. */
  readonly amps: ReadonlyMap<string, number>;
  readonly undetermined: ReadonlySet<string>;
  readonly fed: ReadonlySet<PartId>;
  readonly dropped: ReadonlySet<PartId>;
  /** Smallest ratio of a constant-power part's volts to its volts with all powers off: above 0.5 it is the upper branch. */
  readonly leastVoltsKept: number;
}

export function denseReference(input: {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly laws: OutsideLaws;
}): DenseAnswer {
  const { job, operatingCase, laws } = input;
  const parts = partsInCase(job, operatingCase);
  const screening = screen(parts, operatingCase);
  const dropped = new Set<PartId>();
  for (;;) {
    const solved = solveOnce({ parts, operatingCase, screening, laws, dropped });
    const low = parts.filter((part) => !dropped.has(part.id) && dropsOut(part, solved.volts, screening));
    if (low.length === 0) return finish({ job, parts, screening, dropped, ...solved });
    for (const part of low) dropped.add(part.id);
  }
}

function dropsOut(part: Part, volts: ReadonlyMap<JunctionId, number>, screening: Screening): boolean {
  if ((part.kind !== 'load' && part.kind !== 'inverter') || !screening.fed.has(part.id)) return false;
  const limitV = part.kind === 'load' ? part.minimumV : part.cutoffV;
  return limitV !== undefined && voltsAcross(part, volts) < limitV;
}

function voltsAcross(part: LoadPart | InverterPart, volts: ReadonlyMap<JunctionId, number>): number {
  return volts.get(part.plus)! - volts.get(part.minus)!;
}

interface Solved {
  readonly planned: readonly PlannedBranch[];
  readonly volts: ReadonlyMap<JunctionId, number>;
  readonly amps: ReadonlyMap<string, number>;
  readonly main: NamedSolution;
}

/** Array sides first (what could be harvested), then the rest, then the array sides with what is really taken. */
function solveOnce(input: Omit<Parameters<typeof planBranches>[0], 'harvestW'>): Solved {
  const trackers = input.parts.filter(
    (part): part is ControllerPart =>
      part.kind === 'controller' && part.type === 'mppt' && input.screening.fed.has(part.id),
  );
  const first = planBranches({ ...input, harvestW: new Map() });
  const sides = trackers.map((controller) => arraySideOf(controller, first));
  const aside = new Set(sides.flatMap(({ branches }) => branches.map(({ key }) => key)));
  const harvestW = new Map(sides.map(({ controller, best }) => [controller.id, best.watts]));
  const planned = planBranches({ ...input, harvestW });
  const main = solvePlanned(planned.filter(({ key }) => !aside.has(key)));
  const volts = new Map(main.volts);
  const amps = new Map(main.amps);
  for (const side of sides) addArraySide(side, { volts, amps });
  return { planned, volts, amps, main };
}

function addArraySide(
  side: ArraySide,
  answer: { readonly volts: Map<JunctionId, number>; readonly amps: Map<string, number> },
): void {
  const { id, from, to, efficiency = 0.95 } = side.controller;
  const outV = answer.volts.get(to.plus)! - answer.volts.get(to.minus)!;
  const takenW = (answer.amps.get(`${id}#out`)! * outV) / efficiency;
  // Beyond its best point by rounding only: the main network has been solved with that very limit.
  const input = holdInput(side, takenW > side.best.watts * (1 - 1e-13) ? side.best.volts : voltsForWatts(side, takenW));
  const baseV = (answer.volts.get(from.minus) ?? 0) - input.solution.volts.get(from.minus)!;
  for (const [junction, volts] of input.solution.volts) answer.volts.set(junction, volts + baseV);
  for (const branch of side.branches) answer.amps.set(branch.key, input.solution.amps.get(branch.key)!);
  answer.amps.set(`${id}#in`, input.amps);
}

function finish(
  solved: Solved & {
    readonly job: CheckedJob;
    readonly parts: readonly Part[];
    readonly screening: Screening;
    readonly dropped: ReadonlySet<PartId>;
  },
): DenseAnswer {
  const { job, parts, screening, dropped, planned, main } = solved;
  const { volts, zeros, adrift } = againstReference({ job, parts, screening, volts: solved.volts });
  for (const junction of floatingBehindBlocking({ planned, amps: solved.amps, states: main.states, zeros }))
    volts.delete(junction);
  const kept = parts
    .filter((part): part is LoadPart | InverterPart => part.kind === 'load' || part.kind === 'inverter')
    .filter((part) => screening.fed.has(part.id) && !dropped.has(part.id))
    .filter((part) => part.kind === 'inverter' || part.powerW !== undefined)
    .map((part) => voltsAcross(part, main.volts) / voltsAcross(part, main.unloadedVolts));
  return {
    volts,
    group: screening.group,
    adrift,
    amps: solved.amps,
    undetermined: undeterminedShorts(planned),
    fed: screening.fed,
    dropped,
    leastVoltsKept: Math.min(1, ...kept),
  };
}

/** Shifts each group so that its reference junction (marked, else the minus of its first source) is at 0 V. */
function againstReference(at: {
  readonly job: CheckedJob;
  readonly parts: readonly Part[];
  readonly screening: Screening;
  readonly volts: ReadonlyMap<JunctionId, number>;
}): {
  readonly volts: Map<JunctionId, number>;
  readonly zeros: readonly JunctionId[];
  readonly adrift: ReadonlySet<JunctionId>;
} {
  const { group } = at.screening;
  const zeroOf = new Map<JunctionId, JunctionId>();
  const propose = (junction: JunctionId): void => {
    if (at.volts.has(junction) && !zeroOf.has(group(junction))) zeroOf.set(group(junction), junction);
  };
  for (const [junction, note] of at.job.junctions) if (note.reference) propose(junction);
  for (const part of at.parts) {
    if (part.kind === 'string' || part.kind === 'array' || part.kind === 'charger') propose(part.minus);
  }
  const adrift = new Set<JunctionId>();
  for (const junction of at.volts.keys()) {
    if (zeroOf.has(group(junction))) continue;
    adrift.add(group(junction));
    zeroOf.set(group(junction), junction);
  }
  const shifted = [...at.volts].map(
    ([junction, volts]) => [junction, volts - at.volts.get(zeroOf.get(group(junction))!)!] as const,
  );
  return { volts: new Map(shifted), zeros: [...zeroOf.values()], adrift };
}

/** Junctions that only blocking diodes, idle controllers and loads of fixed draw join to their 0 V: their volts are not defined. */
function floatingBehindBlocking(at: {
  readonly planned: readonly PlannedBranch[];
  readonly amps: ReadonlyMap<string, number>;
  readonly states: ReadonlyMap<string, BranchState>;
  readonly zeros: readonly JunctionId[];
}): readonly JunctionId[] {
  const ties = at.planned.filter(({ key, law: { type } }) => {
    if (type === 'amps' || type === 'watts' || type === 'draw') return false;
    if (type === 'feed') return at.states.get(key) !== 'lower';
    // An array at open circuit gives no current at any volts above it either.
    return !((type === 'diode' || type === 'pass' || type === 'panel') && Math.abs(at.amps.get(key)!) < 1e-6);
  });
  const anchored = new Set(at.zeros);
  for (let grown = true; grown; ) {
    grown = false;
    for (const { a, b } of ties) {
      if (anchored.has(a) === anchored.has(b)) continue;
      anchored.add(a).add(b);
      grown = true;
    }
  }
  return at.planned.flatMap(({ a, b }) => [a, b]).filter((junction) => !anchored.has(junction));
}

export { NoSolution };
