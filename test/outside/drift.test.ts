/** S01's four hours at 80 A, run as one drift run: the book's figures come from 60 s steps of a script of its own. */
import { expect, it } from 'vitest';
import { drifted, driftJob, straightTables } from '../physics/driftBank.ts';
import { inputsOf, ScenarioPage } from './scenariosBook.ts';

it('S01: four hours at 80 A take the shares from resistance to capacity, and C back to charge when the load goes', () => {
  const page = new ScenarioPage('S01');
  const { per_string_cable_mohm: cableMohm } = inputsOf('S01') as { per_string_cable_mohm: number };
  const string = (id: string, fields: { readonly capacityAh: number; readonly blockMohm: number }) => [
    {
      id,
      kind: 'string',
      plus: `${id}+`,
      minus: 'N',
      // Cells whose curve is drawn below; the book's blocks rise by a straight line from 11.75 V to 12.70 V.
      chemistry: 'lfp',
      blocksInSeries: 2,
      blockNominalV: 12.8,
      capacityAh: fields.capacityAh,
      stateOfCharge: 1,
      resistanceOhm: (2 * fields.blockMohm) / 1000,
    },
    { id: `${id} leads`, kind: 'joint', from: `${id}+`, to: 'P', resistanceOhm: cableMohm / 1000 },
  ];
  const job = driftJob(
    [
      ...string('A', { capacityAh: 150, blockMohm: 6 }),
      ...string('B', { capacityAh: 150, blockMohm: 6 }),
      ...string('C', { capacityAh: 200, blockMohm: 3 }),
      { id: 'house', kind: 'load', plus: 'P', minus: 'N', currentA: 80 },
    ],
    [{ id: 'loaded' }],
  );
  const cycle = [
    { case: 'loaded', hours: 4 },
    { case: 'at-rest', hours: 0.01 },
  ];
  const { moments } = drifted(job, cycle, { stepS: 60, from: straightTables(11.75 / 4, 12.7 / 4) });
  const loaded = moments.findLast((moment) => moment.case === 'loaded')!;
  const rested = moments.find((moment) => moment.case === 'at-rest')!;
  const [a, , c] = loaded.currentA;
  expect(loaded.hours).toBeCloseTo(4, 9);
  page.hold('80 A, equal rest voltage: C', moments[0]!.currentA[2]!);
  page.hold('80 A, equal rest voltage: A', moments[0]!.currentA[0]!);
  page.hold('after 4 h at 80 A (150/150/200 Ah, EMF=11.75+0.95*SoC per block): C', c!);
  page.hold('after 4 h: A', a!);
  page.hold('after 4 h: SoC of C', loaded.stateOfCharge[2]!);
  page.hold('after 4 h: SoC of A', loaded.stateOfCharge[0]!);
  page.hold('load removed: A gives C', rested.currentA[0]!);
});
