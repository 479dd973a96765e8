/** One job in one operating case, solved: volts, amps, watts, states, and the proof. */
import { Defect } from '../job/issue.ts';
import { nameOf } from '../job/part.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { Collapse, OperatingPoint } from './answer.ts';
import { Reader } from './answers.ts';
import type { Circuit, CircuitRequest, Sink } from './circuit.ts';
import { buildCircuit } from './circuit.ts';
import type { Nose } from './collapse.ts';
import { largestDeliverableW, settleOrCollapse, solveFromConductance } from './collapse.ts';
import { voltsAcross } from './disagree.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { readGraph } from './graph.ts';
import type { Assembled } from './newton.ts';
import { proveAnswer } from './proof.ts';
import { isDemand, settle } from './settle.ts';
import { startStates } from './startStates.ts';

/** The circuit at its operating point, kept for what is derived from it (Thévenin sources, sensitivities, what-ifs). */
export interface SolvedCircuit {
  readonly circuit: Circuit;
  readonly graph: GraphView;
  /** Null when no source supplies anything, or the case collapses. */
  readonly assembled: Assembled | null;
  readonly point: OperatingPoint;
}

/**
 * Solves a job in an operating case by nodal analysis.
 *
 * Kirchhoff's current rule at every junction, Kirchhoff's voltage rule round every loop, each part by its own law; of two
 * mathematical solutions the high-voltage one. Ends as `solved`, `collapse` (a load asks for more than can be delivered) or
 * `unsupplied` (no source in the case). Volts in V, currents in A, powers in W; signs as in `core/job/part.ts`.
 * Throws a `Defect` when the proof of balance does not hold: an unproved number never leaves.
 */
export function operatingPoint(request: CircuitRequest): OperatingPoint {
  return solveCircuit(request).point;
}

/** `operatingPoint`, with the solved circuit kept. */
export function solveCircuit(request: CircuitRequest): SolvedCircuit {
  return solveBuilt(buildCircuit(request));
}

/** The same for a circuit that is already built, and perhaps changed in a figure or two. */
export function solveBuilt(circuit: Circuit): SolvedCircuit {
  const graph = readGraph(circuit);
  if (graph.reference.length === 0) {
    return { circuit, graph, assembled: null, point: answer(circuit, graph, null, 'unsupplied') };
  }
  const ending = settledCircuit(circuit, graph);
  if (!('assembled' in ending)) {
    return { circuit, graph, assembled: null, point: answer(circuit, graph, null, 'collapse', ending) };
  }
  const { assembled } = ending;
  return { circuit, graph, assembled, point: answer(circuit, graph, assembled, 'solved') };
}

/** The circuit with its valves settled and loads below their own minimum dropped out, or why there is no such point. */
export function settledCircuit(circuit: Circuit, graph: GraphView): { readonly assembled: Assembled } | Collapse {
  // A load below its own minimum drops out for good; each pass drops one, so this ends.
  for (;;) {
    const outcome = settleOrCollapse(circuit, graph);
    if ('nose' in outcome && outcome.nose.assembled !== null && dropMostStarved(circuit, outcome.nose.assembled))
      continue;
    const ending = 'nose' in outcome ? withoutPoint(circuit, graph, outcome.nose) : outcome;
    if ('assembled' in ending && dropMostStarved(circuit, ending.assembled)) continue;
    return ending;
  }
}

/** Drops out the sink furthest below its own minimum volts, in proportion; false when none is below. */
export function dropMostStarved(circuit: Circuit, assembled: Assembled): boolean {
  let worst: Sink | null = null;
  let least = 1;
  for (const sink of circuit.sinks) {
    if (sink.state !== 'on' || sink.minimumV === undefined || sink.minimumV <= 0) continue;
    const ratio = voltsAcross(sink.element, assembled) / sink.minimumV;
    if (ratio < least) {
      least = ratio;
      worst = sink;
    }
  }
  if (worst === null) return false;
  worst.state = 'dropped-out';
  worst.element.law = Law.none;
  return true;
}

function answer(
  circuit: Circuit,
  graph: GraphView,
  assembled: Assembled | null,
  outcome: OperatingPoint['outcome'],
  collapse?: Collapse,
): OperatingPoint {
  const reader = new Reader(circuit, graph, assembled);
  const proof = proveAnswer(reader, assembled?.iterations ?? 0);
  if (outcome === 'solved' && !proof.holds) {
    throw new Defect(`an answer balances (case ${circuit.operatingCase.id}: ${JSON.stringify(proof)})`);
  }
  return {
    case: circuit.operatingCase.id,
    model: circuit.model,
    outcome,
    junctions: reader.junctions(),
    parts: reader.parts(),
    proof,
    ...(collapse === undefined ? {} : { collapse }),
    remarks: graph.remarks,
    assumptions: circuit.assumptions,
  };
}

/**
 * Where creeping up from no load does not arrive: either there is no answer to invent, and the load that gives way is named
 * with the most it could have; or the point is there and only the way to it was blocked.
 */
function withoutPoint(circuit: Circuit, graph: GraphView, nose: Nose): Collapse | { readonly assembled: Assembled } {
  const sink = nose.sink ?? circuit.sinks.find((candidate) => candidate.state === 'on' && isDemand(candidate));
  if (sink === undefined) throw new Defect('a case without constant-power or constant-current sinks has a solution');
  const part = circuit.parts[sink.element.partIndex]!;
  const wantedW = sink.element.law === Law.power ? sink.element.a : sink.element.a * Math.abs(sink.element.v);
  const asks = `${nameOf(part)} asks for ${wattsText(wantedW)} at its terminals`;
  if (othersSolve(circuit, graph, sink)) {
    const peak = largestDeliverableW(circuit, graph, sink, 1);
    const isPower = sink.element.law === Law.power;
    const assembled = isPower && peak.powerW > wantedW ? solveFromConductance(circuit, graph, sink, peak) : null;
    if (assembled !== null) return { assembled };
    const most = isPower ? Math.min(peak.powerW, wantedW) : peak.powerW;
    const message = `${asks}; the network can deliver at most ${wattsText(most)} to it with everything else as drawn. There is no operating point.`;
    return { load: part.id, wantedW, largestDeliverableW: most, message };
  }
  const percent = Math.floor(100 * nose.share);
  const shareW = nose.share * wantedW;
  const message = `The loads together ask for more than the network can deliver: at most ${percent} % of it all. ${asks} and gives way first; it could have ${wattsText(shareW)} then. There is no operating point.`;
  return { load: part.id, wantedW, largestDeliverableW: shareW, message };
}

function wattsText(value: number): string {
  return formatQuantity({ value, unit: 'W', digits: 4 });
}

function othersSolve(circuit: Circuit, graph: GraphView, sink: Sink): boolean {
  const { law } = sink.element;
  sink.element.law = Law.none;
  startStates(circuit, graph);
  const { ok } = settle(circuit, graph, 1);
  sink.element.law = law;
  return ok;
}
