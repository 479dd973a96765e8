/** A bank by itself: branches, the wire between them, and set currents at its taps. Small and dense, factored once for all taps. */
import { Defect } from '../../job/issue.ts';
import { DenseLu } from '../../linear/denseLu.ts';
import { DisjointSets } from '../../network/disjointSets.ts';

interface BankSource {
  readonly plus: number;
  readonly minus: number;
  readonly emfV: number;
  readonly ohm: number;
}
export interface BankWire {
  readonly a: number;
  readonly b: number;
  readonly ohm: number;
}
/** Nodes are numbered from 0. Plus and minus sides meet in sources only. */
export interface BankNetwork {
  readonly nodes: number;
  readonly sources: readonly BankSource[];
  readonly wires: readonly BankWire[];
}

/** A set current, out of the bank at `plus` and back at `minus`. */
export interface BankDraw {
  readonly plus: number;
  readonly minus: number;
  readonly currentA: number;
}

interface BankFlow {
  /** Of each source, out of its plus. */
  readonly currentsA: readonly number[];
  /** In sources and wires, W. */
  readonly heatW: number;
  /** Between two nodes, V. */
  readonly between: (plus: number, minus: number) => number;
}

/**
 * Nodal analysis with Norton equivalents: G v = i. Wires of no resistance make their nodes one. All EMFs are taken from their mean, which
 * shifts the plus side as a whole and keeps the digits for the differences.
 */
export class FactoredBank {
  private readonly network: BankNetwork;
  private readonly node: Int32Array;
  private readonly lu: DenseLu;
  private readonly scale: number;
  private readonly meanEmfV: number;

  constructor(network: BankNetwork) {
    this.network = network;
    const { sources, wires, nodes } = network;
    const sets = new DisjointSets(nodes);
    for (const { a, b, ohm } of wires) if (ohm === 0) sets.join(a, b);
    this.node = sets.groups();
    this.meanEmfV = sources.reduce((sum, { emfV }) => sum + emfV, 0) / sources.length;
    const g = new Float64Array(nodes * nodes);
    const stamp = (a: number, b: number, siemens: number) => {
      const [p, q] = [this.node[a]!, this.node[b]!];
      if (p === q) return;
      g[p * nodes + p]! += siemens;
      g[q * nodes + q]! += siemens;
      g[p * nodes + q]! -= siemens;
      g[q * nodes + p]! -= siemens;
    };
    for (const { plus, minus, ohm } of sources) stamp(plus, minus, 1 / ohm);
    for (const { a, b, ohm } of wires) if (ohm > 0) stamp(a, b, 1 / ohm);
    this.scale = g.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
    this.lu = new DenseLu(nodes);
    this.lu.a.set(g.map((entry) => entry / this.scale));
    const reference = this.reference;
    // Nodes merged into others, and the one that is 0 V, keep an equation of their own: v = 0.
    for (let k = 0; k < nodes; k++) {
      if (this.node[k] === k && k !== reference) continue;
      for (let j = 0; j < nodes; j++) {
        this.lu.a[k * nodes + j] = 0;
        this.lu.a[j * nodes + k] = 0;
      }
      this.lu.a[k * nodes + k] = 1;
    }
    if (!this.lu.factor()) throw new Defect('a bank of real strings, all joined, has a solution');
  }

  flow(draws: readonly BankDraw[]): BankFlow {
    const { node, scale, meanEmfV } = this;
    const { sources, wires, nodes } = this.network;
    const v = new Float64Array(nodes);
    const inject = (plus: number, minus: number, currentA: number) => {
      v[node[plus]!]! += currentA / scale;
      v[node[minus]!]! -= currentA / scale;
    };
    for (const { plus, minus, emfV, ohm } of sources) inject(plus, minus, (emfV - meanEmfV) / ohm);
    for (const { plus, minus, currentA } of draws) inject(plus, minus, -currentA);
    for (let k = 0; k < nodes; k++) if (node[k] !== k || k === this.reference) v[k] = 0;
    this.lu.solve(v);
    const across = (a: number, b: number) => v[node[a]!]! - v[node[b]!]!;
    const currentsA = sources.map(({ plus, minus, emfV, ohm }) => (emfV - meanEmfV - across(plus, minus)) / ohm);
    const inSources = sources.reduce((sum, { ohm }, k) => sum + currentsA[k]! ** 2 * ohm, 0);
    const inWires = wires.reduce((sum, { a, b, ohm }) => (ohm > 0 ? sum + across(a, b) ** 2 / ohm : sum), 0);
    return { currentsA, heatW: inSources + inWires, between: (plus, minus) => meanEmfV + across(plus, minus) };
  }

  private get reference(): number {
    return this.node[this.network.sources[0]!.minus]!;
  }
}
