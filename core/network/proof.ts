/** The sums that prove an answer: Kirchhoff's two rules and the balance of power, taken from the currents and volts as answered. */
import type { Proof } from './answer.ts';
import type { Reader } from './answers.ts';
import { DisjointSets } from './disjointSets.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';

/** Bounds that every printed answer meets: A a junction per A carried, V a loop per V, W per W of throughput. */
export const JUNCTION_BOUND = 1e-9;
export const LOOP_BOUND = 1e-9;
export const POWER_BOUND = 1e-8;

export function proveAnswer(reader: Reader, iterations: number): Proof {
  const junction = junctionRemainders(reader);
  const loop = worstLoop(reader);
  const power = powerBalance(reader);
  const mismatchW = power.inW - power.outW - power.heatW;
  const relativeResidual = junction.worst / Math.max(junction.largestA, LEAST_A);
  const holds =
    (relativeResidual < JUNCTION_BOUND || junction.worst <= junction.roundingA) &&
    loop.worst < LOOP_BOUND * Math.max(1, loop.largestV) &&
    (Math.abs(mismatchW) < POWER_BOUND * Math.max(1, power.inW) || Math.abs(mismatchW) <= junction.roundingW);
  return {
    worstJunctionA: junction.worst,
    worstJunction: junction.at < 0 ? null : reader.circuit.junctions[junction.at]!,
    worstLoopV: loop.worst,
    powerInW: power.inW,
    powerOutW: power.outW,
    heatW: power.heatW,
    mismatchW,
    relativeResidual,
    iterations,
    holds,
  };
}

/** Currents are judged against at least this: a bank at rest carries none. */
const LEAST_A = 1;

/** Sum of the currents that leave each junction; where ties side by side leave a current open, over the junctions they join. */
function junctionRemainders(reader: Reader): {
  worst: number;
  at: number;
  largestA: number;
  roundingA: number;
  roundingW: number;
} {
  const { circuit } = reader;
  const n = circuit.junctions.length;
  const joined = new DisjointSets(n);
  const sums = new Float64Array(n);
  let largestA = 0;
  let roundingA = 0;
  for (const element of circuit.elements) {
    const i = reader.currentIn(element);
    // A current through a very small resistance is known no better than the last place of the volts at its ends.
    const volts = Math.abs(reader.voltsOf(element.from) ?? 0) + Math.abs(reader.voltsOf(element.to) ?? 0);
    if (element.law !== Law.tie && element.law !== Law.none) {
      roundingA = Math.max(roundingA, 2 ** -48 * Math.abs(element.slope) * volts);
    }
    if (i === null) {
      joined.join(element.from, element.to);
      continue;
    }
    sums[element.from]! += i;
    sums[element.to]! -= i;
    largestA = Math.max(largestA, Math.abs(i));
  }
  const totals = new Float64Array(n);
  for (let j = 0; j < n; j++) totals[joined.find(j)]! += sums[j]!;
  let worst = 0;
  let at = -1;
  for (let j = 0; j < n; j++) {
    if (Math.abs(totals[j]!) > worst) {
      worst = Math.abs(totals[j]!);
      at = j;
    }
  }
  // By Tellegen's theorem the power that is missing is the sum, over the junctions, of volts times what the currents lack.
  const totalV = Array.from({ length: n }, (_, j) => Math.abs(reader.voltsOf(j) ?? 0)).reduce((sum, v) => sum + v, 0);
  return { worst, at, largestA, roundingA, roundingW: roundingA * totalV };
}

/**
 * Round any loop the volts that the parts' own laws give must cancel. With one potential a junction that comes down to each
 * element: the volts its law gives for its current against the difference of potentials.
 */
function worstLoop(reader: Reader): { worst: number; largestV: number } {
  let worst = 0;
  let largestV = 0;
  for (const element of reader.circuit.elements) {
    if (element.law === Law.none) continue;
    const v = reader.voltsAcross(element);
    if (v === null) continue;
    largestV = Math.max(largestV, Math.abs(v));
    const byLaw = lawVolts(element);
    if (byLaw !== null) worst = Math.max(worst, Math.abs(byLaw - v));
  }
  return { worst, largestV };
}

function lawVolts({ law, a, b, i }: Element): number | null {
  switch (law) {
    case Law.conductance:
      return i / a;
    case Law.emf:
      return b + i / a;
    case Law.warming:
      return (a + b * i * i) * i;
    case Law.power:
      return i === 0 ? null : a / i;
    case Law.powerSource:
      return i === 0 ? null : -a / i;
    case Law.tie:
      return b;
    default:
      return null;
  }
}

/** Power in from EMFs, arrays and chargers; out to loads and to EMFs under charge; heat in every resistance and in converters. */
function powerBalance(reader: Reader): { inW: number; outW: number; heatW: number } {
  const total = { inW: 0, outW: 0, heatW: 0 };
  const { circuit } = reader;
  circuit.parts.forEach((part, index) => {
    for (const element of circuit.elementsOfPart[index]!) {
      const i = reader.currentIn(element);
      const v = reader.voltsAcross(element);
      if (i === null || v === null || element.law === Law.none) continue;
      switch (part.kind) {
        case 'string':
          addSource(total, -i * element.b);
          total.heatW += (i * i) / element.a;
          break;
        case 'array':
        case 'charger':
          addSource(total, -i * v);
          break;
        case 'load':
        case 'inverter':
          total.outW += i * v;
          break;
        default:
          // Two-ended parts turn it to heat; the input and output of a converter add up to its loss.
          total.heatW += i * v;
      }
    }
  });
  return total;
}

function addSource(total: { inW: number; outW: number }, powerW: number): void {
  if (powerW >= 0) total.inW += powerW;
  else total.outW -= powerW;
}
