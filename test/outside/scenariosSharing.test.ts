/**
 * Acceptance scenarios with invented sites, worked out beforehand by a script that shares nothing with the engine
 * (`data/scenarios.json`: inputs, expected values, a tolerance for each), held through the command line. Here: how strings share.
 */
import { beforeAll, describe, expect, it } from 'vitest';
import { caseById, operatingPoint, type PartId, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { camper, hireBoat, ridgeCabin, saunaHut, saunaLimitA } from './scenarioBanks.ts';
import { closePage, plainCopperOhm, ScenarioPage } from './scenariosBook.ts';
import { jobText, type SolvedCase, solve } from './scenariosSolve.ts';

/** Currents of the case `now`, solved in this process. */
function stringCurrents(text: string): (id: string) => number {
  const parsed = parseJob(text);
  if (!parsed.ok) throw new Error(parsed.issues.map(({ message }) => message).join('\n'));
  const operatingCase = caseById(parsed.value, 'now')!;
  const { parts } = operatingPoint({ job: parsed.value, operatingCase, tables, model: 'slow' });
  return (id) => parts.get(id as PartId)?.currentA ?? Number.NaN;
}

describe('S01, ridge cabin: three 24 V strings, string C replaced last year', () => {
  const page = new ScenarioPage('S01');
  const { parts, junctions } = ridgeCabin;
  let at: (caseId: string) => SolvedCase;
  beforeAll(async () => {
    at = await solve(ridgeCabin);
  });

  it('string C feeds the other two with nothing switched on', () => {
    const rest = at('nothing on');
    page.hold('no load: C discharges', rest.amps('C'));
    page.hold('no load: A and B each charged', -rest.amps('A'));
    page.hold('no load: A and B each charged', -rest.amps('B'));
    page.hold('no load bus', rest.volts('bus+'));
  });

  it('string C carries most of an 80 A load', () => {
    const load = at('load');
    page.hold('80 A load: C', load.amps('C'));
    page.hold('80 A load: A', load.amps('A'));
    page.hold('80 A bus', load.volts('bus+'));
    // "C carries 72 % of the first load": said in whole per cent.
    expect(Math.round((100 * load.amps('C')) / 80)).toBe(72);
  });

  it('string C takes least of a 60 A charge', () => {
    const charge = at('charge');
    page.hold('60 A charge: C takes', -charge.amps('C'));
    page.hold('60 A charge: A takes', -charge.amps('A'));
    expect(Math.round((-100 * charge.amps('C')) / 60)).toBe(13);
  });

  it('once the rest voltages are alike the load splits by resistance alone', () => {
    const load = at('load with equal volts');
    page.hold('80 A, equal rest voltage: C', load.amps('C'));
    page.hold('80 A, equal rest voltage: A', load.amps('A'));
  });

  it('after four hours at 80 A the split has drifted towards the capacities', async () => {
    const capacityAh = { A: 150, B: 150, C: 200 };
    const strings = ['A', 'B', 'C'] as const;
    const stepS = 60;
    const nowAt = (charge: Readonly<typeof capacityAh>, on: boolean) => ({
      parts,
      junctions,
      cases: [
        {
          id: 'now',
          set: {
            ...Object.fromEntries(strings.map((id) => [id, { emfV: 2 * (11.75 + 0.95 * charge[id]) }])),
            house: { on },
          },
        },
      ],
    });

    // 240 steps of a minute, the strings full at first; in this process, since a process a step would only be slower.
    const charge = { A: 1, B: 1, C: 1 };
    for (let step = 0; step < (4 * 3600) / stepS; step++) {
      const now = stringCurrents(jobText(nowAt(charge, true)));
      for (const id of strings) charge[id] -= (now(id) * stepS) / 3600 / capacityAh[id];
    }
    page.hold('after 4 h: SoC of C', charge.C);
    page.hold('after 4 h: SoC of A', charge.A);

    const loaded = (await solve(nowAt(charge, true)))('now');
    page.hold('after 4 h at 80 A (150/150/200 Ah, EMF=11.75+0.95*SoC per block): C', loaded.amps('C'));
    page.hold('after 4 h: A', loaded.amps('A'));
    const rested = (await solve(nowAt(charge, false)))('now');
    page.hold('load removed: A gives C', rested.amps('A'));
  });

  closePage(page);
});

describe('S03, camper: two lithium blocks on leads of 0.5 m and 2.0 m', () => {
  const page = new ScenarioPage('S03');

  /** Near leads of 0.50, 0.51 … 2.00 m, each a case of its own; the far block keeps its 2.0 m. */
  const nearLeadsM = Array.from({ length: 151 }, (_, step) => (50 + step) / 100);
  const caseOf = (nearM: number) => `near ${nearM.toFixed(2)} m`;
  let withNearLead: (nearM: number) => SolvedCase;
  beforeAll(async () => {
    const at = await solve({
      ...camper,
      cases: nearLeadsM.map((nearM) => {
        const lead = { resistanceOhm: plainCopperOhm({ lengthM: nearM, areaMm2: 35 }) };
        return { id: caseOf(nearM), set: { 'near plus lead': lead, 'near minus lead': lead } };
      }),
    });
    withNearLead = (nearM) => at(caseOf(nearM));
  });
  const difference = (solved: SolvedCase) => Math.abs(solved.amps('near') - solved.amps('far')) / 75;

  it('the block on the short leads carries more than its half', () => {
    const solved = withNearLead(0.5);
    page.hold('near block', solved.amps('near'));
    page.hold('far block', solved.amps('far'));
    page.hold('bus', solved.volts('bus+'));
    // "near block 118 % of fair share", said in whole per cent.
    expect(Math.round((100 * solved.amps('near')) / 75)).toBe(118);
  });

  it('long leads on both blocks share evenly and cost 65 mV', () => {
    const even = withNearLead(2);
    page.hold('bus if both 2.0 m', even.volts('bus+'));
    // Symmetry: the two blocks are the same circuit twice; 1 nA is far below what any rounding here leaves of 75 A.
    expect(difference(even)).toBeLessThan(1e-9);
    expect(Math.round(1000 * (withNearLead(0.5).volts('bus+') - even.volts('bus+')))).toBe(65);
  });

  it('the shortest near lead that leaves a tenth of difference, to the centimetre that the book allows', () => {
    const shortest = nearLeadsM.find((nearM) => difference(withNearLead(nearM)) <= 0.1);
    page.hold('shortest near lead that keeps |difference| <= 10 % of mean', shortest ?? 0);
  });

  closePage(page);
});

describe('S17, sauna hut: three lithium blocks with limits of 100 A, a load of 240 A', () => {
  const page = new ScenarioPage('S17');
  const off = (index: number) => ({ [`limit ${index}`]: { state: 'open' } });
  let at: (caseId: string) => SolvedCase;
  beforeAll(async () => {
    at = await solve({
      ...saunaHut,
      cases: [
        { id: 'all three' },
        { id: 'block 2 off', set: off(2) },
        { id: 'block 3 off', set: off(3) },
        { id: 'one ampere', set: { load: { currentA: 1 } } },
        { id: 'one ampere block 1 off', set: { ...off(1), load: { currentA: 1 } } },
        { id: 'one ampere block 2 off', set: { ...off(2), load: { currentA: 1 } } },
        { id: 'one ampere block 3 off', set: { ...off(3), load: { currentA: 1 } } },
      ],
    });
  });
  const currents = (caseId: string) => [1, 2, 3].map((index) => at(caseId).amps(`block ${index}`));

  it('the split with all three, and with one cut out', () => {
    const [first, second, third] = currents('all three');
    page.hold('all three: blocks 1,2', first!);
    page.hold('all three: blocks 1,2', second!);
    page.hold('all three: block 3', third!);
    page.hold('block 2 off: block 1', at('block 2 off').amps('block 1'));
    page.hold('block 2 off: block 3', at('block 2 off').amps('block 3'));
    const rest = at('block 3 off');
    // By symmetry half of 240 A each; the book gives no tolerance.
    expect(Math.abs(rest.amps('block 1') - 120)).toBeLessThan(1e-6);
    expect(Math.abs(rest.amps('block 2') - 120)).toBeLessThan(1e-6);
    page.holdVerdict('block 3 off: each', 120);
  });

  it('the largest loads follow from the shares of one ampere, equal blocks having no current of their own', () => {
    const largest = (caseId: string) => saunaLimitA / Math.max(...currents(caseId));
    page.hold('largest load with all three', largest('one ampere'));
    const losses = [1, 2, 3].map((index) => largest(`one ampere block ${index} off`));
    page.hold('largest load that survives any one loss', Math.min(...losses));
  });

  closePage(page);
});

describe('S19, hire boat: one of three parallel blocks has a dead cell', () => {
  const page = new ScenarioPage('S19');
  it('the good blocks pour into the bad one with nothing switched on', async () => {
    const rest = (await solve(hireBoat))('as-drawn');
    page.hold('each good block gives', rest.amps('block 1'));
    page.hold('each good block gives', rest.amps('block 2'));
    page.hold('dead-cell block takes', -rest.amps('block 3'));
    page.hold('bus at rest', rest.volts('bus+') - rest.volts('bus-'));
  });

  closePage(page);
});
