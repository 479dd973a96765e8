/** What eats the volts of a walk, by kind of part. */
import { expect, test } from 'vitest';
import { voltWalk } from '../../core/explain/voltWalk.ts';
import { walkLosses, walkRiseV } from '../../core/explain/walkLosses.ts';
import { operatingPoint } from '../../core/network/operatingPoint.ts';
import { tables } from '../../data/index.ts';
import { checked } from './reportInput.ts';

test('losses by kind, with what the load gets, make up what the source gives', () => {
  const job = checked({
    format: 'ohmwright-job',
    version: 1,
    title: 'Invented',
    practice: 'iec-land',
    parts: [
      {
        id: 'S',
        kind: 'string',
        plus: 'P',
        minus: 'N',
        chemistry: 'agm',
        blocksInSeries: 1,
        blockNominalV: 12,
        capacityAh: 100,
        emfV: 12.6,
        resistanceOhm: 0.01,
      },
      { id: 'J', kind: 'joint', from: 'P', to: 'A', resistanceOhm: 0.002 },
      { id: 'C', kind: 'cable', from: 'A', to: 'B', lengthM: 2, resistanceOhm: 0.004 },
      { id: 'F', kind: 'fuse', from: 'B', to: 'L', ratingA: 30, resistanceOhm: 0.001 },
      { id: 'LOAD', kind: 'load', plus: 'L', minus: 'N', currentA: 10 },
    ],
  });
  const operatingCase = job.cases[0]!;
  const point = operatingPoint({ job, operatingCase, tables, model: 'slow' });
  const walk = voltWalk({ job, operatingCase, point, load: job.parts[4]!.id });
  if (!walk.ok) throw new Error(walk.reason);
  // 10 A through 10, 4, 2 and 1 mΩ; largest first.
  const losses = walkLosses(walk, job);
  expect(losses.map(({ group }) => group)).toEqual(['battery', 'cables', 'joints', 'fuses and switches']);
  // To a nanovolt: the sums are exact but for rounding of the solve.
  expect(losses.map(({ lostV }) => Number(lostV.toFixed(9)))).toEqual([0.1, 0.04, 0.02, 0.01]);
  expect(walkRiseV(walk)).toBeCloseTo(walk.totals.loadV + 0.17, 9);
});
