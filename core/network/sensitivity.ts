/** How one answer depends on every figure of the network, for the price of one more (transposed) solve. */
import { Defect } from '../job/issue.ts';
import type { JunctionId, PartId } from '../job/part.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import { Linearised, perFigure, tieCoefficients } from './linearised.ts';
import type { Assembled } from './newton.ts';
import type { SolvedCircuit } from './operatingPoint.ts';
import { tieCurrents } from './ties.ts';

/** The answer asked about: volts between two junctions, or the current of a part (signs as in `core/job/part.ts`). */
export type Target =
  | { readonly kind: 'voltage'; readonly plus: JunctionId; readonly minus: JunctionId }
  | { readonly kind: 'current'; readonly part: PartId };

export interface Sensitivity {
  readonly part: PartId;
  /** Which piece of the part, as `Element.role`; empty for the whole part. */
  readonly role: string;
  readonly quantity: 'resistanceOhm' | 'emfV' | 'currentA' | 'powerW' | 'setpointV';
  /** d(answer)/d(quantity), in V or A per unit of the quantity. */
  readonly perUnit: number;
}

/**
 * Derivatives of one answer to every resistance, EMF, load and held voltage, by the adjoint: with r(U, p) = 0 and
 * T = sum t_e i_e + sum c_j V_j, solve J' lambda = dT/dU; then dT/dp = sum over elements of (t_e - w_e) di_e/dp with
 * w_e = lambda(from) - lambda(to) (plus the couplings' share). A zero-ohm part counts too: its figure is what a first
 * milliohm in it would do. First order at the operating point, with the states of chargers and diodes as they are.
 * `null` where the answer is not determined.
 */
export function sensitivities(solved: SolvedCircuit, target: Target): readonly Sensitivity[] | null {
  const { assembled, circuit } = solved;
  if (assembled === null) return null;
  const functional = functionalOf(solved, assembled, target);
  if (functional === null) return null;
  const linearised = new Linearised(assembled);
  const weights = adjointWeights(linearised, functional);
  const result: Sensitivity[] = [];
  const add = (element: Element, quantity: Sensitivity['quantity'], perUnit: number): void => {
    const part = circuit.parts[element.partIndex]!;
    result.push({ part: part.id, role: element.role, quantity, perUnit });
  };
  for (const element of assembled.active) {
    const t = weights.ofElement.get(element)!;
    switch (element.law) {
      case Law.conductance:
        add(element, 'resistanceOhm', -t * element.i * element.a);
        break;
      case Law.emf:
        add(element, 'resistanceOhm', -t * element.i * element.a);
        add(element, 'emfV', -t * element.a);
        break;
      case Law.warming:
        add(element, 'resistanceOhm', -t * element.i * element.slope);
        break;
      case Law.power:
        add(element, 'powerW', t * perFigure(element));
        break;
      case Law.current:
        add(element, 'currentA', element.a < 0 ? -t : t);
        break;
      default:
        break;
    }
  }
  for (const [tie, perVolt] of weights.ofTie) {
    if (tie.b !== 0) add(tie, 'setpointV', perVolt);
    else add(tie, 'resistanceOhm', perVolt * (assembled.coupling.ties.get(tie) ?? 0));
  }
  return result;
}

interface Functional {
  /** t_e, by element. */
  readonly ofElement: ReadonlyMap<Element, number>;
  /** c_j, one entry a junction. */
  readonly ofJunction: Float64Array;
}

function functionalOf(solved: SolvedCircuit, assembled: Assembled, target: Target): Functional | null {
  const { circuit } = solved;
  const ofJunction = new Float64Array(circuit.junctions.length);
  if (target.kind === 'voltage') {
    const plus = circuit.junctionIndex.get(target.plus);
    const minus = circuit.junctionIndex.get(target.minus);
    if (plus === undefined || minus === undefined) return null;
    if (assembled.reduction.node[plus] === -2 || assembled.reduction.node[minus] === -2) return null;
    ofJunction[plus]! += 1;
    ofJunction[minus]! -= 1;
    return { ofElement: new Map(), ofJunction };
  }
  const index = circuit.parts.findIndex((part) => part.id === target.part);
  if (index < 0) return null;
  const part = circuit.parts[index]!;
  const sourceLike = part.kind === 'string' || part.kind === 'array' || part.kind === 'charger';
  const output = part.kind === 'controller' || part.kind === 'converter';
  const elements = circuit.elementsOfPart[index]!;
  const element = output ? elements.find((candidate) => candidate.role === 'output') : elements[0];
  if (element === undefined || element.law === Law.none) return null;
  const sign = sourceLike || output ? -1 : 1;
  if (element.law !== Law.tie) return { ofElement: new Map([[element, sign]]), ofJunction };
  if (assembled.reduction.forest.undetermined.has(element)) return null;
  const ofElement = new Map([...tieCoefficients(assembled, element)].map(([e, c]) => [e, sign * c]));
  return { ofElement, ofJunction };
}

/** t_e - w_e by element, and dT/d(held volts) by tie. */
function adjointWeights(linearised: Linearised, functional: Functional) {
  const { assembled, rows } = linearised;
  const { node, size, forest } = assembled.reduction;
  const n = assembled.volts.length;
  // Right-hand side dT/dU (and dT/da for coupled elements).
  const b = new Float64Array(size + rows.length);
  const put = (j: number, value: number): void => {
    if (node[j]! >= 0) b[node[j]!]! += value;
  };
  for (let j = 0; j < n; j++) put(j, functional.ofJunction[j]!);
  for (const [element, t] of functional.ofElement) {
    put(element.from, t * element.slope);
    put(element.to, -t * element.slope);
  }
  rows.forEach((row, k) => {
    b[size + k]! += (functional.ofElement.get(row.target) ?? 0) * perFigure(row.target);
  });
  const lambda = linearised.solveTransposed(b);
  const at = (j: number) => (node[j]! >= 0 ? lambda[node[j]!]! : 0);
  const ofElement = new Map<Element, number>();
  for (const element of assembled.active) {
    let weight = (functional.ofElement.get(element) ?? 0) - (at(element.from) - at(element.to));
    rows.forEach((row, k) => {
      weight += lambda[size + k]! * row.perAmp * (row.coefficients.get(element) ?? 0);
    });
    ofElement.set(element, weight);
  }
  return { ofElement, ofTie: tieWeights(linearised, functional, ofElement, lambda, forest) };
}

/**
 * dT/d(held volts) of every tie at once: moving the `from` side of a tie up by one volt changes T by
 * sum over that side of (c_j + what the weighted slopes leave there), which is the tie current of that field.
 */
function tieWeights(
  linearised: Linearised,
  functional: Functional,
  ofElement: ReadonlyMap<Element, number>,
  lambda: Float64Array,
  forest: Assembled['reduction']['forest'],
): Map<Element, number> {
  const { assembled, rows } = linearised;
  const { size, node, offset } = assembled.reduction;
  const leaving = new Float64Array(assembled.volts.length);
  for (let j = 0; j < leaving.length; j++) leaving[j] = -functional.ofJunction[j]!;
  for (const element of assembled.active) {
    const change = ofElement.get(element)! * element.slope;
    leaving[element.from]! -= change;
    leaving[element.to]! += change;
  }
  rows.forEach((row, k) => {
    if (row.of === null) return;
    leaving[row.of.from]! -= lambda[size + k]! * row.perVolt;
    leaving[row.of.to]! += lambda[size + k]! * row.perVolt;
  });
  // A tied group at known volts does not move at its anchor: what its sum lacks belongs there.
  balanceAnchors(forest, leaving, node, offset);
  const currents = new Map<Element, number>();
  tieCurrents(forest, leaving, currents);
  for (const tie of currents.keys()) if (forest.undetermined.has(tie)) currents.delete(tie);
  return currents;
}

function balanceAnchors(
  forest: Assembled['reduction']['forest'],
  leaving: Float64Array,
  node: Int32Array,
  offset: Float64Array,
): void {
  const totals = new Map<number, number>();
  const anchors = new Map<number, number>();
  const rootOf = (j: number): number => {
    let at = j;
    while (forest.parentJunction[at]! >= 0) at = forest.parentJunction[at]!;
    return at;
  };
  for (const j of forest.order) {
    if (node[j] !== -1) continue;
    const root = rootOf(j);
    totals.set(root, (totals.get(root) ?? 0) + leaving[j]!);
    if (offset[j] === 0 && !anchors.has(root)) anchors.set(root, j);
  }
  for (const [root, total] of totals) {
    const anchor = anchors.get(root);
    if (anchor === undefined) throw new Defect('a tied group at known volts has a junction at its 0 V');
    leaving[anchor]! -= total;
  }
}
