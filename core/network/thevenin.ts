/** The network seen from two of its junctions. */
import type { JunctionId } from '../job/part.ts';
import { Linearised } from './linearised.ts';
import type { SolvedCircuit } from './operatingPoint.ts';

export interface Thevenin {
  /** Volts between the two junctions as the case stands, V. */
  readonly openV: number;
  /** -dV/dI for a small current drawn there, ohm. */
  readonly resistanceOhm: number;
}

/**
 * Thévenin source between two junctions, linearised at the operating point: exact for a network of EMFs, resistances and set
 * currents, the small-signal figure where constant powers, arrays or warming cables take part. `null` where the two are not
 * in one supplied island.
 */
export function theveninAt(
  solved: SolvedCircuit,
  between: { readonly plus: JunctionId; readonly minus: JunctionId },
  linearised?: Linearised,
): Thevenin | null {
  const { assembled, circuit, graph } = solved;
  const plus = circuit.junctionIndex.get(between.plus);
  const minus = circuit.junctionIndex.get(between.minus);
  if (assembled === null || plus === undefined || minus === undefined) return null;
  if (graph.island[plus]! < 0 || graph.island[plus] !== graph.island[minus]) return null;
  const { node, size, group } = assembled.reduction;
  if (group[plus] !== group[minus]) return null;
  const b = new Float64Array(size);
  const p = node[plus]!;
  const q = node[minus]!;
  if (p >= 0) b[p]! += 1;
  if (q >= 0) b[q]! -= 1;
  const x = (linearised ?? new Linearised(assembled)).solve(b);
  const resistanceOhm = (p >= 0 ? x[p]! : 0) - (q >= 0 ? x[q]! : 0);
  return { openV: assembled.volts[plus]! - assembled.volts[minus]!, resistanceOhm };
}
