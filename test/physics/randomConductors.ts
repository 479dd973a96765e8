/** Two-ended parts and chains of them: what lies between a source and a load. */
import type { Draft } from './jobDraft.ts';

/** A cable's resistance from its own figures: wires of 0.2 to 12 milliohm, as found between a bank and its loads. */
const CABLE_OHM = [2e-4, 1.2e-2] as const;
const DEVICE_OHM = [1e-4, 3e-3] as const;
const MM2_SIZES = ['16 mm2', '25 mm2', '35 mm2', '50 mm2', '70 mm2'] as const;
/** Copper at working temperature, ohm mm2 per metre: only to keep the drop within reason. */
const ROUGH_OHM_MM2_PER_M = 0.022;

interface Ends {
  readonly from: string;
  readonly to: string;
}

/** Adds one two-ended part, either way round, and says about what resistance it has. */
export function addConductor(draft: Draft, ends: Ends): number {
  const { random } = draft;
  const placed = random.chance(0.5) ? ends : { from: ends.to, to: ends.from };
  const draw = random.next();
  if (draw < 0.45) return addCable(draft, placed);
  if (draw < 0.6) return addDevice(draft, 'fuse', placed);
  if (draw < 0.68) return addDevice(draft, 'breaker', placed);
  if (draw < 0.78) return addDevice(draft, 'switch', placed);
  if (draw < 0.86) {
    const ratingA = random.pick([50, 100, 300, 500]);
    const ratingMv = random.pick([50, 75]);
    draft.add('shunt', { ...placed, ratingA, ratingMv });
    return ratingMv / 1000 / ratingA;
  }
  const resistanceOhm = random.logBetween([6e-5, 4e-3]);
  draft.add('joint', { ...placed, resistanceOhm });
  return resistanceOhm;
}

function addCable(draft: Draft, ends: Ends): number {
  const { random } = draft;
  if (draft.sized && random.chance(0.5)) return addSizedCable(draft, ends);
  const resistanceOhm = random.logBetween(CABLE_OHM);
  const endOhm = random.chance(0.4) ? random.logBetween([5e-5, 1e-3]) : undefined;
  const inParallel = random.chance(0.2) ? random.whole([2, 3]) : undefined;
  const lengthM = random.between([0.2, 8]);
  draft.add('cable', { ...ends, lengthM, resistanceOhm, ...given({ endOhm, inParallel }) });
  return resistanceOhm + (endOhm ?? 0) / (inParallel ?? 1);
}

/** A cable by its size: at a fixed temperature, or as warm as its own current makes it. */
function addSizedCable(draft: Draft, ends: Ends): number {
  const { random } = draft;
  const size = random.pick(MM2_SIZES);
  const lengthM = random.between([0.3, 5]);
  const conductorDegC = random.chance(0.5) ? random.between([0, 80]) : undefined;
  const endOhm = random.chance(0.4) ? random.logBetween([5e-5, 1e-3]) : undefined;
  const inParallel = random.chance(0.2) ? 2 : undefined;
  draft.add('cable', {
    ...ends,
    lengthM,
    size,
    metal: 'copper',
    stranding: random.pick(['stranded', 'flexible']),
    insulationDegC: random.pick([70, 90]),
    run: 'free-air',
    ambientDegC: random.between([5, 40]),
    ...given({ conductorDegC, endOhm, inParallel }),
  });
  return ((ROUGH_OHM_MM2_PER_M * lengthM) / Number.parseFloat(size) + (endOhm ?? 0)) / (inParallel ?? 1);
}

function addDevice(draft: Draft, kind: 'fuse' | 'breaker' | 'switch', ends: Ends): number {
  const { random } = draft;
  const resistanceOhm = random.chance(0.5) ? random.logBetween(DEVICE_OHM) : undefined;
  draft.add(kind, { ...ends, ratingA: random.pick([60, 100, 200]), ...given({ resistanceOhm }) });
  return resistanceOhm ?? 0;
}

/** A chain of `count` two-ended parts from a junction to a given or a new one. */
export function addChain(
  draft: Draft,
  chain: { readonly from: string; readonly count: number; readonly to?: string },
): { readonly to: string; readonly ohm: number } {
  let at = chain.from;
  let ohm = 0;
  for (let link = 1; link <= chain.count; link++) {
    const next = link === chain.count && chain.to !== undefined ? chain.to : draft.newJunction();
    ohm += addConductor(draft, { from: at, to: next });
    at = next;
  }
  return { to: at, ohm };
}

/** A diode in its forward direction; slope-less diodes never have equal forward volts, so that two in parallel do not tie. */
export function addDiode(draft: Draft, ends: Ends): number {
  const { random } = draft;
  const forwardV = random.between([0.25, 0.75]);
  const slopeOhm = random.chance(0.6) ? random.logBetween([5e-4, 1e-2]) : undefined;
  draft.add('diode', { ...ends, forwardV, ...given({ slopeOhm }) });
  return forwardV;
}

/** The junctions of a bar in order: one and the same, a bar without resistance, or a bar with some in each segment. */
export function addBar(draft: Draft, count: number): readonly string[] {
  const { random } = draft;
  const junctions = Array.from({ length: Math.max(count, 1) }, () => draft.newJunction());
  if (junctions.length < 2 || random.chance(0.25)) return junctions.map(() => junctions[0]!);
  const segmentOhm = random.chance(0.6) ? random.logBetween([5e-5, 1e-3]) : undefined;
  draft.add('busbar', { junctions, ratingA: 400, ...given({ segmentOhm }) });
  return junctions;
}

/** Only the fields that have a value, as a file would have them. */
export function given(fields: Record<string, unknown>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined));
}
