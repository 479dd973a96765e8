/** The networks that a study of faults asks: the most and the least that can flow, at the first instant and settled. */
import { partsInCase } from '../job/job.ts';
import type { JunctionId, PartId } from '../job/part.ts';
import { buildCircuit } from '../network/circuit.ts';
import { readGraph } from '../network/graph.ts';
import { type SinglePart, withoutPairs } from '../network/wiring.ts';
import type { FaultCurrent } from './answer.ts';
import { faultBanks } from './faultBanks.ts';
import { FaultNetwork } from './faultNetwork.ts';
import { type FaultRequest, type LimitedSource, limitedSources } from './faultSources.ts';
import { NOTHING_A } from './faultState.ts';

/** A network at both moments; for `plain` the two are one. */
export interface FaultPair {
  readonly first: FaultNetwork;
  readonly settled: FaultNetwork;
}

export interface FaultModel {
  readonly request: FaultRequest;
  /** As they stand in the case, an out-and-back run as its two cables. */
  readonly parts: readonly SinglePart[];
  readonly most: FaultPair;
  /** One for each bank that can be left connected alone. */
  readonly least: readonly FaultPair[];
  readonly limited: readonly LimitedSource[];
  readonly junctions: readonly JunctionId[];
  /** The junction at 0 V of each junction's island, as a solve of the case has it. */
  readonly referenceOf: ReadonlyMap<JunctionId, JunctionId>;
}

/** The earth of bonds. */
export const EARTH_JUNCTION = 'earth' as JunctionId;

/** Runs `use` on the networks of a case, and gives their memory back. */
export function withFaultModel<Answer>(request: FaultRequest, use: (model: FaultModel) => Answer): Answer {
  const parts = withoutPairs(partsInCase(request.job, request.operatingCase));
  const { junctions, referenceOf, gives } = drawnIslands(request);
  const limited = limitedSources(request).filter(({ part }) => gives.has(part));
  const networks: FaultNetwork[] = [];
  const build = (most: boolean, settled: boolean, strings?: ReadonlySet<PartId>): FaultNetwork => {
    const moment = { most, settled };
    const network = new FaultNetwork({ ...request, moment, ...(strings && { strings }) }, most ? limited : []);
    networks.push(network);
    return network;
  };
  const pair = (most: boolean, strings?: ReadonlySet<PartId>): FaultPair => {
    const first = build(most, false, strings);
    return { first, settled: request.method === 'plain' ? first : build(most, true, strings) };
  };
  const banks = faultBanks(parts);
  let most: FaultPair | undefined;
  let least: readonly FaultPair[] | undefined;
  // Built when first asked for: a study of the most alone does without the others.
  const answer = use({
    request,
    parts,
    get most() {
      most ??= pair(true);
      return most;
    },
    get least() {
      least ??= banks.length < 2 ? [pair(false)] : banks.map((bank) => pair(false, bank));
      return least;
    },
    limited,
    junctions,
    referenceOf,
  });
  for (const network of networks) network.release();
  return answer;
}

/** Islands and their 0 V by the drawing with everything on, and the electronic sources that anything feeds. */
function drawnIslands({ job, operatingCase, tables }: FaultRequest) {
  const circuit = buildCircuit({ job, operatingCase, tables, model: 'fast' });
  const graph = readGraph(circuit);
  const referenceOf = new Map<JunctionId, JunctionId>();
  circuit.junctions.forEach((id, j) => {
    const island = graph.island[j]!;
    if (island >= 0) referenceOf.set(id, circuit.junctions[graph.reference[island]!]!);
  });
  const gives = new Set<PartId>();
  circuit.parts.forEach(({ id, kind }, index) => {
    const elements = circuit.elementsOfPart[index]!;
    const output = elements.find(({ role }) => role === 'output') ?? elements[0];
    if (output === undefined) return;
    const isCoupler = kind === 'converter' || kind === 'controller';
    const asks = isCoupler ? elements.find(({ role }) => role === 'input')! : output;
    // A converter or controller gives what its input takes: it needs a loop with a source there.
    if (!isCoupler || graph.blockIsLive[graph.block[asks.index]!]!) gives.add(id);
  });
  return { junctions: circuit.junctions, referenceOf, gives };
}

/** A current by the two moments; `null` where neither network reaches the two junctions. */
export function faultCurrent(pair: FaultPair, at: JunctionId, to: JunctionId): FaultCurrent | null {
  const first = pair.first.fault(at, to);
  if (first === null) return null;
  const settled = pair.settled === pair.first ? first : pair.settled.fault(at, to);
  return {
    firstA: amount(first.currentA),
    settledA: amount((settled ?? first).currentA),
    openV: first.openV,
    sourceOhm: first.sourceOhm,
    shares: first.shares(),
  };
}

/** The least over the banks that send anything; the first that reaches where none does. */
export function leastCurrent(model: FaultModel, at: JunctionId, to: JunctionId): FaultCurrent | null {
  let least: FaultCurrent | null = null;
  for (const pair of model.least) {
    const current = faultCurrent(pair, at, to);
    if (current === null) continue;
    if (least === null || least.firstA === 0 || (current.firstA > 0 && current.firstA < least.firstA)) least = current;
  }
  return least;
}

export function amount(currentA: number): number {
  const size = Math.abs(currentA);
  return size < NOTHING_A ? 0 : size;
}
