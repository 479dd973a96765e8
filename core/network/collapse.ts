/**
 * A network that cannot deliver what its constant-power loads ask for: which load, and the most it could have. The load is
 * replaced by a conductance and its power g v(g)^2 is followed to its maximum (the nose of the curve), where a power setting
 * would stall: along the conductance every point has one plain solution.
 */
import type { Circuit, Sink } from './circuit.ts';
import { disagreements } from './disagree.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { Assembled } from './newton.ts';
import { isDemand, settle } from './settle.ts';
import { startStates } from './startStates.ts';
import { reduce } from './ties.ts';
import { trackMaximumPower } from './track.ts';

export interface Nose {
  /** The largest share of all sinks' figures that still has a solution, within 1e-3. */
  readonly share: number;
  /** The solution there. */
  readonly assembled: Assembled | null;
  /** The sink whose volts give way. */
  readonly sink: Sink | null;
}

/** Solves at full load, creeping up from no load where Newton's method alone does not get there. */
export function settleOrCollapse(circuit: Circuit, graph: GraphView): { assembled: Assembled } | { nose: Nose } {
  startStates(circuit, graph);
  const full = settle(circuit, graph, 1);
  if (full.ok) return { assembled: full.assembled };
  let low = 0;
  let high = 1;
  let best: Assembled | null = null;
  while (high - low > 1e-3) {
    const share = 0.5 * (low + high);
    startStates(circuit, graph);
    const trial = settle(circuit, graph, share);
    if (trial.ok) {
      low = share;
      best = trial.assembled;
    } else high = share;
  }
  if (best === null) {
    startStates(circuit, graph);
    const idle = settle(circuit, graph, 0);
    if (idle.ok) best = idle.assembled;
  }
  if (best !== null) best.evaluateAll(low);
  const sink = best === null ? null : weakest(circuit, best);
  return { nose: { share: low, assembled: best, sink } };
}

/**
 * The sink that tips the network over. As all sinks grow together the volts change by z = dV/d(share); near the nose z is the
 * direction in which the conductance matrix loses its grip, and a constant power P at v volts takes P / v^2 times z^2 of it.
 * The largest such share names the load; among set currents alone, the largest drop of power.
 */
function weakest(circuit: Circuit, assembled: Assembled): Sink | null {
  const { node, size } = assembled.reduction;
  const sinks = circuit.sinks.filter((sink) => sink.state === 'on' && isDemand(sink));
  const dead = sinks.find((sink) => !(sink.element.v > 1e-9));
  if (dead !== undefined) return dead;
  assembled.isHighBranch();
  const b = new Float64Array(size);
  for (const { element } of sinks) {
    if (node[element.from]! >= 0) b[node[element.from]!]! -= element.i;
    if (node[element.to]! >= 0) b[node[element.to]!]! += element.i;
  }
  assembled.solveLinear(b, b);
  const powers = sinks.some((sink) => sink.element.law === Law.power);
  let worst: Sink | null = null;
  let steepest = Number.NEGATIVE_INFINITY;
  for (const sink of sinks) {
    const p = node[sink.element.from]!;
    const q = node[sink.element.to]!;
    const z = (p >= 0 ? b[p]! : 0) - (q >= 0 ? b[q]! : 0);
    const share = powers ? -sink.element.slope * z * z : Math.abs(sink.element.i * z);
    if (share > steepest) {
      steepest = share;
      worst = sink;
    }
  }
  return worst;
}

/**
 * The largest power that the network can deliver to one sink, the other sinks at `share` of their figures: maximum over g of
 * g v(g)^2, by a coarse scan of g on a logarithmic scale and golden-section search around its best point. For one source of
 * EMF E behind R this is E^2 / (4 R). Units W; 0 when nothing can be delivered.
 */
export function largestDeliverableW(circuit: Circuit, graph: GraphView, sink: Sink, share: number): Peak {
  const { element } = sink;
  const { law, a } = element;
  const powerAt = (logG: number) => asConductance(circuit, graph, sink, { logG, share }).powerW;
  const peak = maximise(powerAt, Math.log(SMALLEST_SIEMENS), Math.log(LARGEST_SIEMENS));
  element.law = law;
  element.a = a;
  return { powerW: Math.max(0, peak.value), logG: peak.x };
}

/** The most power, and the logarithm of the conductance in siemens that takes it. */
export interface Peak {
  readonly powerW: number;
  readonly logG: number;
}

function asConductance(
  circuit: Circuit,
  graph: GraphView,
  { element }: Sink,
  { logG, share }: { readonly logG: number; readonly share: number },
): { powerW: number; assembled: Assembled | null } {
  element.law = Law.conductance;
  element.a = Math.exp(logG);
  startStates(circuit, graph);
  const trial = settle(circuit, graph, share);
  if (!trial.ok) return { powerW: -1, assembled: null };
  const v = trial.assembled.volts[element.from]! - trial.assembled.volts[element.to]!;
  return { powerW: element.a * v * v, assembled: trial.assembled };
}

/**
 * The operating point of a network whose one awkward constant-power sink asks for less than the most it could have: the conductance that
 * takes as much, on the side of the higher volts, shows the states and the volts; from there the sink itself is solved.
 * Null where the states do not hold with the sink as it is.
 */
export function solveFromConductance(circuit: Circuit, graph: GraphView, sink: Sink, peak: Peak): Assembled | null {
  const { element } = sink;
  const { law, a } = element;
  let low = Math.log(SMALLEST_SIEMENS);
  let high = peak.logG;
  let near: Assembled | null = null;
  for (let pass = 0; pass < 60; pass++) {
    const middle = 0.5 * (low + high);
    const { powerW, assembled } = asConductance(circuit, graph, sink, { logG: middle, share: 1 });
    if (assembled !== null) near = assembled;
    if (powerW < a) low = middle;
    else high = middle;
  }
  element.law = law;
  element.a = a;
  const reduction = near === null ? null : reduce(circuit, graph);
  if (near === null || reduction === null || !reduction.ok) return null;
  const assembled = new Assembled(circuit, reduction.value);
  assembled.volts.set(near.volts);
  if (!assembled.solve(1) || !trackMaximumPower(assembled, 1)) return null;
  assembled.coupling.balance();
  return disagreements(circuit, assembled).length === 0 ? assembled : null;
}

/** From one microampere a volt to a micro-ohm short: every load of this trade lies between. */
const SMALLEST_SIEMENS = 1e-6;
const LARGEST_SIEMENS = 1e6;
const SCAN_POINTS = 40;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

function maximise(f: (x: number) => number, low: number, high: number): { value: number; x: number } {
  const width = (high - low) / SCAN_POINTS;
  let bestX = low;
  let best = Number.NEGATIVE_INFINITY;
  for (let k = 0; k <= SCAN_POINTS; k++) {
    const value = f(low + k * width);
    if (value > best) {
      best = value;
      bestX = low + k * width;
    }
  }
  let left = bestX - width;
  let right = bestX + width;
  let p = right - GOLDEN * (right - left);
  let q = left + GOLDEN * (right - left);
  let fp = f(p);
  let fq = f(q);
  while (right - left > 1e-5) {
    if (fp >= fq) {
      [right, q, fq] = [q, p, fp];
      p = right - GOLDEN * (right - left);
      fp = f(p);
    } else {
      [left, p, fp] = [p, q, fq];
      q = left + GOLDEN * (right - left);
      fq = f(q);
    }
  }
  if (best >= fp && best >= fq) return { value: best, x: bestX };
  return fp >= fq ? { value: fp, x: p } : { value: fq, x: q };
}
