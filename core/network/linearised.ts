/**
 * The circuit linearised at its operating point: how its volts answer small injected currents. Symmetric (and factored as
 * such) unless converters or controllers couple two places; then the coupling figures join the unknowns and the system is
 * factored as a general one.
 *
 *   [ G  D ] [ dU ]   [ injected current ]        G: slopes of the elements, D: d i / d a of the coupled elements,
 *   [ H  K ] [ da ] = [ 0                ]        rows H, K: a - h(U, a) = 0 for each coupling figure a.
 */
import { analyseGeneral } from '../linear/analyseGeneral.ts';
import { patternFromEntries } from '../linear/patternFromEntries.ts';
import { isCoupler } from './coupling.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { Assembled } from './newton.ts';

/** One coupling figure: element `target` takes a = h, h = constant + perVolt (V(of.from) - V(of.to)) + perAmp (tie current of `tie`). */
interface CouplingRow {
  readonly target: Element;
  readonly of: Element | null;
  readonly perVolt: number;
  readonly tie: Element | null;
  readonly perAmp: number;
  /** d(tie current)/d(element current), for the elements where it is not zero. */
  readonly coefficients: ReadonlyMap<Element, number>;
}

export class Linearised {
  readonly assembled: Assembled;
  readonly rows: readonly CouplingRow[];
  private readonly general: ReturnType<typeof analyseGeneral> | null;

  constructor(assembled: Assembled) {
    this.assembled = assembled;
    assembled.coupling.balance();
    this.rows = couplingRows(assembled);
    assembled.isHighBranch(); // refactors at the operating point
    this.general = this.rows.length === 0 ? null : factorCoupled(assembled, this.rows);
  }

  /** Change of each unknown for currents injected into them; b has one entry an unknown. */
  solve(b: Float64Array): Float64Array {
    return this.run(b, false);
  }

  /**
   * The adjoint: multipliers of each unknown's balance, then of each coupling row. `b` has one entry an unknown and may have
   * one more a coupling row.
   */
  solveTransposed(b: Float64Array): Float64Array {
    return this.run(b, true);
  }

  private run(b: Float64Array, transposed: boolean): Float64Array {
    const { size } = this.assembled.reduction;
    const x = new Float64Array(size + this.rows.length);
    x.set(b);
    if (this.general === null) this.assembled.solveLinear(x, x);
    else if (transposed) this.general.solveTransposed(x, x);
    else this.general.solve(x, x);
    return x;
  }
}

/** d i / d a of an element whose current is proportional to its figure a. */
export function perFigure({ law, v }: Element): number {
  if (law === Law.power) return 1 / v;
  if (law === Law.powerSource) return -1 / v;
  return 1;
}

/**
 * A tie's current as a sum of element currents: what leaves its subtree of the forest by other elements. Coefficients +1 or
 * -1; empty for a tie that closes a loop of ties.
 */
export function tieCoefficients(assembled: Assembled, tie: Element): Map<Element, number> {
  const { parentTie, parentJunction } = assembled.reduction.forest;
  const coefficients = new Map<Element, number>();
  const child = parentTie[tie.to] === tie ? tie.to : parentTie[tie.from] === tie ? tie.from : -1;
  if (child < 0) return coefficients;
  const inside = new Map<number, boolean>();
  const below = (j: number): boolean => {
    if (j === child) return true;
    const known = inside.get(j);
    if (known !== undefined) return known;
    const parent = parentJunction[j]!;
    const answer = parent >= 0 && below(parent);
    inside.set(j, answer);
    return answer;
  };
  const sign = tie.to === child ? 1 : -1;
  for (const element of assembled.active) {
    const c = sign * (Number(below(element.from)) - Number(below(element.to)));
    if (c !== 0) coefficients.set(element, c);
  }
  return coefficients;
}

function couplingRows(assembled: Assembled): CouplingRow[] {
  const rows: CouplingRow[] = [];
  const row = (target: Element, on: Partial<CouplingRow>): void => {
    const tie = on.tie ?? null;
    const coefficients = tie === null ? new Map<Element, number>() : tieCoefficients(assembled, tie);
    rows.push({ target, of: null, perVolt: 0, perAmp: 0, ...on, tie, coefficients });
  };
  for (const valve of assembled.circuit.valves) {
    if (!isCoupler(valve) || assembled.reduction.node[valve.input.from] === -2) continue;
    const { input, element } = valve;
    if (valve.state === 'tracking' && valve.kind === 'tracker') {
      // At the best input volts dP/dV = 0, so holding them is exact to first order.
      row(element, { tie: input, perAmp: valve.efficiency * valve.trackedV });
    } else if (valve.state === 'held') {
      const perAmp = valve.kind === 'joiner' ? -1 : -valve.setpointV / valve.efficiency;
      row(input, { tie: element, perAmp });
    } else if (valve.state === 'limited' && valve.kind !== 'joiner') {
      row(input, { of: element, perVolt: valve.limitA / valve.efficiency });
    }
  }
  return rows;
}

function factorCoupled(assembled: Assembled, rows: readonly CouplingRow[]) {
  const { node, size } = assembled.reduction;
  const at: { row: number[]; column: number[]; value: number[] } = { row: [], column: [], value: [] };
  const add = (row: number, column: number, value: number): void => {
    if (row < 0 || column < 0) return;
    at.row.push(row);
    at.column.push(column);
    at.value.push(value);
  };
  for (const { from, to, slope } of assembled.active) {
    const p = node[from]!;
    const q = node[to]!;
    if (p === q) continue;
    add(p, p, slope);
    add(q, q, slope);
    add(p, q, -slope);
    add(q, p, -slope);
  }
  const place = new Map(rows.map((row, k) => [row.target, size + k]));
  rows.forEach((row, k) => {
    const self = size + k;
    const { target, of, perVolt, perAmp, coefficients } = row;
    add(node[target.from]!, self, perFigure(target));
    add(node[target.to]!, self, -perFigure(target));
    add(self, self, 1);
    if (of !== null) {
      add(self, node[of.from]!, -perVolt);
      add(self, node[of.to]!, perVolt);
    }
    for (const [element, c] of coefficients) {
      add(self, node[element.from]!, -perAmp * c * element.slope);
      add(self, node[element.to]!, perAmp * c * element.slope);
      const other = place.get(element);
      if (other !== undefined) add(self, other, -perAmp * c * perFigure(element));
    }
  });
  const { pattern, slots } = patternFromEntries(size + rows.length, at.row, at.column, { symmetric: false });
  const values = new Float64Array(pattern.columnStarts[pattern.size]!);
  at.value.forEach((value, k) => {
    values[slots[k]!]! += value;
  });
  const factorisation = analyseGeneral(pattern);
  factorisation.refactor(values);
  return factorisation;
}
