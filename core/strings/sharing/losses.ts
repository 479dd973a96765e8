/** What a bank can lose at a blow: a branch of strings, or a device that opens. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import type { Part, PartId, StringPart } from '../../job/part.ts';
import { buildCircuit, type CircuitRequest } from '../../network/circuit.ts';
import { readGraph } from '../../network/graph.ts';
import { isWiring, type SinglePart } from '../../network/wiring.ts';
import type { Bank } from '../banks.ts';

export interface Loss {
  readonly lost: PartId;
  readonly kind: 'string' | 'device';
  /** Strings that give nothing any more. */
  readonly without: readonly PartId[];
  /** The job and case as they then stand. */
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
}

/** The job without some strings: their branches open, what hangs on their terminals stays. */
export function withoutStrings(job: CheckedJob, ids: ReadonlySet<PartId>): CheckedJob {
  return { ...job, parts: job.parts.filter(({ id }) => !ids.has(id)) };
}

/** Each branch of a bank gone in turn. A branch of several strings goes by its first: losing any of them loses them all. */
export function stringLosses(bank: Bank, { job, operatingCase }: CircuitRequest): readonly Loss[] {
  return bank.branches.map(({ strings }) => {
    const without = strings.map(({ id }) => id);
    return { lost: without[0]!, kind: 'string', without, job: withoutStrings(job, new Set(without)), operatingCase };
  });
}

/**
 * Each fuse, breaker and switch that is closed in the case and whose opening leaves some strings of the bank with nothing to feed while
 * others still have: the bank then works on without them. One that cuts off the load instead is none of the bank's.
 */
export function deviceLosses(bank: Bank, parts: readonly SinglePart[], request: CircuitRequest): readonly Loss[] {
  return parts.flatMap((part): readonly Loss[] => {
    if (part.kind !== 'fuse' && part.kind !== 'breaker' && part.kind !== 'switch') return [];
    if (part.state === 'open') return [];
    const opened: Part = { ...part, state: 'open' };
    const { job, operatingCase } = request;
    const then = { ...operatingCase, changed: new Map([...operatingCase.changed, [part.id, opened]]) };
    const without = idleStrings(bank, { ...request, operatingCase: then });
    if (without.length === 0 || without.length === bank.strings.length) return [];
    return [{ lost: part.id, kind: 'device', without, job, operatingCase: then }];
  });
}

/**
 * Strings of a bank that share no loop with anything that takes or gives but strings. Where nothing is switched on, those that lie on
 * no loop at all.
 */
function idleStrings(bank: Bank, request: CircuitRequest): readonly PartId[] {
  const circuit = buildCircuit(request);
  const { block } = readGraph(circuit);
  const sizes = new Map<number, number>();
  const fed = new Set<number>();
  for (const { index, partIndex } of circuit.elements) {
    const part = circuit.parts[partIndex]!;
    const at = block[index]!;
    sizes.set(at, (sizes.get(at) ?? 0) + 1);
    if (part.kind !== 'string' && part.kind !== 'pair' && !isWiring(part)) fed.add(at);
  }
  const blocksOf = ({ id }: StringPart) =>
    circuit.elementsOfPart[circuit.parts.findIndex((part) => part.id === id)]!.map(({ index }) => block[index]!);
  const own = bank.strings.map((string) => ({ id: string.id, blocks: blocksOf(string) }));
  const feeds = (blocks: readonly number[]) => blocks.some((at) => fed.has(at));
  const isOnLoop = (blocks: readonly number[]) => blocks.some((at) => sizes.get(at)! > 1);
  const works = own.some(({ blocks }) => feeds(blocks)) ? feeds : isOnLoop;
  return own.flatMap(({ id, blocks }) => (works(blocks) ? [] : [id]));
}
