/** Start small: one block of 12 V and 100 Ah, 60 W, 2 m to the switch and 5 m on; the choice of fuse and cable by hand. */
import { describe, expect, it } from 'vitest';
import { operatingPoint, startSmall } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

const edited = startSmall(
  {
    title: 'Hut',
    practice: 'iec-land',
    systemV: 12,
    chemistry: 'agm',
    blockNominalV: 12,
    blocksInParallel: 1,
    capacityAh: 100,
    loadW: 60,
    supply: 'dc',
    bankToMainM: 2,
    mainToLoadM: 5,
  },
  tables,
);
if (!edited.ok) throw new Error('the figures are figures of a job');
const { job } = edited.value;

describe('60 W at 12 V, 7 m away', () => {
  it('is fused at 8 A: the first standard rating above 125 % of 60 W at 10.5 V', () => {
    // 60 W / 10.5 V = 5.714 A; 1.25 * 5.714 A = 7.143 A; gG ratings: 2, 4, 6, 8, 10 A …
    expect(60 / 10.5).toBeCloseTo(5.714, 3);
    expect(1.25 * (60 / 10.5)).toBeCloseTo(7.143, 3);
    expect(job.parts.find(({ id }) => id === 'F1')).toMatchObject({ ratingA: 8, from: 'B1 plus' });
  });

  it('takes 4 mm2: 2.5 mm2 would lose more than 3 %', () => {
    // At about 12.4 V the load draws 4.9 A. The way out and back is 14 m.
    // 2.5 mm2, class 5 (IEC 60228): 7.98 mOhm/m; 14 m: 111.7 mOhm; 4.9 A: 0.55 V = 4.6 % of 12 V; too much.
    // 4 mm2: 4.95 mOhm/m; 14 m: 69.3 mOhm; 4.9 A: 0.34 V = 2.8 %; allowed are 3 % for a critical load (0.36 V).
    expect((4.9 * 14 * 7.98e-3) / 12).toBeGreaterThan(0.03);
    expect((4.9 * 14 * 4.95e-3) / 12).toBeLessThan(0.03);
    for (const id of ['W1', 'W2']) {
      expect(job.parts.find((part) => part.id === id)).toMatchObject({ size: { system: 'mm2', areaMm2: 4 } });
    }
  });

  it('gets what Kirchhoff leaves of the block', () => {
    const point = operatingPoint({ job, operatingCase: job.cases[0]!, tables, model: 'slow' });
    const [block, load] = ['B1', 'L1'].map((id) => point.parts.get(id as never)!);
    const lostV = block!.voltageV! - load!.voltageV!;
    // 14 m of 4 mm2 at about 26 degC, four terminations of 0.1 mOhm and a switch of 0.2 mOhm:
    const ohm = 14 * 4.95e-3 * (1 + 0.00393 * 6) + 4 * 0.0001 + 0.0002;
    // 0.5 %: a conductor is a degree warmer or cooler than in this sum.
    expect(lostV / load!.currentA!).toBeGreaterThan(0.995 * ohm);
    expect(lostV / load!.currentA!).toBeLessThan(1.005 * ohm);
    expect(load!.currentA! * load!.voltageV!).toBeCloseTo(60, 6);
  });
});
