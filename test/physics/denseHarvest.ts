/**
 * The array side of a maximum-power controller. It touches the rest of the network at the controller's input minus at most,
 * so it is a network of its own: its current as a function of the volts held at the controller's input is all that counts.
 */
import type { ControllerPart, JunctionId } from '../../core/job/part.ts';
import type { PlannedBranch } from './densePlan.ts';
import { type NamedSolution, NoSolution, solvePlanned } from './denseSolve.ts';

export interface ArraySide {
  readonly controller: ControllerPart;
  readonly branches: readonly PlannedBranch[];
  /** Volts at the input with no current. */
  readonly openCircuitV: number;
  /** Where volts times amps are largest. */
  readonly best: { readonly volts: number; readonly watts: number };
}

const HOLD = 'controller input';

/** Branches reached from the controller's input plus without passing through its input minus. */
export function arraySideOf(controller: ControllerPart, planned: readonly PlannedBranch[]): ArraySide {
  const { plus, minus } = controller.from;
  const reached = new Set<JunctionId>([plus]);
  const branches = new Set<PlannedBranch>();
  for (let grown = true; grown; ) {
    grown = false;
    for (const branch of planned) {
      if (branches.has(branch) || !(reached.has(branch.a) || reached.has(branch.b))) continue;
      branches.add(branch);
      for (const node of [branch.a, branch.b]) if (node !== minus) reached.add(node);
      grown = true;
    }
  }
  const side = [...branches];
  if (
    side.some(
      ({ law }) => !['panel', 'ohm', 'short', 'warm', 'diode'].includes(law.type) || reached.has(controller.to.plus),
    )
  ) {
    throw new Error(`the array side of ${controller.id} is not a network of its own`);
  }
  return { controller, branches: side, ...bestPoint(side, controller) };
}

/** The array side with given volts at the controller's input. */
export function holdInput(
  side: { readonly branches: readonly PlannedBranch[]; readonly controller: ControllerPart },
  volts: number,
): { readonly solution: NamedSolution; readonly amps: number; readonly slope: number } {
  const { plus, minus } = side.controller.from;
  const hold: PlannedBranch = { key: HOLD, a: plus, b: minus, law: { type: 'hold', volts } };
  const solution = solvePlanned([...side.branches, hold]);
  return { solution, amps: solution.amps.get(HOLD)!, slope: solution.holdSlope(HOLD) };
}

function bestPoint(
  branches: readonly PlannedBranch[],
  controller: ControllerPart,
): { readonly openCircuitV: number; readonly best: ArraySide['best'] } {
  const { plus, minus } = controller.from;
  const open = solvePlanned(branches).volts;
  const openCircuitV = open.get(plus)! - open.get(minus)!;
  const side = { branches, controller };
  // Several arrays of unlike volts may give several summits: look everywhere first.
  const steps = 24;
  const grid = Array.from({ length: steps + 1 }, (_, k) => (k * openCircuitV) / steps);
  const watts = grid.map((volts) => volts * holdInput(side, volts).amps);
  const top = watts.indexOf(Math.max(...watts));
  const volts = fallingRoot([grid[Math.max(top - 1, 0)]!, grid[Math.min(top + 1, steps)]!], (at) => {
    const { amps, slope } = holdInput(side, at);
    return amps + at * slope;
  });
  return { openCircuitV, best: { volts, watts: volts * holdInput(side, volts).amps } };
}

/** Volts at the input, on the high side of the best point, where the controller takes just these watts. */
export function voltsForWatts(side: ArraySide, watts: number): number {
  if (watts >= side.best.watts) return side.best.volts;
  return fallingRoot([side.best.volts, side.openCircuitV], (at) => at * holdInput(side, at).amps - watts);
}

/** Root of a falling function by false position with halved ends (Illinois), to the last digits. */
function fallingRoot([low, high]: readonly [number, number], f: (x: number) => number): number {
  let [a, b] = [low, high];
  let [fa, fb] = [f(a), f(b)];
  if (fa <= 0) return a;
  if (fb >= 0) return b;
  for (let step = 0; step < 100; step++) {
    const x = b - (fb * (b - a)) / (fb - fa);
    const fx = f(x);
    if (fx === 0 || Math.abs(b - a) < 1e-14 * Math.abs(b)) return x;
    if (fx > 0 === fb > 0) {
      fa /= 2;
    } else {
      a = b;
      fa = fb;
    }
    if (Math.abs(x - b) < 1e-15 * Math.abs(b)) return x;
    b = x;
    fb = fx;
  }
  throw new NoSolution('no root found on the array side');
}
