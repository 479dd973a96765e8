/** Each device between what flows through it and what its cables admit: another rating, thicker cables, or a device of the branch's own. */
import { limitsOverDevices } from '../../checks/deviceLimitRules.ts';
import { protectedCablesOf } from '../../checks/protectedCables.ts';
import { isOver, isUnder } from '../../checks/tally.ts';
import { amps } from '../../checks/wording.ts';
import type { CablePart, ConductorSize, JunctionId, PartId } from '../../job/part.ts';
import { type Device, isDevice, isWiring, joined } from '../../network/wiring.ts';
import { sizeText } from '../../units/conductorSize.ts';
import type { Conductor } from '../cableLadders.ts';
import { sizeUnder } from './cableChoice.ts';
import { NEW_DEVICE_COPPER, SWAPPED_DEVICE_COPPER } from './cost.ts';
import { standardRatings, upperOf, wireFigures } from './fuseWindow.ts';
import { type Need, needOf } from './need.ts';
import { ownRating, putAtEnd } from './newDevices.ts';
import type { Plan } from './plan.ts';
import { inFile, type Run, runsOf } from './runs.ts';

/** A cable that a device protects, and the largest rating that it admits. */
interface Over {
  readonly cable: CablePart;
  readonly mostA: number;
}

/** Devices put in are looked at as well, so the list is made anew until each has been seen. */
export function rateDevices(plan: Plan): void {
  const seen = new Set<PartId>();
  for (;;) {
    const device = plan.context.drawn.find((part): part is Device => isDevice(part) && !seen.has(part.id));
    if (device === undefined) return;
    seen.add(device.id);
    rateDevice(plan, device);
  }
}

function rateDevice(plan: Plan, device: Device): void {
  const need = needOf(plan.context, device.id);
  const over = coverOf(plan, device);
  if ('missing' in need || over === undefined) {
    const why = 'missing' in need ? need.missing : 'the ampacity of a cable that it protects';
    plan.reject({ part: device.id, words: `${device.id}: another rating`, why: `not known: ${why}` });
    return;
  }
  const partA = limitsOverDevices(plan.context).get(device.id) ?? Number.POSITIVE_INFINITY;
  const mostA = Math.min(partA, ...over.map((one) => one.mostA));
  if (!isUnder(device.ratingA, need.leastA) && !isOver(device.ratingA, mostA)) return;
  plan.reject({ part: device.id, words: `${amps(device.ratingA)} at ${device.id}`, why: whyNot(device, need, mostA) });
  const wantedA = standardRatings(plan.context).find((ratingA) => !isUnder(ratingA, need.mostA));
  if (wantedA === undefined || isOver(wantedA, partA)) {
    const why =
      wantedA === undefined
        ? `${need.sum} is above the largest standard rating: split the circuit`
        : `${need.sum}, and what hangs on it admits a fuse of ${amps(partA)} at most`;
    plan.reject({ part: device.id, words: `${device.id}: another rating`, why });
    return;
  }
  if (!isOver(wantedA, mostA)) plan.rerate(device, wantedA);
  else widen(plan, { device, need, wantedA, partA, over, mostA });
}

function whyNot(device: Device, need: Need, mostA: number): string {
  if (isUnder(device.ratingA, need.loadA)) return `under the running current ${amps(need.loadA)}: it will open in use`;
  if (isUnder(device.ratingA, need.leastA)) return `no margin: ${need.sum}`;
  return `above the ${amps(mostA)} that is the most allowed over what it protects`;
}

/** What a device protects; `undefined` where an ampacity is not known. */
function coverOf({ context }: Plan, device: Device): readonly Over[] | undefined {
  const found: Over[] = [];
  for (const cable of protectedCablesOf(context).of(device)) {
    const figures = wireFigures(context, cable, device);
    if ('missing' in figures) return undefined;
    found.push({ cable, mostA: upperOf(figures) });
  }
  return found;
}

interface Narrow {
  readonly device: Device;
  readonly need: Need;
  readonly wantedA: number;
  readonly partA: number;
  readonly over: readonly Over[];
  readonly mostA: number;
}

/** One way to let a rating stand: what it costs and how it is done. */
interface Way {
  readonly weight: number;
  readonly words: string;
  readonly take: () => boolean;
}

/** No standard rating fits: thicker cables under the rating wanted or the one in place, or a device for each thin branch. */
function widen(plan: Plan, narrow: Narrow): void {
  const { device, need, wantedA, partA, mostA } = narrow;
  plan.reject({
    part: device.id,
    words: `${device.id} over the cables in place`,
    why: `none fits: cable too thin (${amps(need.loadA)} flows, ${amps(need.mostA)} ≤ fuse ≤ ${amps(mostA)})`,
  });
  const stays = !isUnder(device.ratingA, need.mostA) && !isOver(device.ratingA, partA);
  const targets = stays && device.ratingA !== wantedA ? [wantedA, device.ratingA] : [wantedA];
  const ways = targets.flatMap((ratingA) => wayTo(plan, narrow, ratingA) ?? []);
  ways.sort((a, b) => a.weight - b.weight);
  const [best, ...others] = ways;
  if (best === undefined) {
    plan.reject({ part: device.id, words: `${device.id}: thicker cables`, why: 'no listed size is large enough' });
    return;
  }
  for (const { words, weight } of others) {
    plan.reject({
      part: device.id,
      words,
      why: `dearer: ${Math.round(weight)} m·mm² or its worth against ${Math.round(best.weight)}`,
    });
  }
  best.take();
}

function wayTo(plan: Plan, { device, over }: Narrow, ratingA: number): Way | undefined {
  const thin = over.filter(({ mostA }) => isOver(ratingA, mostA)).map(({ cable }) => cable);
  const branches = byRun(plan, thin).map((branch) => branchWay(plan, { ...branch, device, ratingA }));
  if (branches.some((way) => way === undefined)) return undefined;
  const swap = ratingA === device.ratingA ? 0 : SWAPPED_DEVICE_COPPER;
  const ways = branches.flatMap((way) => way ?? []);
  return {
    weight: ways.reduce((sum, { weight }) => sum + weight, swap),
    words: [`${amps(ratingA)} at ${device.id}`, ...ways.map(({ words }) => words)].join('; '),
    take: () => {
      const done = ways.map((way) => way.take());
      return (ratingA === device.ratingA || plan.rerate(device, ratingA)) && done.every(Boolean);
    },
  };
}

interface Branch {
  readonly run: Run | undefined;
  readonly cables: readonly CablePart[];
}

function byRun({ context }: Plan, cables: readonly CablePart[]): readonly Branch[] {
  const runs = runsOf(context);
  const groups = new Map<Run | undefined, CablePart[]>();
  for (const cable of cables) {
    const run = runs.find((one) => one.cables.includes(cable.id));
    groups.set(run, [...(groups.get(run) ?? []), cable]);
  }
  return [...groups].map(([run, group]) => ({ run, cables: group }));
}

/** Thicker cables in a branch, or a fuse of its own where it leaves the thicker ones, whichever is the less. */
function branchWay(
  plan: Plan,
  branch: Branch & { readonly device: Device; readonly ratingA: number },
): Way | undefined {
  const [thicker, own] = [thickerWay(plan, branch), ownFuseWay(plan, branch)];
  if (thicker === undefined || own === undefined) return thicker ?? own;
  const [taken, left] = own.weight < thicker.weight ? [own, thicker] : [thicker, own];
  const part = branch.cables[0]!.id;
  const why = `dearer: ${Math.round(left.weight)} m·mm² or its worth against ${Math.round(taken.weight)}`;
  return {
    ...taken,
    take: () => {
      plan.reject({ part: inFile(part, plan.context), words: left.words, why });
      return taken.take();
    },
  };
}

function thickerWay(
  plan: Plan,
  { cables, device, ratingA }: Branch & { readonly device: Device; readonly ratingA: number },
): Way | undefined {
  const only = new Set(cables.map(({ id }) => id));
  const changes = new Map<string, { conductor: Conductor; to: ConductorSize; why: string }>();
  for (const cable of cables) {
    const conductor = plan.conductor(cable.id);
    const to = conductor === undefined ? undefined : sizeUnder(plan, conductor, { ratingA, between: device, only });
    if (conductor === undefined || to === undefined) return undefined;
    const why = `${sizeText(conductor.size)} is too thin for ${amps(ratingA)} at ${device.id}`;
    changes.set(`${conductor.part} ${conductor.field}`, { conductor, to, why });
  }
  const all = [...changes.values()];
  return {
    weight: all.reduce((sum, { conductor, to }) => sum + plan.copper(conductor, to), 0),
    words: all.map(({ conductor, to }) => `${conductor.name}: ${sizeText(to)}`).join('; '),
    take: () => plan.resize(all),
  };
}

function ownFuseWay(plan: Plan, { run, cables, device }: Branch & { readonly device: Device }): Way | undefined {
  if (run === undefined || run.devices.includes(device.id)) return undefined;
  const head = headOf(plan, device, cables);
  const ratingA = head === undefined ? undefined : ownRating(plan, head.cable.id);
  if (head === undefined || ratingA === undefined) return undefined;
  // It would fit over none of the thin cables any better.
  const limits = cables.map((cable) => wireFigures(plan.context, cable, device));
  if (limits.some((limit) => 'missing' in limit || isOver(ratingA, upperOf(limit)))) return undefined;
  const why = `the cable grows thinner there: ${device.id}, ${amps(device.ratingA)}, does not protect it`;
  return {
    weight: NEW_DEVICE_COPPER,
    words: `a ${amps(ratingA)} fuse where ${head.cable.id} begins`,
    take: () => putAtEnd(plan, { ...head, ratingA, why }),
  };
}

/** The cable of a branch that is reached first from a device, without passing another, and the end at which it is. */
function headOf(
  { context }: Plan,
  device: Device,
  cables: readonly CablePart[],
): { readonly cable: CablePart; readonly end: 'from' | 'to' } | undefined {
  const wanted = new Set(cables.map(({ id }) => id));
  const reached = new Set<JunctionId>([device.from, device.to]);
  for (const junction of reached) {
    for (const { part } of context.meetings.get(junction) ?? []) {
      if (part.kind === 'cable' && wanted.has(part.id)) {
        return { cable: part, end: part.from === junction ? 'from' : 'to' };
      }
      if (isWiring(part) && !isDevice(part)) for (const end of joined(part)) reached.add(end);
    }
  }
  return undefined;
}
