/**
 * Who feeds whom, on random banks at rest: stars, ladders and mixtures, with cables that warm with what they carry. Whatever the
 * network, the pairs add up to the currents, heat is what the giving strings give less what the taking ones take, and a string whose
 * EMF changes a little changes the others' currents by the pairs' own conductances.
 */
import { describe, expect, it } from 'vitest';
import type { AtRest, CheckedJob, PartId } from '../../core/api.ts';
import { atRestOf, caseById, operatingPoint, parseJob } from '../../core/api.ts';
import { emfTransfer } from '../../core/network/emfTransfer.ts';
import { solveCircuit } from '../../core/network/operatingPoint.ts';
import { tables } from '../../data/index.ts';
import type { SeededRandom } from './seededRandom.ts';
import { seededRandom } from './seededRandom.ts';

type RawPart = Record<string, unknown> & { id: string };

/** A conductor of some milliohms, or one by size that warms. */
function conductor(id: string, from: string, to: string, random: SeededRandom): RawPart {
  const length = { id, kind: 'cable', from, to, lengthM: random.between([0.2, 3]) };
  return random.chance(0.5)
    ? { ...length, size: `${random.pick([2.5, 6, 16, 35])} mm2`, insulationDegC: 90, run: 'free-air' }
    : { ...length, resistanceOhm: random.logBetween([1e-4, 5e-3]) };
}

function randomBank(seed: number): { readonly job: CheckedJob; readonly parts: readonly RawPart[] } {
  const random = seededRandom(seed);
  const count = random.whole([2, 7]);
  const shape = random.pick(['star', 'ladder', 'mixed']);
  const parts: RawPart[] = [];
  for (let k = 1; k <= count; k++) {
    const isInSeries = random.chance(0.2);
    const middle = `m${k}`;
    const common = {
      kind: 'string',
      chemistry: 'agm',
      blockNominalV: 6,
      capacityAh: 100,
      resistanceOhm: random.logBetween([2e-3, 2e-2]),
    };
    const one = (id: string, poles: object, blocksInSeries: number): RawPart => ({
      ...common,
      id,
      ...poles,
      blocksInSeries,
      emfV: 6 * blocksInSeries * random.between([1.02, 1.07]),
    });
    if (isInSeries) {
      parts.push(
        one(`S${k}`, { plus: middle, minus: `n${k}` }, 1),
        one(`S${k} upper`, { plus: `p${k}`, minus: middle }, 1),
      );
    } else {
      const midpoint = random.chance(0.3) ? { midpoint: middle } : {};
      parts.push(one(`S${k}`, { plus: `p${k}`, minus: `n${k}`, ...midpoint }, 2));
    }
    const isStar = shape === 'star' || (shape === 'mixed' && random.chance(0.5));
    const previous = k === 1 ? 0 : random.whole([1, k - 1]);
    for (const side of ['p', 'n']) {
      const to = isStar || previous === 0 ? `bus${side}` : `${side}${shape === 'ladder' ? k - 1 : previous}`;
      parts.push(conductor(`L${side}${k}`, `${side}${k}`, to, random));
    }
  }
  parts.push({ id: 'LOAD', kind: 'load', plus: 'busp', minus: 'busn', powerW: 300 });
  const file = {
    format: 'ohmwright-job',
    version: 1,
    title: `bank ${seed}`,
    practice: 'iec-land',
    parts: random.shuffled(parts),
  };
  const read = parseJob(JSON.stringify(file));
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  return { job: read.value, parts };
}

/** What the pairs leave of each branch's current. */
function left({ strings, pairs }: AtRest): readonly number[] {
  return strings
    .filter(({ id }) => !id.endsWith('upper'))
    .map(({ id, currentA }) =>
      pairs.reduce(
        (rest, pair) => rest - (pair.from === id ? pair.currentA : pair.to === id ? -pair.currentA : 0),
        currentA,
      ),
    );
}

const seeds = Array.from({ length: 40 }, (_, seed) => seed + 1);

describe('pairs at rest by superposition', () => {
  it('add up to the current of every string to 1e-9 of the largest', () => {
    let pairCount = 0;
    let warmest = 0;
    for (const seed of seeds) {
      const { job } = randomBank(seed);
      const atRest = atRestOf({ job, tables });
      expect(atRest.outcome).toBe('solved');
      const largestA = Math.max(1, ...atRest.strings.map(({ currentA }) => Math.abs(currentA)));
      for (const rest of left(atRest)) expect(Math.abs(rest)).toBeLessThan(1e-9 * largestA);
      expect(atRest.remainderA).toBeLessThan(1e-9 * largestA);
      pairCount += atRest.pairs.length;
      const point = operatingPoint({ job, tables, operatingCase: caseById(job, 'at-rest')!, model: 'slow' });
      for (const { conductorDegC } of point.parts.values()) warmest = Math.max(warmest, conductorDegC ?? 0);
    }
    // Cables do warm here: the network is not linear.
    expect(warmest).toBeGreaterThan(40);
    expect(pairCount).toBeGreaterThan(200);
  });

  it('every pair runs from the higher EMF to the lower, and what is lost is Σ E I', () => {
    for (const seed of seeds) {
      const { job, parts } = randomBank(seed);
      const atRest = atRestOf({ job, tables });
      const emfOf = (id: string) =>
        parts
          .filter((part) => part.id === id || part.id === `${id} upper`)
          .reduce((sum, part) => sum + Number(part['emfV']), 0);
      for (const { from, to } of atRest.pairs) expect(emfOf(from)).toBeGreaterThan(emfOf(to));
      const given = atRest.strings.reduce((sum, { id, currentA }) => {
        const own = parts.find((part) => part.id === id);
        return sum + Number(own?.['emfV']) * currentA;
      }, 0);
      expect(Math.abs(atRest.lostW - given)).toBeLessThan(1e-7 * Math.max(1, given));
    }
  });

  it('conductances are the same both ways', () => {
    for (const seed of seeds.slice(0, 20)) {
      const { job } = randomBank(seed);
      const solved = solveCircuit({ job, tables, operatingCase: caseById(job, 'at-rest')!, model: 'slow' });
      const ids = job.parts.filter((part) => part.kind === 'string').map(({ id }) => [id]);
      const { siemens } = emfTransfer(solved, ids)!;
      const largest = Math.max(...siemens.flat().map(Math.abs));
      siemens.forEach((row, i) => {
        row.forEach((value, j) => {
          expect(Math.abs(value - siemens[j]![i]!)).toBeLessThan(1e-11 * largest);
        });
      });
    }
  });

  it('where no cable warms they are what a changed EMF really does, and the circuit is left as it was', () => {
    const { job: warming } = randomBank(3);
    const parts = warming.parts.map((part) => (part.kind === 'cable' ? { ...part, resistanceOhm: 0.001 } : part));
    const job = { ...warming, parts };
    const operatingCase = caseById(job, 'at-rest')!;
    const solved = solveCircuit({ job, tables, operatingCase, model: 'slow' });
    const strings = parts.filter((part) => part.kind === 'string');
    const transfer = emfTransfer(
      solved,
      strings.map(({ id }) => [id]),
    )!;
    const again = emfTransfer(
      solved,
      strings.map(({ id }) => [id]),
    )!;
    expect(again).toEqual(transfer);
    strings.forEach((raised, j) => {
      const emfV = transfer.sources[j]!.emfV + 1;
      const then = { ...job, parts: parts.map((part) => (part === raised ? { ...raised, emfV } : part)) };
      const point = operatingPoint({ job: then, tables, operatingCase, model: 'slow' });
      const current = (id: PartId) => point.parts.get(id)!.currentA! - solved.point.parts.get(id)!.currentA!;
      // A linear network: the difference is exact but for the rounding of currents of some 100 A.
      strings.forEach(({ id }, i) => {
        expect(Math.abs(current(id) - transfer.siemens[i]![j]!)).toBeLessThan(1e-8);
      });
    });
  });

  it('tied middles: what the pairs cannot say is named, and small beside what flows', () => {
    const half = (id: string, minus: string, plus: string, emfV: number) => {
      const block = { chemistry: 'agm', blocksInSeries: 1, blockNominalV: 12, capacityAh: 100, resistanceOhm: 0.005 };
      return { id, kind: 'string', minus, plus, emfV, ...block };
    };
    const tie = (id: string, from: string, to: string) => ({ id, kind: 'joint', from, to, resistanceOhm: 0.001 });
    const parts = [
      half('A1', 'an', 'am', 12.8),
      half('A2', 'am', 'ap', 12.7),
      half('B1', 'bn', 'bm', 12.6),
      half('B2', 'bm', 'bp', 12.6),
      tie('TN', 'an', 'bn'),
      tie('TM', 'am', 'bm'),
      tie('TP', 'ap', 'bp'),
    ];
    const read = parseJob(
      JSON.stringify({ format: 'ohmwright-job', version: 1, title: 'tied', practice: 'iec-land', parts }),
    );
    if (!read.ok) throw new Error(JSON.stringify(read.issues));
    const atRest = atRestOf({ job: read.value, tables });
    expect(atRest.pairs.map(({ from, to }) => `${from} ${to}`)).toEqual(['A1 B1', 'A2 B2']);
    // Loops 12 I1 - I2 = 200 mV and 12 I2 - I1 = 100 mV, in mΩ: I1 = 17.4825 A, I2 = 9.7902 A. Alone each would be 12/143 of its own
    // gap: 16.7832 A and 8.3916 A; the rest of each is what the other bank drives through the tie that both use.
    expect(atRest.strings[0]!.currentA).toBeCloseTo(2500 / 143, 9);
    expect(atRest.pairs[0]!.currentA).toBeCloseTo((12 * 200) / 143, 9);
    expect(atRest.remainderA).toBeCloseTo(200 / 143, 9);
  });
});
