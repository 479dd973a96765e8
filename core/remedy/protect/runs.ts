/** Conductor runs of a drawing: what carries one current from branch to branch, both poles of a load or source together. */
import type { CheckContext } from '../../checks/checkContext.ts';
import { titleOf } from '../../checks/wording.ts';
import { type JunctionId, nameOf, type PartId } from '../../job/part.ts';
import type { PoledPart, SinglePart, WiringPart } from '../../network/wiring.ts';
import { isDevice, isWiring, joined } from '../../network/wiring.ts';

/** `load`: to what takes current; `string`, `charger`: leads of a source; `feeder`: between branches. */
export type RunRole = 'load' | 'string' | 'charger' | 'feeder';

export interface Run {
  /** The load or source that it leads to, or its first part. */
  readonly id: PartId;
  readonly role: RunRole;
  /** `Load L1 (fridge)`, `Feeder C3`. */
  readonly title: string;
  /** Ids as the file has them: an out-and-back run once. */
  readonly conductors: readonly PartId[];
  readonly cables: readonly PartId[];
  readonly devices: readonly PartId[];
}

interface Chain {
  readonly parts: readonly WiringPart[];
  /** What the chain ends on where it ends on a single terminal. */
  readonly terminals: readonly PoledPart[];
}

/** Every run with a cable or a device in it, in the order of the drawing. */
export function runsOf(context: CheckContext): readonly Run[] {
  const groups = new Map<string, Chain[]>();
  const groupOfPair = new Map<string, string>();
  for (const chain of chainsOf(context)) {
    const pair = chain.parts.map(({ id }) => pairOf(id)).find((id) => id !== undefined && groupOfPair.has(id));
    const terminal = terminalOf(chain);
    const key = terminal?.id ?? (pair === undefined ? chain.parts[0]!.id : groupOfPair.get(pair)!);
    for (const { id } of chain.parts) {
      const own = pairOf(id);
      if (own !== undefined && !groupOfPair.has(own)) groupOfPair.set(own, key);
    }
    groups.set(key, [...(groups.get(key) ?? []), chain]);
  }
  return [...groups.values()].map(runFrom).filter(({ cables, devices }) => cables.length + devices.length > 0);
}

/** The pair that a conductor belongs to. */
function pairOf(id: PartId): string | undefined {
  return /^(.*)\.(?:plus|minus)$/.exec(id)?.[1];
}

/** The id that the file has for a cable. */
export function inFile(id: PartId, context: CheckContext): PartId {
  const isOwn = context.job.parts.some((part) => part.id === id);
  return isOwn ? id : ((pairOf(id) ?? id) as PartId);
}

function runFrom(chains: readonly Chain[]): Run {
  const parts = chains.flatMap((chain) => chain.parts);
  const cables = parts.filter(({ kind }) => kind === 'cable').map(({ id }) => id);
  const devices = parts.filter(isDevice).map(({ id }) => id);
  const conductors = [...new Set(cables.map((id) => (pairOf(id) ?? id) as PartId))];
  const terminal = chains.map(terminalOf).find((part) => part !== undefined);
  const base = { cables, devices, conductors };
  if (terminal !== undefined) return { ...base, id: terminal.id, role: roleOf(terminal), title: titleOf(terminal) };
  const first = parts.find(({ kind }) => kind === 'cable') ?? parts.find(isDevice) ?? parts[0]!;
  return { ...base, id: first.id, role: 'feeder', title: `Feeder ${nameOf(first)}` };
}

function roleOf({ kind }: PoledPart): RunRole {
  if (kind === 'string') return 'string';
  return kind === 'load' || kind === 'inverter' ? 'load' : 'charger';
}

/** A lead between a string and something else belongs to the other. */
function terminalOf({ terminals }: Chain): PoledPart | undefined {
  return terminals.find(({ kind }) => kind !== 'string') ?? terminals[0];
}

/** True for a cable between two places where strings or their own leads end: a link of a bank, whichever bars lie beside it. */
export function isLink(context: CheckContext, cable: PartId): boolean {
  const chains = chainsOf(context);
  const chain = chains.find(({ parts }) => parts.some(({ id }) => id === cable));
  const ends = chain === undefined ? [] : endsOf(chain.parts);
  const leads = chains.filter((one) => one !== chain && terminalOf(one)?.kind === 'string');
  const places = new Set(leads.flatMap(({ parts }) => endsOf(parts)));
  return ends.length === 2 && ends.every((end) => places.has(end) || endsAtString(context, end));
}

function endsAtString({ meetings }: CheckContext, junction: JunctionId): boolean {
  return (meetings.get(junction) ?? []).some(({ part }) => part.kind === 'string');
}

const ofContext = new WeakMap<CheckContext, readonly Chain[]>();

function chainsOf(context: CheckContext): readonly Chain[] {
  let chains = ofContext.get(context);
  if (chains === undefined) {
    chains = findChains(context);
    ofContext.set(context, chains);
  }
  return chains;
}

function findChains({ drawn, meetings }: CheckContext): readonly Chain[] {
  const seen = new Set<PartId>();
  const chains: Chain[] = [];
  for (const part of drawn) {
    if (seen.has(part.id) || !isInLine(part)) continue;
    seen.add(part.id);
    const before = follow(part, joined(part)[0]!);
    const after = follow(part, joined(part)[1]!);
    const terminals = [before.terminal, after.terminal].filter((end) => end !== undefined);
    before.parts.reverse();
    chains.push({ parts: [...before.parts, part, ...after.parts], terminals });
  }
  return chains;

  function follow(start: WiringPart, end: JunctionId): { parts: WiringPart[]; terminal: PoledPart | undefined } {
    const parts: WiringPart[] = [];
    let [last, junction]: [SinglePart, JunctionId] = [start, end];
    for (;;) {
      const ends = meetings.get(junction) ?? [];
      const next = ends.find(({ part }) => part.id !== last.id)?.part;
      if (ends.length !== 2 || next === undefined) return { parts, terminal: undefined };
      if (!isWiring(next)) return { parts, terminal: next };
      if (!isInLine(next) || seen.has(next.id)) return { parts, terminal: undefined };
      seen.add(next.id);
      parts.push(next);
      const [from, to] = joined(next);
      junction = from === junction ? to! : from!;
      last = next;
    }
  }
}

function isInLine(part: SinglePart): part is WiringPart {
  return isWiring(part) && part.kind !== 'bond' && joined(part).length === 2;
}

function endsOf(parts: readonly WiringPart[]): readonly JunctionId[] {
  const count = new Map<JunctionId, number>();
  for (const junction of parts.flatMap(joined)) count.set(junction, (count.get(junction) ?? 0) + 1);
  return [...count].filter(([, times]) => times === 1).map(([junction]) => junction);
}
