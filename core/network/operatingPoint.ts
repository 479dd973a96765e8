/** One job in one operating case, solved: volts, amps, watts, states, and the proof. */
import { Defect } from '../job/issue.ts';
import type { Collapse, OperatingPoint } from './answer.ts';
import { Reader } from './answers.ts';
import type { Circuit, CircuitRequest, Sink } from './circuit.ts';
import { buildCircuit } from './circuit.ts';
import type { Nose } from './collapse.ts';
import { largestDeliverableW, settleOrCollapse } from './collapse.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { readGraph } from './graph.ts';
import type { Assembled } from './newton.ts';
import { proveAnswer } from './proof.ts';
import { isDemand, settle, startStates } from './settle.ts';

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
  const circuit = buildCircuit(request);
  const graph = readGraph(circuit);
  if (graph.reference.length === 0) {
    return { circuit, graph, assembled: null, point: answer(circuit, graph, null, 'unsupplied') };
  }
  // A load below its own minimum drops out for good; each pass drops one, so this ends.
  for (;;) {
    const outcome = settleOrCollapse(circuit, graph);
    if ('assembled' in outcome) {
      const starved = mostStarved(circuit, outcome.assembled);
      if (starved !== null) {
        dropOut(starved);
        continue;
      }
      const { assembled } = outcome;
      return { circuit, graph, assembled, point: answer(circuit, graph, assembled, 'solved') };
    }
    const { nose } = outcome;
    const starved = nose.assembled === null ? null : mostStarved(circuit, nose.assembled);
    if (starved !== null) {
      dropOut(starved);
      continue;
    }
    return { circuit, graph, assembled: null, point: collapsed(circuit, graph, nose) };
  }
}

/** The sink furthest below its own minimum volts, in proportion; null when none is below. */
function mostStarved(circuit: Circuit, assembled: Assembled): Sink | null {
  let worst: Sink | null = null;
  let least = 1;
  for (const sink of circuit.sinks) {
    if (sink.state !== 'on' || sink.minimumV === undefined || sink.minimumV <= 0) continue;
    const { from, to } = sink.element;
    const ratio = (assembled.volts[from]! - assembled.volts[to]!) / sink.minimumV;
    if (ratio < least) {
      least = ratio;
      worst = sink;
    }
  }
  return worst;
}

function dropOut(sink: Sink): void {
  sink.state = 'dropped-out';
  sink.element.law = Law.none;
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

/** No answer to invent: names the load that gives way and the most it could have. */
function collapsed(circuit: Circuit, graph: GraphView, nose: Nose): OperatingPoint {
  const sink = nose.sink ?? circuit.sinks.find(isDemand);
  if (sink === undefined) throw new Defect('a case without constant-power or constant-current sinks has a solution');
  const part = circuit.parts[sink.element.partIndex]!;
  const wantedW = sink.element.law === Law.power ? sink.element.a : sink.element.a * Math.abs(sink.element.v);
  const othersAt = othersSolve(circuit, graph, sink) ? 1 : nose.share;
  const mostW = largestDeliverableW(circuit, graph, sink, othersAt);
  const others =
    othersAt === 1
      ? 'with everything else as drawn'
      : `even with everything else at ${Math.floor(100 * othersAt)} % of its draw`;
  const name = part.label === undefined ? part.id : `${part.id} (${part.label})`;
  const message = `${name} asks for ${wantedW.toPrecision(4)} W at its terminals; the network can deliver at most ${mostW.toPrecision(4)} W to it, ${others}. There is no operating point.`;
  const collapse: Collapse = { load: part.id, wantedW, largestDeliverableW: mostW, message };
  return answer(circuit, graph, null, 'collapse', collapse);
}

function othersSolve(circuit: Circuit, graph: GraphView, sink: Sink): boolean {
  const { law } = sink.element;
  sink.element.law = Law.none;
  startStates(circuit, graph);
  const { ok } = settle(circuit, graph, 1);
  sink.element.law = law;
  return ok;
}
