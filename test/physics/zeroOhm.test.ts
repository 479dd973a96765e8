/** Currents through parts of no resistance: found where the balance of junctions determines them, left open where it does not. */
import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { ownComplaints } from './againstReference.ts';
import type { JobValue, PartValue } from './jobDraft.ts';
import { seeds } from './randomJob.ts';
import { type SeededRandom, seededRandom } from './seededRandom.ts';
import { ampsIn, answered, jobOf, stringOf } from './solveValue.ts';

/** A web of zero-ohm parts between junctions w0 … wn, fed at w0, with a load of fixed amps at some of them. */
interface Web {
  readonly value: JobValue;
  /** Zero-ohm ways in order: junction numbers, and where the answer holds their current. */
  readonly ways: readonly {
    readonly from: number;
    readonly to: number;
    readonly part: string;
    readonly segment: number | undefined;
  }[];
  /** Amps that leave the web at each junction. */
  readonly drawnA: readonly number[];
}

function randomWeb(seed: number): Web {
  const random = seededRandom(seed);
  const nodes = random.whole([2, 10]);
  const ways: Web['ways'][number][] = [];
  const parts: PartValue[] = [];
  // A tree first, so that every junction hangs together; then some ways that close rings.
  for (let to = 1; to < nodes; to++) addWay({ random, parts, ways }, { from: random.whole([0, to - 1]), to });
  for (let extra = random.whole([0, 5]); extra > 0; extra--) {
    const [from, to] = random.shuffled(Array.from({ length: nodes }, (_, k) => k));
    addWay({ random, parts, ways }, { from: from!, to: to! });
  }
  const loadA = Array.from({ length: nodes }, () => (random.chance(0.6) ? random.between([0.5, 20]) : 0));
  loadA.forEach((currentA, k) => {
    if (currentA > 0) parts.push({ id: `load ${k}`, kind: 'load', plus: `w${k}`, minus: 'minus', currentA });
  });
  parts.push(stringOf('bank', { plus: 'w0', minus: 'minus', emfV: 12.8, resistanceOhm: 0.005 }));
  const drawnA = loadA.map((amps, k) => (k === 0 ? amps - loadA.reduce((sum, each) => sum + each, 0) : amps));
  return { value: jobOf(random.shuffled(parts)), ways, drawnA };
}

function addWay(
  web: { readonly random: SeededRandom; readonly parts: PartValue[]; readonly ways: Web['ways'][number][] },
  ends: { readonly from: number; readonly to: number },
): void {
  const { random, parts, ways } = web;
  const part = `z${ways.length}`;
  const kind = random.pick(['switch', 'fuse', 'breaker', 'busbar']);
  const named = { from: `w${ends.from}`, to: `w${ends.to}` };
  if (kind === 'busbar') parts.push({ id: part, kind, junctions: [named.from, named.to] });
  else parts.push({ id: part, kind, ratingA: 100, ...named });
  ways.push({ ...ends, part, segment: kind === 'busbar' ? 0 : undefined });
}

/**
 * The balance of the web as B f = -d, f the currents of its ways: a current is determined where no vector of the null space
 * of B touches it, and then equals that of the shortest solution.
 */
function balance({ ways, drawnA }: Web): { readonly amps: readonly number[]; readonly determined: readonly boolean[] } {
  // A row of zeros a way makes the matrix tall enough for all right singular vectors.
  const incidence = Matrix.zeros(drawnA.length + ways.length, ways.length);
  ways.forEach(({ from, to }, k) => {
    incidence.set(from, k, incidence.get(from, k) - 1);
    incidence.set(to, k, incidence.get(to, k) + 1);
  });
  const svd = new SingularValueDecomposition(incidence);
  const right = svd.rightSingularVectors;
  const free = svd.diagonal.flatMap((value, column) => (value < 1e-9 ? [column] : []));
  const wanted = Matrix.columnVector([...drawnA, ...ways.map(() => 0)]);
  const amps = svd.solve(wanted).to1DArray();
  return { amps, determined: ways.map((_, k) => free.every((column) => Math.abs(right.get(k, column)) < 1e-9)) };
}

/** Sums of a dozen currents of 20 A: a few units of the last digit. */
const TOLERANCE_A = 2e-10;

function heldAgainstBalance(web: Web, number: number): { readonly found: readonly string[]; readonly open: number } {
  const { point } = answered(web.value);
  const { amps, determined } = balance(web);
  const found = web.ways.flatMap(({ part, segment }, k) => {
    const answer = [...point.parts.values()].find(({ id }) => id === part)!;
    const engine = segment === undefined ? answer.currentA : answer.segmentsA![segment]!;
    const said = `web ${number}, ${part}: ${engine} A (${answer.undetermined ?? 'no reason'})`;
    if (!determined[k]) return engine === null && answer.undetermined !== undefined ? [] : [`${said}, not determined`];
    return engine !== null && Math.abs(engine - amps[k]!) < TOLERANCE_A ? [] : [`${said}, should be ${amps[k]} A`];
  });
  return { found, open: determined.filter((known) => !known).length };
}

const WEBS = seeds({ first: 6001, count: 150 }).map(randomWeb);

describe('a web of zero-ohm parts', () => {
  it('answers every determined current, and null with a reason for every other', () => {
    const compared = WEBS.map(heldAgainstBalance);
    expect(compared.flatMap(({ found }) => found)).toEqual([]);
    expect(compared.reduce((sum, { open }) => sum + open, 0)).toBeGreaterThan(50);
  });

  it('keeps the balance of junctions and power whether or not currents are open', () => {
    expect(WEBS.slice(0, 60).flatMap(({ value }) => ownComplaints(answered(value)))).toEqual([]);
  });

  it('drops no volts anywhere', () => {
    for (const { value, drawnA } of WEBS) {
      const { point } = answered(value);
      const volts = new Map<string, number | null>(point.junctions);
      expect(new Set(drawnA.map((_, k) => volts.get(`w${k}`))).size).toBe(1);
    }
  });
});

describe('chargers of one set point on one bar', () => {
  const bar = (chargers: readonly number[], loadA: number, emfV: number): JobValue =>
    jobOf([
      ...chargers.map((outputA, k) => ({
        id: `C${k}`,
        kind: 'charger',
        plus: `c${k}`,
        minus: 'N',
        outputA,
        setpointV: 14.4,
      })),
      ...chargers.map((_, k) => ({ id: `S${k}`, kind: 'switch', from: `c${k}`, to: 'P' })),
      stringOf('bank', { plus: 'P', minus: 'N', emfV, resistanceOhm: 0.02 }),
      { id: 'load', kind: 'load', plus: 'P', minus: 'N', currentA: loadA },
    ]);

  it('share what the bar takes in proportion to their limits while they hold it', () => {
    for (const seed of seeds({ first: 6201, count: 30 })) {
      const random = seededRandom(seed);
      const limits = Array.from({ length: random.whole([2, 4]) }, () => random.between([10, 60]));
      const sum = limits.reduce((all, each) => all + each, 0);
      // What holding 14.4 V takes: the load, and (14.4 - EMF)/R into the bank.
      const loadA = random.between([0, 0.4 * sum]);
      const emfV = 14.4 - 0.02 * random.between([0, 0.4 * sum]);
      const takenA = loadA + (14.4 - emfV) / 0.02;
      const { point } = answered(bar(limits, loadA, emfV));
      limits.forEach((limit, k) => {
        expect(Math.abs(ampsIn(point, `C${k}`) - (takenA * limit) / sum)).toBeLessThan(1e-9 * takenA);
        expect(Math.abs(ampsIn(point, `S${k}`) - (takenA * limit) / sum)).toBeLessThan(1e-9 * takenA);
      });
    }
  });

  it('all give their limits while the bar stays below the set point, and nothing above it', () => {
    const { point: low } = answered(bar([10, 20, 5], 60, 12));
    expect([0, 1, 2].map((k) => ampsIn(low, `C${k}`))).toEqual([10, 20, 5]);
    const { point: high } = answered(bar([10, 20, 5], 1, 14.9));
    expect([0, 1, 2].map((k) => ampsIn(high, `C${k}`))).toEqual([0, 0, 0]);
  });
});
