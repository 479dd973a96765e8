/** Fuses and cables of the acceptance scenarios and of the collected check values: what is accepted, what is chosen, what is said. */
import { describe, expect, it } from 'vitest';
import { draftOf, type FuseWindow, fuseWindowOf, type PartId, proposeProtection, windowFrom } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { oneCircuit, type RawJob } from '../core/checksJob.ts';
import { closePage, inputsOf, ScenarioPage } from './scenariosBook.ts';

function opened(raw: RawJob) {
  const draft = draftOf(JSON.stringify({ format: 'ohmwright-job', version: 1, title: 'a job for a test', ...raw }));
  if (!draft.ok) throw new Error(JSON.stringify(draft.issues));
  return draft.value;
}

function windowOf(raw: RawJob, part = 'F1'): FuseWindow {
  const window = fuseWindowOf({ job: opened(raw).job, tables, part: part as PartId });
  if ('missing' in window) throw new Error(window.missing);
  return window;
}

const only = (raw: RawJob) => proposeProtection({ ...opened(raw), tables }).runs.find(({ role }) => role === 'load')!;

interface Van {
  readonly W: number;
  readonly eff: number;
  readonly V_design: number;
  readonly factor: number;
  readonly ampacity_entered: Readonly<Record<string, number>>;
  readonly fuse_series: readonly number[];
  readonly fuse_distance_m: number;
}

describe('S07, panel van: fuse and cable of the 2000 W inverter', () => {
  const page = new ScenarioPage('S07');
  const {
    W,
    eff,
    V_design,
    factor,
    ampacity_entered: entered,
    fuse_series: series,
    fuse_distance_m,
  } = inputsOf('S07') as Van;
  const loadA = W / (eff * V_design);
  const windowWith = (wireA: number, fuseA: number | null) =>
    windowFrom(
      { loadA, continuousA: factor * loadA, fuseA, wireA, allowedA: wireA, how: '100 % of the ampacity' },
      series,
    );
  /** The van with a cable that a book rates about as the owner does: 209 A for 50 mm2, 269 A for 70 mm2. */
  const van = (size: string) => ({
    practice: 'iec-land',
    ...oneCircuit({
      battery: { emfV: 11.6, resistanceOhm: 0.001 },
      fuse: { ratingA: 175, distanceFromSourceM: fuse_distance_m },
      cable: { size, insulationDegC: 90, run: 'free-air', resistanceOhm: undefined },
      load: { currentA: loadA, continuous: true },
    }),
  });

  it('takes 241.5 A of margin, a 250 A fuse over 70 mm2, and neither 50 mm2 nor 175 A', () => {
    page.hold('continuous current', loadA);
    const thick = windowWith(entered['70 mm2']!, null);
    page.hold('x 1.25', thick.continuousA);
    page.holdVerdict('fuse chosen', thick.standardInside[0]!);
    page.holdVerdict('50 mm2 accepted', windowWith(entered['50 mm2']!, null).fits);
    page.holdVerdict('70 mm2 accepted', thick.fits);
    page.holdVerdict('owner proposal 175 A accepted', windowWith(entered['50 mm2']!, 175).fits);
  });
  closePage(page);

  it('says of the owner’s figures what is wrong with each', () => {
    expect(windowWith(200, 250).words).toContain('250 A does not protect a cable of 200 A');
    expect(windowWith(200, 250).words).toContain('none fits: cable too thin');
    expect(windowWith(200, 175).words).toContain('175 A is under the running current 193.2 A: it will open in use');
  });

  it('proposes 250 A and 70 mm2, and says why not what stands', () => {
    const run = only(van('50 mm2'));
    expect(run.words).toBe(
      '250 A fuse F1 instead of 175 A; OUT 70 mm² instead of 50 mm²; BACK 70 mm² instead of 50 mm²',
    );
    const said = run.alternatives.map(({ words, why }) => `${words}: ${why}`).join('\n');
    expect(said).toContain('175 A at F1: under the running current 193.2 A: it will open in use');
    expect(said).toContain('250 A does not protect a cable of 209 A');
    const reasons = run.reasons.join('\n');
    expect(reasons).toContain('1.25 × 193.2 A = 241.5 A; next standard rating 250 A at F1');
    expect(reasons).toContain('0.6 m of unfused cable from its source: shorten or enclose it');
    expect(reasons).toContain('boat rules, so ask local code');
  });
});

describe('T24: 42 A for hours', () => {
  const circuit = (size: string, ratingA: number) => ({
    practice: 'us-land',
    ...oneCircuit({
      fuse: { ratingA },
      cable: { size, insulationDegC: 60 },
      load: { currentA: 42, continuous: true },
    }),
  });

  it('is 52.5 A with its margin, and wants a 60 A fuse, over a 55 A cable only by the next size up', () => {
    const window = windowOf(circuit('6 AWG', 60));
    expect(window.continuousA).toBeCloseTo(52.5, 9);
    expect([window.wireA, window.allowedA, window.how, window.standardInside]).toStrictEqual([
      55,
      60,
      'next standard size up',
      [60],
    ]);
  });

  it('is proposed for a 100 A fuse, the cable kept, with the sum', () => {
    const run = only(circuit('6 AWG', 100));
    expect([run.verdict, run.words]).toStrictEqual(['change', '60 A fuse F1 instead of 100 A']);
    expect(run.reasons[0]).toBe(
      '1.25 × 42 A = 52.5 A; next standard rating 60 A at F1; cable OUT (6 AWG) carries 55 A here; 60 A is admitted over it by the rule next standard size up (at most 60 A).',
    );
  });
});

describe('T8: 10 AWG at 105 °C', () => {
  const wire = (practice: string, run: string) => ({
    practice,
    ...oneCircuit({
      fuse: { ratingA: 20 },
      cable: { size: '10 AWG', insulationDegC: 105, run },
      load: { currentA: 10 },
    }),
  });
  it.each([
    ['us-marine', 'free-air', 60, 90],
    ['us-marine', 'engine-space', 51, 76.5],
  ])('by %s in %s carries %d A, which admits %d A', (practice, run, wireA, allowedA) => {
    const window = windowOf(wire(practice, run));
    expect(window.wireA).toBeCloseTo(wireA, 9);
    expect(window.allowedA).toBeCloseTo(allowedA, 9);
  });
  it('by the land book of the same country is capped at 30 A', () => {
    const window = windowOf(wire('us-land', 'free-air'));
    expect(window.capA).toBe(30);
    expect(Math.max(...window.standardInside)).toBe(30);
  });
});
