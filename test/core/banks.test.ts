import { describe, expect, it } from 'vitest';
import { banksOf } from '../../core/api.ts';
import { withoutPairs } from '../../core/network/wiring.ts';
import { jobOf, load, type RawPart, stringPart } from '../hand/bankJob.ts';

/** Branches of each bank, each by its strings from minus to plus. */
function banks(parts: readonly RawPart[]): readonly string[] {
  const found = banksOf(withoutPairs(jobOf(parts).parts));
  return found.map(({ branches }) => branches.map(({ strings }) => strings.map(({ id }) => id).join('+')).join(' | '));
}
const block = (id: string, minus: string, plus: string, more: Readonly<Record<string, unknown>> = {}) =>
  stringPart(id, { plus, minus }, { emfV: 12.6, ohm: 0.005, more });
const cable = (id: string, from: string, to: string): RawPart => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 1,
  resistanceOhm: 0.001,
});

describe('which strings make a bank', () => {
  it('those between the same two poles, through cables, fuses and bars; an open fuse parts them', () => {
    const fuse = { id: 'F', kind: 'fuse', from: 'b+', to: 'bar+', ratingA: 100 };
    const parts = [block('A', 'n', 'a+'), cable('L', 'a+', 'bar+'), block('B', 'n', 'b+')];
    expect(banks([...parts, fuse])).toEqual(['A | B']);
    expect(banks([...parts, { ...fuse, state: 'open' }])).toEqual(['A', 'B']);
  });

  it('a diode parts them too', () => {
    const diode = { id: 'D', kind: 'diode', from: 'b+', to: 'a+' };
    expect(banks([block('A', 'n', 'a+'), block('B', 'n', 'b+'), diode])).toEqual(['A', 'B']);
  });

  it('strings in series are one branch, in whatever order they stand in the job', () => {
    const parts = [block('top', 'y', 'bus+'), block('low', 'n', 'x'), cable('L', 'x', 'x2'), block('mid', 'x2', 'y')];
    expect(banks([...parts, block('C', 'n', 'bus+')])).toEqual(['low+mid+top | C']);
  });

  it('a branch has the capacity of its least string, a bank the sum of its branches', () => {
    const [bank] = banksOf(
      withoutPairs(
        jobOf([
          block('A1', 'n', 'm', { capacityAh: 80 }),
          block('A2', 'm', 'bus+', { capacityAh: 100 }),
          block('B', 'n', 'bus+', { capacityAh: 120 }),
        ]).parts,
      ),
    );
    expect(bank!.branches.map(({ capacityAh }) => capacityAh)).toEqual([80, 120]);
    expect(bank!.capacityAh).toBe(200);
  });

  it('whatever is tapped between two strings parts them', () => {
    const series = [block('low', 'n', 'm'), block('high', 'm', 'bus+')];
    expect(banks(series)).toEqual(['low+high']);
    expect(banks([...series, load({ currentA: 1 }, { plus: 'm', minus: 'n' })])).toEqual(['low', 'high']);
    expect(banks([...series, { id: 'D', kind: 'diode', from: 'm', to: 'x' }])).toEqual(['low', 'high']);
    // The middle of another string, joined to theirs.
    const whole = stringPart(
      'whole',
      { plus: 'bus+', minus: 'n' },
      { emfV: 25.2, ohm: 0.01, more: { blocksInSeries: 2, midpoint: 'w' } },
    );
    expect(banks([...series, whole])).toEqual(['low+high | whole']);
    expect(banks([...series, whole, cable('T', 'w', 'm')])).toEqual(['low', 'high', 'whole']);
  });

  it('branches whose middles are tied are two banks, one on the other', () => {
    const parts = [
      block('A1', 'n', 'am'),
      block('A2', 'am', 'bus+'),
      block('B1', 'n', 'bm'),
      block('B2', 'bm', 'bus+'),
    ];
    expect(banks(parts)).toEqual(['A1+A2 | B1+B2']);
    expect(banks([...parts, cable('T', 'am', 'bm')])).toEqual(['A1 | B1', 'A2 | B2']);
  });

  it('strings in a ring, and one whose poles are joined, each stand for themselves', () => {
    expect(banks([block('A', 'x', 'y'), block('B', 'y', 'z'), block('C', 'z', 'x')])).toEqual(['A', 'B', 'C']);
    expect(banks([block('A', 'x', 'y'), cable('L', 'x', 'y')])).toEqual(['A']);
  });
});
