/**
 * A network that cannot deliver what its constant-power loads ask for: which load, and the most it could have. The load is
 * replaced by a conductance and its power g v(g)^2 is followed to its maximum (the nose of the curve), where a power setting
 * would stall: along the conductance every point has one plain solution.
 */
import type { Circuit, Sink } from './circuit.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import type { Assembled } from './newton.ts';
import { isDemand, settle, startStates } from './settle.ts';

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
export function largestDeliverableW(circuit: Circuit, graph: GraphView, sink: Sink, share: number): number {
  const { element } = sink;
  const { law, a } = element;
  const powerAt = (logG: number): number => {
    element.law = Law.conductance;
    element.a = Math.exp(logG);
    startStates(circuit, graph);
    const trial = settle(circuit, graph, share);
    if (!trial.ok) return -1;
    const v = trial.assembled.volts[element.from]! - trial.assembled.volts[element.to]!;
    return element.a * v * v;
  };
  const best = maximise(powerAt, Math.log(SMALLEST_SIEMENS), Math.log(LARGEST_SIEMENS));
  element.law = law;
  element.a = a;
  return Math.max(0, best);
}

/** From one microampere a volt to a micro-ohm short: every load of this trade lies between. */
const SMALLEST_SIEMENS = 1e-6;
const LARGEST_SIEMENS = 1e6;
const SCAN_POINTS = 40;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

function maximise(f: (x: number) => number, low: number, high: number): number {
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
  return Math.max(best, fp, fq);
}
