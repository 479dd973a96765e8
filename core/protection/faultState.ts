/** A bolted short between two junctions of a fault network, with what flows everywhere. */
import type { PartId } from '../job/part.ts';
import type { Circuit } from '../network/circuit.ts';
import type { Element } from '../network/element.ts';
import type { FaultShare } from './answer.ts';
import type { LimitedSource } from './faultSources.ts';

export interface FaultState {
  /** Through the short, from `at` to `to`. */
  readonly currentA: number;
  readonly openV: number;
  readonly sourceOhm: number;
  /** Through a part from `from` to `to`, out of `plus` for a source. Null where zero-ohm parts side by side leave it open. */
  through(part: PartId): number | null;
  shares(): readonly FaultShare[];
}

/** Below this nothing is said to flow, A: rounding of sums of thousands of amperes. */
export const NOTHING_A = 1e-6;

/** What a solved short must tell to be read. */
export interface SolvedShort {
  readonly circuit: Circuit;
  readonly placeOf: ReadonlyMap<PartId, number>;
  readonly limited: readonly LimitedSource[];
  readonly head: Pick<FaultState, 'currentA' | 'openV' | 'sourceOhm'>;
  /** From `from` to `to`; null where it is not determined. */
  currentIn(element: Element): number | null;
  /** Out of plus, for a limited source. */
  givenBy(source: LimitedSource): number;
}

export function faultState(solved: SolvedShort): FaultState {
  const { circuit, placeOf, limited, head } = solved;
  const through = (part: PartId): number | null => {
    const source = limited.find((each) => each.part === part);
    if (source !== undefined) return solved.givenBy(source);
    const place = placeOf.get(part);
    const element = place === undefined ? undefined : circuit.elementsOfPart[place]![0];
    if (element === undefined) return 0;
    const current = solved.currentIn(element);
    return current === null ? null : circuit.parts[place!]!.kind === 'string' ? -current : current;
  };
  const shares = (): readonly FaultShare[] => [
    ...circuit.parts.flatMap(({ id, kind }) => (kind === 'string' ? [{ part: id, currentA: through(id) ?? 0 }] : [])),
    ...limited.map((source) => ({ part: source.part, currentA: solved.givenBy(source) })),
  ];
  return { ...head, through, shares: () => shares().filter(({ currentA }) => Math.abs(currentA) > NOTHING_A) };
}
