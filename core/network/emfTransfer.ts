/** How the EMF of each source of a solved circuit drives the current of each other. */
import { Defect } from '../job/issue.ts';
import type { PartId } from '../job/part.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { Assembled } from './newton.ts';
import type { SolvedCircuit } from './operatingPoint.ts';

/** One source: strings in series, or one alone. */
export interface DrivenSource {
  readonly emfV: number;
  /**
   * Out of plus: the mean over its EMFs, each weighted by its part of `emfV`, so that emfV × currentA is the power that they give.
   * Where nothing is tapped between them all carry the same.
   */
  readonly currentA: number;
}

export interface EmfTransfer {
  readonly sources: readonly DrivenSource[];
  /** H_ij = dI_i/dE_j, siemens: by rows i. */
  readonly siemens: readonly (readonly number[])[];
}

/**
 * Superposition in a solved circuit: I_i = Σ_j H_ij E_j + what sources that are not in the list drive. Every conductor counts with
 * its *secant* conductance i/v (one that warms with its load: 1/(a + b i²) at its present current), so the sum is exact although the
 * network is not linear; held volts, set currents and constant powers belong to the rest. In a reciprocal network H is symmetric.
 *
 * `sources` lists strings by source; a string with a midpoint is two EMFs of half its volts. Null where the circuit has no solution.
 */
export function emfTransfer(solved: SolvedCircuit, sources: readonly (readonly PartId[])[]): EmfTransfer | null {
  const { assembled } = solved;
  if (assembled === null) return null;
  const pieces = sources.map((strings) => piecesOf(solved, strings));
  const slopes = assembled.active.map(({ slope }) => slope);
  for (const element of assembled.active) element.slope = secant(element);
  const changes = assembled.isHighBranch() ? pieces.map((of) => voltsDrivenBy(assembled, of)) : null;
  assembled.active.forEach((element, k) => {
    element.slope = slopes[k]!;
  });
  if (changes === null) return null;
  return {
    sources: pieces.map((of) => ({
      emfV: of.reduce((sum, { element }) => sum + element.b, 0),
      currentA: of.reduce((sum, { element, weight }) => sum - weight * element.i, 0),
    })),
    siemens: pieces.map((of, i) =>
      changes.map((volts, j) => of.reduce((sum, piece) => sum + piece.weight * driven(piece, volts, i === j), 0)),
    ),
  };
}

/** One EMF of a source, and its part of the source's volts. */
interface Piece {
  readonly element: Element;
  readonly weight: number;
}

function piecesOf({ circuit }: SolvedCircuit, strings: readonly PartId[]): readonly Piece[] {
  const elements = strings.flatMap((id) => {
    const index = circuit.parts.findIndex((part) => part.id === id);
    if (index < 0) throw new Defect(`a source of the list is in the circuit (${id})`);
    return circuit.elementsOfPart[index]!;
  });
  const emfV = elements.reduce((sum, { b }) => sum + b, 0);
  return elements.map((element) => ({ element, weight: element.b / emfV }));
}

function secant({ law, a, b, i }: Element): number {
  switch (law) {
    case Law.conductance:
    case Law.emf:
      return a;
    case Law.warming:
      return 1 / (a + b * i * i);
    default:
      return 0;
  }
}

/** Change of the unknowns for one volt more of a source, each of its EMFs by its weight. */
function voltsDrivenBy(assembled: Assembled, pieces: readonly Piece[]) {
  const { node, size } = assembled.reduction;
  const b = new Float64Array(size);
  const put = (j: number, currentA: number): void => {
    if (node[j]! >= 0) b[node[j]!]! += currentA;
  };
  for (const { element, weight } of pieces) {
    put(element.from, element.a * weight);
    put(element.to, -element.a * weight);
  }
  const x = new Float64Array(size);
  assembled.solveLinear(b, x);
  return (j: number) => (node[j]! >= 0 ? x[node[j]!]! : 0);
}

/** Change of one EMF's current, out of plus: a (its own volt, where it is one of those raised, less what its ends rise by). */
function driven({ element, weight }: Piece, volts: (j: number) => number, isRaised: boolean): number {
  return element.a * ((isRaised ? weight : 0) - (volts(element.from) - volts(element.to)));
}
