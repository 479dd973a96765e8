/** A job under construction: the list of part values, fresh names, and how many amps each point of it may still give. */
import type { SeededRandom } from './seededRandom.ts';

/** One part as the job file writes it. */
export type PartValue = { id: string; kind: string } & Record<string, unknown>;

export interface JunctionValue {
  reference?: boolean;
}

/** A whole job as the job file writes it. */
export interface JobValue {
  format: 'ohmwright-job';
  version: 1;
  title: string;
  practice: string;
  junctions: Record<string, JunctionValue>;
  parts: PartValue[];
  cases: ({ id: string } & Record<string, unknown>)[];
}

/** A pair of junctions from which something may be fed, as a tree: currents drawn at a point flow through its ancestors. */
export interface SupplyPoint {
  readonly plus: string;
  readonly minus: string;
  readonly parent: SupplyPoint | undefined;
  /** Out and back resistance from the parent (for a root: inside the source). */
  readonly pathOhm: number;
  /** Fixed loss on the way from the parent: a diode's forward volts. */
  readonly lossV: number;
  readonly root: Root;
  /** Estimated amps on the way from the parent. */
  drawnA: number;
}

/** What feeds a tree of supply points. */
export interface Root {
  readonly nominalV: number;
  /** Amps that may be drawn in all. */
  readonly budgetA: number;
  readonly points: SupplyPoint[];
}

export interface Draft {
  readonly random: SeededRandom;
  readonly parts: PartValue[];
  /** Strings, two-ended conductors and loads of fixed amps or ohms only. */
  readonly linear: boolean;
  /** Cables given by their size take part (needs the published tables). */
  readonly sized: boolean;
  readonly newJunction: () => string;
  readonly add: (kind: string, fields: Record<string, unknown>) => PartValue;
}

const JUNCTION_STEMS = ['bus', 'N', 'x', 'post', 'Q', 'tap ', 'k-', 'Z_'] as const;
const PART_STEMS = ['p', 'W', 'a.', 'M', 'unit ', 'r-', 'T_'] as const;

/** Names in no order: a sort by name is as good as a shuffle. */
function nameMaker(random: SeededRandom, stems: readonly string[]): () => string {
  const taken = new Set<string>();
  return () => {
    for (;;) {
      const name = `${random.pick(stems)}${random.whole([100, 9999])}`;
      if (taken.has(name)) continue;
      taken.add(name);
      return name;
    }
  };
}

export function newDraft(random: SeededRandom, options: { readonly linear: boolean; readonly sized: boolean }): Draft {
  const parts: PartValue[] = [];
  const partName = nameMaker(random, PART_STEMS);
  return {
    random,
    parts,
    ...options,
    newJunction: nameMaker(random, JUNCTION_STEMS),
    add: (kind, fields) => {
      const part: PartValue = { id: partName(), kind, ...fields };
      parts.push(part);
      return part;
    },
  };
}

export function addPoint(fields: Omit<SupplyPoint, 'drawnA'>): SupplyPoint {
  const point: SupplyPoint = { ...fields, drawnA: 0 };
  point.root.points.push(point);
  return point;
}

/** Volts lost between the source and a point, loops left out (they only help). */
function estimatedDropV(point: SupplyPoint): number {
  let dropV = 0;
  for (let here: SupplyPoint | undefined = point; here !== undefined; here = here.parent) {
    dropV += here.pathOhm * here.drawnA + here.lossV;
  }
  return dropV;
}

/** No point may lose more than this share of the nominal volts: far above the volts at which a network collapses. */
const LARGEST_DROP = 0.16;

/** Books amps at a point; less than wanted, down to none, where the wiring would lose too much. */
export function book(point: SupplyPoint, wantedA: number): number {
  const { root } = point;
  for (let amps = wantedA; amps > 0.02; amps /= 3) {
    addAlong(point, amps);
    const worstV = Math.max(...root.points.map(estimatedDropV));
    const totalA = root.points[0]!.drawnA;
    if (worstV <= LARGEST_DROP * root.nominalV && totalA <= root.budgetA) return amps;
    addAlong(point, -amps);
  }
  return 0;
}

function addAlong(point: SupplyPoint, amps: number): void {
  for (let here: SupplyPoint | undefined = point; here !== undefined; here = here.parent) here.drawnA += amps;
}
