/** The changes of a plan, run by run, in words and as edits. */
import { dropOf } from '../../checks/dropRules.ts';
import type { Finding } from '../../checks/finding.ts';
import { protectedCablesOf } from '../../checks/protectedCables.ts';
import { isOver } from '../../checks/tally.ts';
import { amps, percent, volts } from '../../checks/wording.ts';
import { type Edit, together } from '../../draft/edit.ts';
import { setField } from '../../draft/fields.ts';
import type { PartId } from '../../job/part.ts';
import { type Device, isDevice } from '../../network/wiring.ts';
import { sizeText } from '../../units/conductorSize.ts';
import { formatQuantity } from '../../units/formatQuantity.ts';
import { identityOf } from '../identity.ts';
import { costSum, costWords, type ProtectionCost } from './cost.ts';
import { classFor, classWords } from './deviceClass.ts';
import { deviceWindow, type FuseWindow } from './fuseWindow.ts';
import { needOf, unmarkedWords } from './need.ts';
import { classEdit, type Plan, sizeEdit } from './plan.ts';
import type { ProposedCable, ProposedDevice, ProtectionProposal, RunProposal, RunVerdict } from './proposal.ts';
import { inFile, type Run, runsOf } from './runs.ts';

/** A plan that has been carried out on a copy, with what was found before and after. */
export interface Judged {
  readonly plan: Plan;
  readonly was: readonly Finding[];
  readonly is: readonly Finding[];
  readonly faults: ReadonlyMap<PartId, number>;
}

const CAUTIONS: readonly string[] = [
  'Nothing is changed before you take it. Check each proposal against the wiring as it lies and the makers’ figures.',
  'A fuse protects the cable, not the gadget: never fit a larger one to stop it blowing; find why.',
  'Disconnect the source before a fuse or a cable is changed, and let local code and a licensed person have the last word.',
];

export function proposalOf(judged: Judged): ProtectionProposal {
  const { plan, was, is } = judged;
  const runs = runsOf(plan.context).map((run) => runProposal(judged, run));
  const edits = editsOf(plan, () => true);
  return {
    runs,
    cost: costSum(runs.map(({ cost }) => cost)),
    solves: goneOf(was, is),
    left: is,
    edit: edits.length === 0 ? null : together('Protection: all proposals', edits),
    cautions: CAUTIONS,
  };
}

function goneOf(was: readonly Finding[], is: readonly Finding[]): readonly Finding[] {
  const there = new Set(is.map(identityOf));
  return was.filter((finding) => !there.has(identityOf(finding)));
}

/** Devices first, since a conductor into which one is put keeps its id. */
function editsOf(plan: Plan, isWanted: (id: PartId) => boolean): readonly Edit[] {
  const fresh = plan.fresh.filter(({ device }) => isWanted(device));
  const rated = [...plan.ratings.values()].filter(({ device }) => isWanted(device));
  const ratings = [
    ...rated.map(({ device, toA }) => ({ device, toA })),
    ...fresh.map(({ device, ratingA }) => ({ device, toA: ratingA })),
  ];
  return [
    ...fresh.map(({ put }) => put),
    ...ratings.map(({ device, toA }) => setField({ part: device, field: 'ratingA', value: toA })),
    ...[...plan.classes].filter(([device]) => isWanted(device)).map(([device, what]) => classEdit(device, what)),
    ...[...plan.sizes.values()].filter(({ conductor }) => isWanted(conductor.part)).map(sizeEdit),
  ];
}

function runProposal(judged: Judged, run: Run): RunProposal {
  const { plan, was, is } = judged;
  const own = new Set<PartId>([run.id, ...run.conductors, ...run.cables, ...run.devices]);
  const devices = run.devices.map((id) => proposedDevice(judged, id));
  const cables = cablesIn(plan, run);
  const isNamed = ({ parts }: Finding) => own.has(parts[0]!) || own.has(inFile(parts[0]!, plan.context));
  const [solves, left] = [goneOf(was, is).filter(isNamed), is.filter(isNamed)];
  const edits = editsOf(plan, (id) => own.has(id));
  const words = wordsOf(devices, cables);
  const alternatives = plan.rejected
    .filter(({ part }) => own.has(part) || own.has(inFile(part, plan.context)))
    .map((one) => ({ words: one.words, why: one.why }));
  return {
    id: run.id,
    title: run.title,
    role: run.role,
    verdict: verdictOf(plan, edits, left, devices),
    words,
    devices,
    cables,
    cost: costOf(plan, devices, cables),
    reasons: reasonsOf(judged, run, { devices, cables, left }),
    alternatives,
    solves,
    left,
    edit: edits.length === 0 ? null : together(`${run.title}: ${words}`, edits),
  };
}

function verdictOf(
  plan: Plan,
  edits: readonly Edit[],
  left: readonly Finding[],
  devices: readonly ProposedDevice[],
): RunVerdict {
  if (left.length > 0) return 'none-fits';
  if (edits.length > 0) return 'change';
  return devices.some(({ window, device }) => 'missing' in window && !isAlone(plan, device)) ? 'unknown' : 'keep';
}

/** A device with no cable of its own behind it: between two bars, or in a place that several feed. */
function isAlone(plan: Plan, id: PartId): boolean {
  return protectedCablesOf(plan.context).of(deviceOf(plan, id)).length === 0;
}

function costOf(plan: Plan, devices: readonly ProposedDevice[], cables: readonly ProposedCable[]): ProtectionCost {
  const swapped = devices.filter(
    ({ device, fromA }) => fromA !== null && (plan.ratings.has(device) || plan.classes.has(device)),
  );
  return {
    copperMmm2: cables.reduce((sum, { copperMmm2 }) => sum + copperMmm2, 0),
    newDevices: devices.filter(({ fromA }) => fromA === null).length,
    swappedDevices: swapped.length,
  };
}

function cablesIn(plan: Plan, run: Run): readonly ProposedCable[] {
  return [...plan.sizes.values()]
    .filter(({ conductor }) => run.conductors.includes(conductor.part))
    .map(({ conductor, from, to }) => ({
      part: conductor.part,
      field: conductor.field,
      from,
      to,
      copperMmm2: plan.copper(conductor, to),
    }));
}

function deviceOf(plan: Plan, id: PartId): Device {
  return plan.context.drawn.filter(isDevice).find((device) => device.id === id)!;
}

function proposedDevice({ plan, faults }: Judged, id: PartId): ProposedDevice {
  const device = deviceOf(plan, id);
  const fresh = plan.fresh.find((one) => one.device === id);
  const what = plan.classes.get(id) ?? classFor(plan, device, faults.get(id));
  return {
    device: id,
    kind: device.kind,
    fromA: fresh === undefined ? (plan.ratings.get(id)?.fromA ?? device.ratingA) : null,
    ratingA: device.ratingA,
    place: fresh?.place ?? placeOf(plan, device),
    faultA: faults.get(id) ?? null,
    type: what?.type ?? null,
    window: deviceWindow(plan.context, device),
  };
}

/** Where a device in place stands, as far as the job says. */
function placeOf({ context: { practice, job } }: Plan, { distanceFromSourceM }: Device): string {
  if (distanceFromSourceM === undefined) return 'in its place';
  const { openM, words } = practice.unfusedFromBattery;
  const metres = formatQuantity({ value: distanceFromSourceM, unit: 'm', digits: 3 });
  const isLand = job.practice === 'us-land' || job.practice === 'iec-land';
  if (!isLand && openM !== undefined && !isOver(distanceFromSourceM, openM.value)) return `${metres} from its source`;
  const rule = isLand ? '; the figures in use for this distance are boat rules, so ask local code' : '';
  return distanceFromSourceM === 0
    ? 'at its source'
    : `${metres} of unfused cable from its source: shorten or enclose it (${words}${rule})`;
}

function wordsOf(devices: readonly ProposedDevice[], cables: readonly ProposedCable[]): string {
  const words = [
    ...devices.map(({ device, kind, ratingA, fromA }) => {
      if (fromA === null) return `new ${amps(ratingA)} ${kind} ${device}`;
      return fromA === ratingA
        ? `${amps(ratingA)} ${kind} ${device} stays`
        : `${amps(ratingA)} ${kind} ${device} instead of ${amps(fromA)}`;
    }),
    ...cables.map(
      ({ part, from, to, field }) =>
        `${part}${field === 'minusSize' ? ' return' : ''} ${sizeText(to)} instead of ${sizeText(from)}`,
    ),
  ];
  return words.length === 0 ? 'no device of its own' : words.join('; ');
}

interface Parts {
  readonly devices: readonly ProposedDevice[];
  readonly cables: readonly ProposedCable[];
  readonly left: readonly Finding[];
}

function reasonsOf({ plan }: Judged, run: Run, { devices, cables, left }: Parts): readonly string[] {
  const why = plan.fresh
    .filter(({ device }) => run.devices.includes(device))
    .map((one) => `New fuse ${one.device} ${one.place}: ${one.why}.`);
  const sizes = [...plan.sizes.values()].filter(({ conductor }) => run.conductors.includes(conductor.part));
  const cost = costWords(costOf(plan, devices, cables));
  return [
    ...why,
    ...sizes.map(
      ({ conductor, to, why: reasons }) => `${conductor.name}: ${sizeText(to)}, since ${reasons.join('; ')}.`,
    ),
    ...devices.flatMap((device) => deviceReasons(plan, device)),
    ...dropReason(plan, run),
    ...(cost === 'nothing' ? [] : [`Costs ${cost}.`]),
    ...left.map(({ message, remedy }) => `Stays: ${message} ${remedy}`),
  ];
}

function deviceReasons(plan: Plan, proposed: ProposedDevice): readonly string[] {
  const { device: id, window, ratingA, fromA, faultA, type, place } = proposed;
  const need = needOf(plan.context, id);
  if ('missing' in need) return [`${id}: not known: ${need.missing}.`];
  if ('missing' in window && isAlone(plan, id)) {
    return [`${need.sum}; ${amps(ratingA)} at ${id}; no cable lies behind it that it protects alone.`];
  }
  if ('missing' in window) return [`${id}: ${need.sum}; not known: ${window.missing}.`];
  const stands =
    fromA === ratingA ? `${amps(ratingA)} at ${id} stays` : `next standard rating ${amps(ratingA)} at ${id}`;
  const sentences = [
    `${need.sum}; ${stands}; ${wireWords(plan, window, ratingA)}.`,
    ...unmarkedWords(need).map((words) => `${words}.`),
  ];
  if (faultA !== null && faultA > 0) {
    const highest = plan.context.volts.highestAt(deviceOf(plan, id).from)?.volts;
    const at = highest === undefined ? '' : ` at ${volts(highest)}`;
    const none = proposed.kind === 'breaker' ? 'see its label' : 'no class of the list usually does, so ask a maker';
    const what = type === null ? none : `a fuse of the class ${classWords(type)} usually does`;
    sentences.push(`${id} may have to break ${amps(faultA)}${at} direct current: ${what}.`);
  }
  if (fromA !== null && place !== 'in its place') sentences.push(`${id}: ${place}.`);
  return sentences;
}

function wireWords(plan: Plan, window: FuseWindow, ratingA: number): string {
  const cable = plan.context.drawn.find(({ id }) => id === window.cable);
  const size = cable?.kind === 'cable' && cable.size !== undefined ? ` (${sizeText(cable.size)})` : '';
  const carries = `cable ${window.cable}${size} carries ${amps(window.wireA)} here`;
  if (window.capA !== undefined && window.capA <= window.allowedA) {
    return `${carries}, and its cap is ${amps(window.capA)}${isOver(ratingA, window.capA) ? ': too large' : ''}`;
  }
  if (!isOver(ratingA, window.wireA)) return `${carries}, so ${amps(ratingA)} is within it`;
  return isOver(ratingA, window.allowedA)
    ? `${carries}, so ${amps(ratingA)} does not protect it`
    : `${carries}; ${amps(ratingA)} is admitted over it by the rule ${window.how} (at most ${amps(window.allowedA)})`;
}

/** The drop at the run's load in its worst case. */
function dropReason({ context }: Plan, run: Run): readonly string[] {
  let worst: { readonly fraction: number; readonly limit: number } | undefined;
  for (const one of context.steady) {
    const part = one.parts.find(({ id }) => id === run.id);
    if (part?.kind !== 'load' && part?.kind !== 'inverter') continue;
    const drop = dropOf(context, { part, one });
    if (drop !== undefined && (worst === undefined || drop.fraction > worst.fraction)) worst = drop;
  }
  return worst === undefined ? [] : [`Drop ${percent(worst.fraction)} of the ${percent(worst.limit)} allowed.`];
}
