/** From the parts of a case to branches between named junctions, by the contract's own words for each kind of part. */
import type { OperatingCase } from '../../core/job/job.ts';
import {
  type ArrayPart,
  type CablePart,
  cablesOfPair,
  type InverterPart,
  type JunctionId,
  type LoadPart,
  type Part,
  type PartId,
  type StringPart,
} from '../../core/job/part.ts';
import type { Law, PanelCurve } from './denseBranch.ts';
import { isLit, type Screening } from './denseScreening.ts';

/** A branch between named junctions. */
export interface PlannedBranch {
  readonly key: string;
  readonly a: JunctionId;
  readonly b: JunctionId;
  /** A `draw` names its feed by key until the branches are numbered; a `pass` its output minus by junction. */
  readonly law: PlannedLaw;
}
type PlannedLaw =
  | Exclude<Law, { type: 'draw' | 'pass' }>
  | { readonly type: 'draw'; readonly feed: string; readonly efficiency: number; readonly standbyW: number }
  | { readonly type: 'pass'; readonly outputA: number; readonly setpointV: number; readonly outMinus: JunctionId };

/** Laws that stand on published tables or on the sun; they come from outside the reference. */
export interface OutsideLaws {
  /** Resistance of a cable (its parallel conductors together, ends left out) as `ohm + ohmPerA2 · I²`. */
  readonly conductor: (
    cable: CablePart,
    operatingCase: OperatingCase,
  ) => { readonly ohm: number; readonly ohmPerA2: number };
  readonly panel: (array: ArrayPart, operatingCase: OperatingCase) => PanelCurve;
}

export interface PlanInput {
  readonly parts: readonly Part[];
  readonly operatingCase: OperatingCase;
  readonly screening: Screening;
  readonly laws: OutsideLaws;
  /** Loads and inverters that have dropped out. */
  readonly dropped: ReadonlySet<PartId>;
  /** Largest input power of each maximum-power controller, W. */
  readonly harvestW: ReadonlyMap<PartId, number>;
}

/** All branches of the supplied groups. */
export function planBranches(input: PlanInput): readonly PlannedBranch[] {
  const { screening } = input;
  return input.parts
    .flatMap((part) => branchesOf(part, input))
    .filter(({ a }) => screening.supplied.has(screening.group(a)));
}

function branchesOf(part: Part, input: PlanInput): readonly PlannedBranch[] {
  const { screening, dropped } = input;
  const draws = screening.fed.has(part.id) && !dropped.has(part.id);
  switch (part.kind) {
    case 'string':
      return stringBranches(part);
    case 'cable':
      return [cableBranch(part, input)];
    case 'pair':
      return cablesOfPair(part).map((cable) => cableBranch(cable, input));
    case 'busbar':
      return part.junctions
        .slice(1)
        .map((b, k) => ({ key: `${part.id}#${k}`, a: part.junctions[k]!, b, law: resistor(part.segmentOhm) }));
    case 'fuse':
    case 'breaker':
    case 'switch':
      return part.state === 'open' ? [] : [between(part, resistor(part.resistanceOhm ?? 0))];
    case 'joint':
      return [between(part, resistor(part.resistanceOhm))];
    case 'shunt':
      return [between(part, resistor(part.ratingMv / 1000 / part.ratingA))];
    case 'bond':
      return [between(part, { type: 'short' })];
    case 'diode':
      return [between(part, { type: 'diode', forwardV: part.forwardV ?? 0.6, slopeOhm: part.slopeOhm ?? 0 })];
    case 'load':
      return draws ? [{ key: part.id, a: part.plus, b: part.minus, law: loadLaw(part) }] : [];
    case 'inverter':
      return draws
        ? [{ key: part.id, a: part.plus, b: part.minus, law: { type: 'watts', watts: inverterW(part) } }]
        : [];
    case 'charger':
      return part.on ? [feed(part.id, part, { ...part, harvestW: undefined })] : [];
    case 'array':
      return isLit(input.operatingCase)
        ? [
            {
              key: part.id,
              a: part.minus,
              b: part.plus,
              law: { type: 'panel', curve: input.laws.panel(part, input.operatingCase) },
            },
          ]
        : [];
    default:
      return [...(draws ? twoPortBranches(part, input) : []), ...returnOf(part)];
  }
}

/** A direct controller joins the two minus poles. */
function returnOf(part: Part): readonly PlannedBranch[] {
  if (part.kind !== 'controller' || part.type === 'mppt' || part.from.minus === part.to.minus) return [];
  return [{ key: `${part.id}#return`, a: part.to.minus, b: part.from.minus, law: { type: 'short' } }];
}

function between(
  part: { readonly id: PartId; readonly from: JunctionId; readonly to: JunctionId },
  law: PlannedLaw,
): PlannedBranch {
  return { key: part.id, a: part.from, b: part.to, law };
}

function resistor(ohm: number): PlannedLaw {
  return ohm === 0 ? { type: 'short' } : { type: 'ohm', ohm, emfV: 0 };
}

function stringBranches(part: StringPart): readonly PlannedBranch[] {
  const { emfV, resistanceOhm, linkOhm, plus, minus, midpoint } = part;
  if (emfV === undefined || resistanceOhm === undefined)
    throw new Error('the reference wants strings with their figures given');
  const ohm = resistanceOhm + linkOhm;
  if (midpoint === undefined) return [{ key: part.id, a: minus, b: plus, law: { type: 'ohm', ohm, emfV: -emfV } }];
  const half: PlannedLaw = { type: 'ohm', ohm: ohm / 2, emfV: -emfV / 2 };
  return [
    { key: part.id, a: midpoint, b: plus, law: half },
    { key: `${part.id}#low`, a: minus, b: midpoint, law: half },
  ];
}

function cableBranch(cable: CablePart, input: PlanInput): PlannedBranch {
  const { inParallel, endOhm } = cable;
  if (cable.resistanceOhm !== undefined) return between(cable, resistor(cable.resistanceOhm + endOhm / inParallel));
  const { ohm, ohmPerA2 } = input.laws.conductor(cable, input.operatingCase);
  return between(cable, { type: 'warm', ohm: ohm + endOhm / inParallel, ohmPerA2 });
}

function loadLaw(load: LoadPart): PlannedLaw {
  if (load.powerW !== undefined) return { type: 'watts', watts: load.powerW };
  if (load.currentA !== undefined) return { type: 'amps', amps: load.currentA };
  return { type: 'ohm', ohm: load.resistanceOhm!, emfV: 0 };
}

/** Direct-current power of an inverter. */
export function inverterW(inverter: InverterPart): number {
  const acPowerW = inverter.acPowerW ?? 0;
  const standbyW = inverter.standbyW ?? 0;
  if (acPowerW <= 0) return standbyW;
  return Math.max(acPowerW / efficiencyAt(inverter.efficiency ?? 0.9, acPowerW / inverter.ratedW), standbyW);
}

function efficiencyAt(curve: number | readonly (readonly [number, number])[], fraction: number): number {
  if (typeof curve === 'number') return curve;
  const above = curve.findIndex(([at]) => at >= fraction);
  if (above === -1) return curve.at(-1)![1];
  if (above === 0) return curve[0]![1];
  const [x0, y0] = curve[above - 1]!;
  const [x1, y1] = curve[above]!;
  return y0 + ((y1 - y0) * (fraction - x0)) / (x1 - x0);
}

function feed(
  key: string,
  poles: { readonly plus: JunctionId; readonly minus: JunctionId },
  law: { readonly outputA: number; readonly setpointV: number; readonly harvestW: number | undefined },
): PlannedBranch {
  const { outputA, setpointV, harvestW } = law;
  return { key, a: poles.minus, b: poles.plus, law: { type: 'feed', outputA, setpointV, harvestW } };
}

function twoPortBranches(part: Part, input: PlanInput): readonly PlannedBranch[] {
  if (part.kind === 'converter') {
    const { outputA, outputV: setpointV, efficiency = 0.9, standbyW = 0 } = part;
    const out = feed(`${part.id}#out`, part.to, { outputA, setpointV, harvestW: undefined });
    const law: PlannedLaw = { type: 'draw', feed: out.key, efficiency, standbyW };
    return [out, { key: `${part.id}#in`, a: part.from.plus, b: part.from.minus, law }];
  }
  if (part.kind !== 'controller') return [];
  const { outputA, setpointV } = part;
  if (part.type === 'mppt') {
    const harvestW = (part.efficiency ?? 0.95) * (input.harvestW.get(part.id) ?? 0);
    return [feed(`${part.id}#out`, part.to, { outputA, setpointV, harvestW })];
  }
  const law: PlannedLaw = { type: 'pass', outputA, setpointV, outMinus: part.to.minus };
  return [{ key: part.id, a: part.from.plus, b: part.to.plus, law }];
}
