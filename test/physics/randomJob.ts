/**
 * Random jobs as the job file writes them: trees of wiring with loops, several strings, sometimes several islands, every
 * kind of part, names in no order. Loads are booked so that no point loses more than about a sixth of its volts: far above
 * collapse, which has tests of its own.
 */
import { addPoint, book, type Draft, type JobValue, newDraft, type SupplyPoint } from './jobDraft.ts';
import { addBar, addChain, addConductor, addDiode, given } from './randomConductors.ts';
import { addBank, addCharger, addChargerIsland, addConverter, addHarvest } from './randomSources.ts';
import { seededRandom } from './seededRandom.ts';

export interface RandomJobOptions {
  readonly seed: number;
  /** About how many parts. */
  readonly partCount: number;
  /** Strings, conductors and loads of fixed amps or ohms only. */
  readonly linear?: boolean;
  /** Some cables by size, at a fixed temperature or warmed by their own current. */
  readonly sized?: boolean;
}

export function randomJob(options: RandomJobOptions): JobValue {
  const { seed, partCount, linear = false, sized = false } = options;
  const random = seededRandom(seed);
  const draft = newDraft(random, { linear, sized });
  const islandCount = partCount > 20 && random.chance(0.25) ? random.whole([2, 3]) : 1;
  for (let island = 1; island <= islandCount; island++) {
    addIsland(draft, Math.round((partCount * island) / islandCount));
  }
  if (!linear && random.chance(0.15)) addUnsupplied(draft);
  return {
    format: 'ohmwright-job',
    version: 1,
    title: `Random network ${seed} (invented)`,
    practice: random.pick(['us-land', 'us-marine', 'iso-marine', 'iec-land']),
    junctions: {},
    parts: random.shuffled(draft.parts),
    cases: [randomCase(draft)],
  };
}

function randomCase(draft: Draft): JobValue['cases'][number] {
  const { random } = draft;
  const switchedOff = draft.parts.find((part) => part.kind === 'load' && part['resistanceOhm'] === undefined);
  return {
    id: 'drawn',
    ambientDegC: random.between([-5, 40]),
    irradianceWPerM2: random.chance(0.1) ? 0 : random.between([100, 1050]),
    ...(!draft.linear && switchedOff !== undefined && random.chance(0.2)
      ? { set: { [switchedOff.id]: { on: false } } }
      : {}),
  };
}

function addIsland(draft: Draft, untilParts: number): void {
  const { random } = draft;
  const nominalV = random.pick([12, 24, 48]);
  const room = untilParts - draft.parts.length;
  const byCharger = !draft.linear && room > 4 && random.chance(0.06);
  const strings = Math.max(1, Math.min(random.whole([1, 6]), Math.floor(room / 6)));
  const start = byCharger ? addChargerIsland(draft, nominalV) : addBank(draft, { strings, nominalV });
  const points = [start];
  addLoad(draft, start);
  if (!byCharger && random.chance(0.3)) draft.add('bond', { from: start.minus, to: draft.newJunction() });
  while (draft.parts.length < untilParts) points.push(...grow(draft, points));
}

type Growth = (draft: Draft, point: SupplyPoint, points: readonly SupplyPoint[]) => readonly SupplyPoint[];
const nothingNew =
  (growth: (draft: Draft, point: SupplyPoint, points: readonly SupplyPoint[]) => void): Growth =>
  (draft, point, points) => {
    growth(draft, point, points);
    return [];
  };

const LINEAR_GROWTHS: readonly (readonly [weight: number, growth: Growth])[] = [
  [5, nothingNew(addLoad)],
  [5, (draft, point) => [addFeeder(draft, point)]],
  [1, addFanOut],
  [1, nothingNew(addLoop)],
  [0.3, nothingNew(addSideBySide)],
  [0.3, nothingNew(addOpenLink)],
];
const ALL_GROWTHS: typeof LINEAR_GROWTHS = [
  ...LINEAR_GROWTHS,
  [0.7, nothingNew(addInverter)],
  [0.6, nothingNew(addCharger)],
  [0.6, nothingNew(addHarvest)],
  [0.5, addDiodeFeeder],
  [0.5, addConverterFeeder],
  [0.3, nothingNew(addDeadEnd)],
  [0.1, nothingNew((draft, point) => void draft.add('bond', { from: point.minus, to: draft.newJunction() }))],
];

function grow(draft: Draft, points: readonly SupplyPoint[]): readonly SupplyPoint[] {
  const { random } = draft;
  const growths = draft.linear ? LINEAR_GROWTHS : ALL_GROWTHS;
  let ticket = random.between([0, growths.reduce((sum, [weight]) => sum + weight, 0)]);
  for (const [weight, growth] of growths) {
    ticket -= weight;
    if (ticket < 0) return growth(draft, random.pick(points), points);
  }
  return [];
}

function addFeeder(draft: Draft, parent: SupplyPoint): SupplyPoint {
  const { random } = draft;
  const { root } = parent;
  if (random.chance(0.25)) {
    const to = { plus: draft.newJunction(), minus: draft.newJunction() };
    const resistanceOhm = random.logBetween([2e-4, 1e-2]);
    draft.add('pair', { from: { plus: parent.plus, minus: parent.minus }, to, lengthM: 2, resistanceOhm });
    return addPoint({ ...to, parent, pathOhm: 2 * resistanceOhm, lossV: 0, root });
  }
  const out = addChain(draft, { from: parent.plus, count: random.whole([1, 3]) });
  const back = addChain(draft, { from: parent.minus, count: random.whole([0, 1]) });
  return addPoint({ plus: out.to, minus: back.to, parent, pathOhm: out.ohm + back.ohm, lossV: 0, root });
}

/** A bar with several places to tap. */
function addFanOut(draft: Draft, parent: SupplyPoint): readonly SupplyPoint[] {
  const count = draft.random.whole([2, 4]);
  const bar = addBar(draft, count);
  const link = addChain(draft, { from: parent.plus, count: 1, to: bar[0]! });
  return [...new Set(bar)].map((plus) =>
    addPoint({ plus, minus: parent.minus, parent, pathOhm: link.ohm + 1e-3 * count, lossV: 0, root: parent.root }),
  );
}

function addDiodeFeeder(draft: Draft, parent: SupplyPoint): readonly SupplyPoint[] {
  // Two diodes in a row would use up too many of the volts.
  if (parent.lossV > 0 || parent.parent?.lossV !== undefined) return [addFeeder(draft, parent)];
  const near = addChain(draft, { from: parent.plus, count: draft.random.whole([0, 1]) });
  const far = draft.newJunction();
  const lossV = addDiode(draft, { from: near.to, to: far });
  // An indicator lamp: volts behind a blocking diode are defined only where something draws them down.
  draft.add('load', { plus: far, minus: parent.minus, resistanceOhm: draft.random.between([500, 5000]) });
  const pathOhm = near.ohm + 0.01;
  return [addPoint({ plus: far, minus: parent.minus, parent, pathOhm, lossV, root: parent.root })];
}

function addConverterFeeder(draft: Draft, point: SupplyPoint): readonly SupplyPoint[] {
  const inputA = book(point, draft.random.between([1, 8]));
  return inputA > 0.5 ? [addConverter(draft, { point, inputA })] : [];
}

function addLoad(draft: Draft, point: SupplyPoint): void {
  const { random } = draft;
  const { nominalV } = point.root;
  const amps = book(point, random.logBetween([0.1, 25]));
  if (amps === 0) return;
  const kind = draft.linear
    ? random.pick(['current', 'resistance'])
    : random.pick(['power', 'power', 'current', 'resistance']);
  const figure =
    kind === 'power'
      ? { powerW: amps * nominalV }
      : kind === 'current'
        ? { currentA: amps }
        : { resistanceOhm: nominalV / amps };
  // Clear of the volts that any network here works at: it never drops out, or always.
  const minimumV = random.chance(0.12) ? nominalV * random.pick([0.4, 1.6]) : undefined;
  const plain = draft.linear || kind === 'resistance';
  draft.add('load', {
    plus: point.plus,
    minus: point.minus,
    ...figure,
    ...(plain ? {} : given({ minimumV, on: random.chance(0.1) ? false : undefined })),
  });
}

function addInverter(draft: Draft, point: SupplyPoint): void {
  const { random } = draft;
  const { nominalV } = point.root;
  const amps = book(point, random.logBetween([0.5, 40]));
  if (amps === 0) return;
  const acPowerW = random.chance(0.2) ? 0 : 0.8 * amps * nominalV;
  const curve = [
    [0.05, 0.72],
    [0.2, 0.88],
    [0.5, 0.92],
    [1, 0.87],
  ];
  draft.add('inverter', {
    plus: point.plus,
    minus: point.minus,
    acPowerW,
    ratedW: random.between([0.9, 4]) * Math.max(acPowerW, 100),
    ...given({
      efficiency: random.pick([undefined, random.between([0.82, 0.95]), curve]),
      standbyW: random.chance(0.6) ? Math.min(random.between([1, 20]), amps * nominalV) : undefined,
      cutoffV: random.chance(0.2) ? nominalV * random.pick([0.4, 1.6]) : undefined,
      on: random.chance(0.1) ? false : undefined,
    }),
  });
}

/** A second way between two points of one tree. */
function addLoop(draft: Draft, point: SupplyPoint, points: readonly SupplyPoint[]): void {
  const other = draft.random.pick(points.filter((candidate) => candidate.root === point.root));
  const [from, to] = draft.random.chance(0.7) ? [point.plus, other.plus] : [point.minus, other.minus];
  if (from !== to) addConductor(draft, { from, to });
}

/** Two switches side by side, neither with any resistance: how they share is not determined. */
function addSideBySide(draft: Draft, point: SupplyPoint): void {
  const to = draft.newJunction();
  for (let twin = 0; twin < 2; twin++) draft.add('switch', { from: point.plus, to, ratingA: 100 });
  const amps = book(point, draft.random.between([0.5, 3]));
  if (amps > 0) draft.add('load', { plus: to, minus: point.minus, currentA: amps });
}

/** An open switch between any two points, of the same tree or not: it must change nothing. */
function addOpenLink(draft: Draft, point: SupplyPoint, points: readonly SupplyPoint[]): void {
  const to = draft.random.pick(points).plus;
  if (to !== point.plus)
    draft.add(draft.random.pick(['switch', 'breaker', 'fuse']), { from: point.plus, to, ratingA: 60, state: 'open' });
}

/** A load behind an open breaker, or with no way back. */
function addDeadEnd(draft: Draft, point: SupplyPoint): void {
  const lost = draft.newJunction();
  const amps = draft.random.between([1, 5]);
  draft.add('breaker', { from: point.plus, to: lost, ratingA: 20, state: 'open' });
  const [plus, minus] = draft.random.chance(0.5) ? [lost, point.minus] : [point.plus, lost];
  draft.add('load', {
    plus,
    minus,
    ...draft.random.pick([{ powerW: 12 * amps }, { currentA: amps }, { resistanceOhm: 12 / amps }]),
  });
}

/** Loads and wires without any source. */
function addUnsupplied(draft: Draft): void {
  const plus = draft.newJunction();
  const minus = draft.newJunction();
  const { to } = addChain(draft, { from: plus, count: 1 });
  draft.add('load', { plus: to, minus, powerW: 20 });
}

/** The same seed list for every run: `count` seeds from `first` on. */
export function seeds(run: { readonly first: number; readonly count: number }): readonly number[] {
  return Array.from({ length: run.count }, (_, k) => run.first + k);
}

/** Rewrites every junction name of a part value. */
export function renameJunctions(
  part: JobValue['parts'][number],
  rename: (name: string) => string,
): JobValue['parts'][number] {
  const renamed = { ...part };
  for (const field of ['plus', 'minus', 'midpoint', 'from', 'to', 'junctions']) {
    const value = part[field];
    if (typeof value === 'string') renamed[field] = rename(value);
    else if (Array.isArray(value)) renamed[field] = value.map((name) => rename(String(name)));
    else if (value !== undefined) {
      const poles = value as { plus: string; minus: string };
      renamed[field] = { plus: rename(poles.plus), minus: rename(poles.minus) };
    }
  }
  return renamed;
}
