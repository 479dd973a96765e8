/**
 * The acceptance scenarios about strings through the command `strings`, as a person would call it: the book's numbers in its JSON
 * answer, and what the book says must be said in its sentences.
 */
import { beforeAll, describe, expect, it } from 'vitest';
import { buildCli, runCli } from '../hosts/builtCli.ts';
import { camper, hillFarm, hireBoat, ridgeCabin, saunaHut } from './scenarioBanks.ts';
import { closePage, ScenarioPage } from './scenariosBook.ts';
import { jobText } from './scenariosSolve.ts';

interface Shared {
  readonly id: string;
  readonly currentA: number;
  readonly share: number;
  readonly deviation: number;
}
interface StringsAnswer {
  readonly says: readonly { readonly text: string; readonly urgent: boolean }[];
  readonly cases: readonly { readonly case: string; readonly model: string; readonly strings: readonly Shared[] }[];
  readonly atRest: { readonly strings: readonly Shared[]; readonly pairs: readonly { from: string; to: string }[] };
  readonly layouts: readonly { readonly name: string; readonly bankV: number; readonly spread: number }[];
  readonly leads: { readonly leads: readonly { readonly string: string; readonly shortestM: number | null }[] } | null;
  readonly oneOut: readonly {
    readonly lost: string;
    readonly strings: readonly Shared[];
    readonly cascade: string[][];
  }[];
  readonly oneOutStudy: readonly { readonly largestA: number; readonly survivesA: number }[];
  readonly series: readonly {
    readonly totalV: number;
    readonly blocks: readonly { readonly fromMeanV: number }[];
    readonly midpoint: { readonly differenceV: number; readonly onTotal: number; readonly onMeanHalf: number } | null;
  }[];
}

/** One call of the program; few draws, since no scenario is about them. */
async function stringsOf(draft: Readonly<Record<string, unknown>>): Promise<StringsAnswer> {
  await buildCli();
  const run = await runCli(['strings', '-', '--json', '--draws', '50'], { input: jobText(draft) });
  expect([run.status, run.stderr]).toEqual([0, '']);
  return JSON.parse(run.stdout) as StringsAnswer;
}

function ampsOf(strings: readonly Shared[], id: string): number {
  const found = strings.find((string) => string.id === id);
  if (found === undefined) throw new Error(`there is no string ${id}`);
  return found.currentA;
}

const inCase = (answer: StringsAnswer, id: string): readonly Shared[] =>
  answer.cases.find((each) => each.case === id && each.model === 'slow')?.strings ?? [];
const told = (answer: StringsAnswer): string => answer.says.map(({ text }) => text).join('\n');

describe('S01, ridge cabin: three 24 V strings, string C replaced last year', () => {
  const page = new ScenarioPage('S01');
  let answer: StringsAnswer;
  beforeAll(async () => {
    answer = await stringsOf(ridgeCabin);
  });

  it('the currents at rest, on load and on charge are the book’s', () => {
    page.hold('no load: C discharges', ampsOf(answer.atRest.strings, 'C'));
    page.hold('no load: A and B each charged', -ampsOf(answer.atRest.strings, 'A'));
    page.hold('no load: A and B each charged', -ampsOf(answer.atRest.strings, 'B'));
    expect(answer.atRest.pairs).toMatchObject([
      { from: 'C', to: 'A' },
      { from: 'C', to: 'B' },
    ]);
    page.hold('80 A load: C', ampsOf(inCase(answer, 'load'), 'C'));
    page.hold('80 A load: A', ampsOf(inCase(answer, 'load'), 'A'));
    page.hold('60 A charge: C takes', -ampsOf(inCase(answer, 'charge'), 'C'));
    page.hold('60 A charge: A takes', -ampsOf(inCase(answer, 'charge'), 'A'));
    page.hold('80 A, equal rest voltage: C', ampsOf(inCase(answer, 'load with equal volts'), 'C'));
    page.hold('80 A, equal rest voltage: A', ampsOf(inCase(answer, 'load with equal volts'), 'A'));
  });

  it('says what flows with nothing switched on, who carries what, and where the split drifts', () => {
    const text = told(answer);
    expect(text).toContain(
      '20.1 A flows between the strings with nothing switched on: C gives, A and B take 10.1 A each.',
    );
    expect(text).toContain('C rests 0.15 V a block above A and B.');
    expect(text).toContain('C carries 72 % of the 80 A');
    expect(text).toContain('C takes 13 % of the 60 A');
    expect(text).toContain(
      'the split is by resistance alone: A 27 %, B 27 % and C 47 %; over hours it drifts towards capacity: A 30 %, B 30 % and C 40 %',
    );
  });

  // Volts of a bus are the solve's, and the four hours are walked through there too (the book's own curve of rest volts).
  closePage(page, [
    'no load bus',
    '80 A bus',
    'after 4 h at 80 A (150/150/200 Ah, EMF=11.75+0.95*SoC per block): C',
    'after 4 h: A',
    'after 4 h: SoC of C',
    'after 4 h: SoC of A',
    'load removed: A gives C',
  ]);
});

describe('S03, camper: two lithium blocks on leads of 0.5 m and 2.0 m', () => {
  const page = new ScenarioPage('S03');
  let answer: StringsAnswer;
  beforeAll(async () => {
    // |I1 - I2| within 10 % of the mean is each within 5 % of its half.
    answer = await stringsOf({ ...camper, settings: { shareLimit: 0.05 } });
  });

  it('the near block’s surplus, what equal leads do, and how long is long enough', () => {
    page.hold('near block', ampsOf(inCase(answer, 'as-drawn'), 'near'));
    page.hold('far block', ampsOf(inCase(answer, 'as-drawn'), 'far'));
    const layout = (name: string) => answer.layouts.find((each) => each.name.startsWith(name))!;
    page.hold('bus', layout('as drawn').bankV);
    page.hold('bus if both 2.0 m', layout('equal leads').bankV);
    expect(layout('equal leads').spread).toBeLessThan(1e-9);
    page.hold(
      'shortest near lead that keeps |difference| <= 10 % of mean',
      answer.leads?.leads.find(({ string }) => string === 'near')?.shortestM ?? 0,
    );
  });

  it('says the surplus, and the price of evenness', () => {
    expect(told(answer)).toContain('its fair share is 50 %, so it works at 118 % of it');
    expect(told(answer)).toMatch(/equal costs 65 mV at the taps at 150 A and equalises/);
  });

  closePage(page);
});

describe('S13, hill farm: blocks that differ along a 24 V and a 48 V bank', () => {
  const page = new ScenarioPage('S13');
  let answer: StringsAnswer;
  beforeAll(async () => {
    answer = await stringsOf(hillFarm());
  });

  it('the halves on both bases, and every block from the mean', () => {
    const [low, high] = answer.series;
    page.hold('24 V deviation, on total', 100 * (low?.midpoint?.onTotal ?? 0));
    page.hold('24 V deviation, on mean half', 100 * (low?.midpoint?.onMeanHalf ?? 0));
    page.hold('24 V difference', 1000 * (low?.midpoint?.differenceV ?? 0));
    page.hold('48 V midpoint deviation on total', 100 * (high?.midpoint?.onTotal ?? 0));
    page.hold('48 V block 3 from mean', 1000 * (high?.blocks[2]?.fromMeanV ?? 0));
    page.hold('48 V block 4 from mean', 1000 * (high?.blocks[3]?.fromMeanV ?? 0));
  });

  it('names the base of the percentage, and does not trust a good midpoint', () => {
    const text = told(answer);
    expect(text).toMatch(/2\.2 % of the total of 28\.80 V, or 4\.3 % of the mean half/);
    expect(text).toMatch(/The midpoint looks right \(0\.10 % of the total\) while 48 V block 3 is 730 mV below/);
    expect(text).toMatch(/reading of every block/);
  });

  closePage(page);
});

describe('S17, sauna hut: three lithium blocks that cut out at 100 A, a load of 240 A', () => {
  const page = new ScenarioPage('S17');
  let answer: StringsAnswer;
  beforeAll(async () => {
    answer = await stringsOf(saunaHut);
  });
  const without = (lost: string) => answer.oneOut.find((each) => each.lost === lost)!;

  it('the split with all three and with one out, and the loads that stand it', () => {
    page.hold('all three: blocks 1,2', ampsOf(inCase(answer, 'as-drawn'), 'block 1'));
    page.hold('all three: blocks 1,2', ampsOf(inCase(answer, 'as-drawn'), 'block 2'));
    page.hold('all three: block 3', ampsOf(inCase(answer, 'as-drawn'), 'block 3'));
    page.hold('block 2 off: block 1', ampsOf(without('block 2').strings, 'block 1'));
    page.hold('block 2 off: block 3', ampsOf(without('block 2').strings, 'block 3'));
    // By symmetry half of 240 A each, which the book gives without a tolerance; the solve ends within a microampere.
    expect(ampsOf(without('block 3').strings, 'block 1')).toBeCloseTo(120, 6);
    page.holdVerdict('block 3 off: each', 120);
    page.hold('largest load with all three', answer.oneOutStudy[0]?.largestA ?? 0);
    page.hold('largest load that survives any one loss', answer.oneOutStudy[0]?.survivesA ?? 0);
  });

  it('says that the rest follow the first', () => {
    expect(without('block 2').cascade.flat()).toEqual(['block 1', 'block 3']);
    expect(told(answer)).toContain('fine until one cuts out, then the rest follow: a cascade');
  });

  closePage(page);
});

describe('S19, hire boat: one of three parallel blocks has a dead cell', () => {
  const page = new ScenarioPage('S19');
  let answer: StringsAnswer;
  beforeAll(async () => {
    answer = await stringsOf(hireBoat);
  });

  it('the good blocks pour into the bad one', () => {
    page.hold('each good block gives', ampsOf(answer.atRest.strings, 'block 1'));
    page.hold('each good block gives', ampsOf(answer.atRest.strings, 'block 2'));
    page.hold('dead-cell block takes', -ampsOf(answer.atRest.strings, 'block 3'));
  });

  it('says stop before all else, and what kind of figure this is', async () => {
    expect(answer.says[0]).toMatchObject({ urgent: true });
    expect(answer.says[0]?.text).toMatch(/^Stop: isolate block 3 now\..*Gas and heat hazard: .*do not charge it\.$/);
    expect(told(answer)).toContain(
      'In the first moment it is up to 171 A, an upper bound: it falls as block 3 polarises',
    );
    const person = await runCli(['strings', '-', '--draws', '50'], { input: jobText(hireBoat) });
    expect(person.stdout).toMatch(/^Stop: isolate block 3 now/m);
  });

  closePage(page, ['bus at rest']);
});
