/** One or a few parts changed: the answer from the factors at hand, by a low-rank update, instead of a solve from the start. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { RankOneChange } from '../linear/lowRankUpdate.ts';
import { branchChange, lowRankUpdate } from '../linear/lowRankUpdate.ts';
import { disagreements } from './disagree.ts';
import type { Element } from './element.ts';
import { evaluate, Law } from './element.ts';
import type { SolvedCircuit } from './operatingPoint.ts';

/** A part's resistance becomes another (in place of its own and its temperature's), or the part opens. */
export interface ResistanceChange {
  readonly part: PartId;
  readonly resistanceOhm: number | 'open';
}

export interface WhatIf {
  /** Volts of every junction that has any. */
  readonly volts: ReadonlyMap<JunctionId, number>;
  /** Current of every part of one element, from `from` to `to` or out of `plus`: signs as in `core/job/part.ts`. */
  readonly currentA: ReadonlyMap<PartId, number>;
}

/**
 * Solves the network again with some resistances changed, by Sherman, Morrison and Woodbury on the factors of the solved
 * circuit and chord steps where the network is not linear. Same answer as a new solve, to rounding.
 *
 * Takes parts that are one conducting element (cable, joint, shunt, fuse or switch with resistance, string without midpoint,
 * resistive load). `null` where the change is of another kind, or makes a charger, diode, controller or drop-out change its
 * state, or leaves a part of the network unfed: then solve anew. The solved circuit is left as it was.
 */
export function whatIf(solved: SolvedCircuit, changes: readonly ResistanceChange[]): WhatIf | null {
  const { assembled, circuit } = solved;
  if (assembled === null) return null;
  const targets = changes.map((change) => targetOf(solved, change));
  if (targets.some((target) => target === null)) return null;
  assembled.isHighBranch(); // factors at the operating point
  const { node } = assembled.reduction;
  const ranks: RankOneChange[] = [];
  for (const target of targets) {
    const { element, siemens } = target!;
    const p = node[element.from]!;
    const q = node[element.to]!;
    if (p === q) continue;
    const weight = siemens - element.slope;
    ranks.push(p < 0 ? branchChange(weight, q, null) : branchChange(weight, p, q < 0 ? null : q));
  }
  const update = lowRankUpdate(assembled.factorisation, assembled.values, ranks);
  if (!update.regular) return null;
  const before = targets.map((target) => ({
    element: target!.element,
    law: target!.element.law,
    a: target!.element.a,
  }));
  const voltsBefore = assembled.volts.slice();
  for (const { element, siemens } of targets.map((target) => target!)) {
    if (element.law !== Law.emf) element.law = Law.conductance;
    element.a = siemens;
  }
  const settled = assembled.solveByChord(update);
  const answer = settled && holds(solved) ? read(solved) : null;
  for (const { element, law, a } of before) {
    element.law = law;
    element.a = a;
  }
  assembled.volts.set(voltsBefore);
  assembled.evaluateAll(1);
  assembled.coupling.update(1);
  for (const element of circuit.elements) if (element.law === Law.none) evaluate(element, 0);
  return answer;
}

interface ChangeTarget {
  readonly element: Element;
  readonly siemens: number;
}

function targetOf(solved: SolvedCircuit, { part, resistanceOhm }: ResistanceChange): ChangeTarget | null {
  const index = solved.circuit.parts.findIndex((candidate) => candidate.id === part);
  const elements = solved.circuit.elementsOfPart[index];
  const element = elements?.[0];
  if (element === undefined || elements!.length !== 1 || resistanceOhm === 0) return null;
  if (element.law !== Law.conductance && element.law !== Law.warming && element.law !== Law.emf) return null;
  return { element, siemens: resistanceOhm === 'open' ? 0 : 1 / resistanceOhm };
}

/** Whether the states of valves and sinks still agree with the changed solution. */
function holds({ circuit, assembled }: SolvedCircuit): boolean {
  assembled!.coupling.balance();
  if (disagreements(circuit, assembled!).length > 0) return false;
  return circuit.sinks.every((sink) => {
    if (sink.state !== 'on' || sink.minimumV === undefined) return true;
    return assembled!.volts[sink.element.from]! - assembled!.volts[sink.element.to]! >= sink.minimumV;
  });
}

function read({ circuit, assembled }: SolvedCircuit): WhatIf {
  const { node, drifting, forest } = assembled!.reduction;
  const volts = new Map<JunctionId, number>();
  circuit.junctions.forEach((id, j) => {
    if (node[j]! > -2 && drifting[j] === 0) volts.set(id, assembled!.volts[j]!);
  });
  const currentA = new Map<PartId, number>();
  circuit.parts.forEach((part, index) => {
    const elements = circuit.elementsOfPart[index]!;
    const element = elements[0];
    if (element === undefined || elements.length > 1 || forest.undetermined.has(element)) return;
    const outward = part.kind === 'string' || part.kind === 'array' || part.kind === 'charger';
    const i = element.law === Law.tie ? (assembled!.coupling.ties.get(element) ?? 0) : element.i;
    currentA.set(part.id, element.law === Law.none ? 0 : outward ? -i : i);
  });
  return { volts, currentA };
}
