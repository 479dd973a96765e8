/** What the tab Protection works out for itself: places on its bars and pictures, words, and which findings two rule books share. */
import { describe, expect, test } from 'vitest';
import type { CheckReport, DeviceBand, DeviceStudy, Finding, FuseWindow, PartId } from '../../core/api.ts';
import { comparePractices } from '../../core/api.ts';
import { windowShares } from '../../renderer/charts/FuseWindowBar.tsx';
import {
  axesOf,
  bandOutline,
  currentAt,
  noLater,
  withstandLine,
  xOf,
  yOf,
} from '../../renderer/charts/timeCurrentShape.ts';
import { sortedProposals } from '../../renderer/stages/findings/proposalOrder.ts';
import {
  protectionTitle,
  timeCurrentTitle,
  windowFigures,
  worstFirst,
} from '../../renderer/stages/findings/protectionWords.ts';
import type { ListedProposal } from '../../renderer/workers/protectionMessages.ts';

const F1 = 'F1' as PartId;
const PLOT = { left: 0, right: 400, top: 0, bottom: 300 };

const window: FuseWindow = {
  loadA: 20,
  continuousA: 25,
  fuseA: 30,
  wireA: 40,
  allowedA: 40,
  how: 'the ampacity',
  standardInside: [25, 30, 35, 40],
  fits: true,
  words: '25 A ≤ fuse ≤ 40 A; 30 A lies inside',
};

const band: DeviceBand = {
  device: F1,
  kind: 'fuse',
  ratingA: 30,
  type: 'invented',
  from: 'generic',
  points: [
    { currentA: 33, meltS: 360_000, clearS: Number.POSITIVE_INFINITY },
    { currentA: 60, meltS: 10, clearS: 100 },
    { currentA: 600, meltS: 0.01, clearS: 0.1 },
  ],
  preArcI2t: null,
  totalI2t: null,
  basis: { source: 'SRC-TEST', text: 'invented', status: 'from-memory' },
};

const study: DeviceStudy = {
  id: F1,
  kind: 'fuse',
  ratingA: 30,
  interruptA: 1000,
  ok: true,
  window,
  band,
  fault: {
    device: F1,
    at: 'P' as never,
    highestA: 900,
    lowestAt: 'L' as never,
    lowestTo: 'N' as never,
    lowestA: 480,
    fromBothSides: false,
    sides: [],
  },
  clearing: {
    device: F1,
    currentA: 480,
    clearS: 0.2,
    holdS: 0.02,
    clears: true,
    letThroughI2t: 46_080,
    beyond: false,
    text: 'at 480 A it has opened by 0.2 s',
  },
  atHighest: null,
  upstream: null,
  downstream: null,
  withstand: null,
  letThrough: null,
  surges: [],
};

describe('the bar of a window', () => {
  test('load, margin, fuse and wire stand in their proportion, the longest a little short of the edge', () => {
    const { load, continuous, fuse, most, isOpen } = windowShares(window);
    for (const [share, part] of [
      [load, 0.5],
      [continuous, 0.625],
      [fuse, 0.75],
    ] as const) {
      // Two divisions of doubles.
      expect((share ?? 0) / most).toBeCloseTo(part, 12);
    }
    expect(most).toBeLessThan(1);
    expect(isOpen).toBe(true);
  });

  test('a cap for small wires comes before the ampacity', () => {
    expect(windowShares({ ...window, capA: 30 }).fuse).toBe(windowShares({ ...window, capA: 30 }).most);
  });

  test('where what flows needs more than the wire admits the window is shut', () => {
    expect(windowShares({ ...window, allowedA: 24 }).isOpen).toBe(false);
  });

  test('standard sizes that would run into one another are thinned', () => {
    const standardInside = Array.from({ length: 400 }, (_, index) => 1 + index / 10);
    expect(windowShares({ ...window, standardInside }).standard.length).toBeLessThan(90);
  });

  test('the figures stand between their signs, with the margin only where there is one', () => {
    expect(windowFigures(window)).toBe('load 20 A (25 A with margin) ≤ fuse 30 A ≤ wire 40 A');
    expect(windowFigures({ ...window, continuousA: 20, fuseA: null })).toBe('load 20 A ≤ fuse ? ≤ wire 40 A');
    expect(windowFigures({ ...window, fuseA: 60 })).toBe('load 20 A (25 A with margin) ≤ fuse 60 A > wire 40 A');
    expect(windowFigures({ ...window, continuousA: 20, fuseA: 15 })).toBe('load 20 A > fuse 15 A ≤ wire 40 A');
  });
});

describe('the time–current picture', () => {
  const axes = axesOf(study, PLOT);

  test('its axes are whole decades round everything that is drawn', () => {
    expect([axes.fromA, axes.toA]).toEqual([10, 1000]);
    expect(xOf(axes, 100)).toBeCloseTo(200, 9);
    expect(yOf(axes, 0.001)).toBe(PLOT.bottom);
  });

  test('a band leaves the plot at the top, where it need not open, and its outline goes round both edges', () => {
    const outline = bandOutline(band, axes) ?? [];
    expect(outline[0]?.[1]).toBeLessThan(PLOT.top);
    expect(outline.at(-1)?.[1]).toBeLessThan(PLOT.top);
    expect(outline).toContainEqual([xOf(axes, 600), yOf(axes, 0.01)]);
    expect(outline).toContainEqual([xOf(axes, 600), yOf(axes, 0.1)]);
  });

  test('beyond its last point it has opened no later; where I²t is known the band itself goes on', () => {
    expect(noLater(band, axes).map(([, y]) => y)).toEqual([yOf(axes, 0.1), yOf(axes, 0.1)]);
    const known = { ...band, preArcI2t: 3600, totalI2t: 36_000 };
    expect(noLater(known, axes)).toEqual([]);
    expect(bandOutline(known, axes)).toContainEqual([xOf(axes, 1000), yOf(axes, 0.0036)]);
  });

  test('the name of a band stands where it has opened by a time, read off on both logarithms', () => {
    expect(currentAt(band, 'clearS', Math.sqrt(10))).toBeCloseTo(Math.sqrt(60 * 600), 6);
    expect(currentAt(band, 'clearS', 0.01)).toBeNull();
  });

  test('what a cable stands falls by two decades of time over one of current', () => {
    const [[fromX, fromY], [toX, toY]] = withstandLine(250_000, axes) as [[number, number], [number, number]];
    const perDecadeX = 200;
    const perDecadeY = yOf(axes, 0.01) - yOf(axes, 0.1);
    expect((toY - fromY) / perDecadeY / ((toX - fromX) / perDecadeX)).toBeCloseTo(2, 6);
  });
});

describe('the words', () => {
  test('the title of a picture is its answer', () => {
    const within = timeCurrentTitle(study).replaceAll('\u00a0', ' ');
    expect(within).toBe('F1 opens within 200 ms at the lowest fault, 480 A');
    const may = { ...study, clearing: { ...study.clearing!, clearS: null, clears: false } };
    expect(timeCurrentTitle(may)).toBe('F1 need not open at the lowest fault, 480 A');
    const unknown = { ...study, band: { missing: 'type of fuse F1' }, clearing: null };
    expect(timeCurrentTitle(unknown)).toMatch(/is not known$/);
    expect(timeCurrentTitle({ ...study, fault: null })).toMatch(/^No source reaches F1/);
  });

  test('the title of the tab counts what is wrong, and never says that all is well while figures are missing', () => {
    expect(protectionTitle([study])).toBe(
      'Of the one fuse or breaker, none lies outside its window, and each opens its faults',
    );
    expect(protectionTitle([{ ...study, ok: null }])).toMatch(/some figures are missing/);
    const outside = { ...study, window: { ...window, fits: false } };
    expect(protectionTitle([study, outside, { ...study, ok: false }])).toBe(
      'Of 3 fuses and breakers, 1 lies outside its window; 1 cannot interrupt the highest fault',
    );
  });

  test('the device with the worst finding about itself stands first', () => {
    const other = { ...study, id: 'F2' as PartId };
    const rows = worstFirst([study, other], [finding({ parts: ['F2' as PartId], severity: 'fix' })]);
    expect(rows.map(({ device }) => device.id)).toEqual(['F2', 'F1']);
  });
});

function finding(over: Partial<Finding>): Finding {
  return {
    rule: 'fuse-over-cable',
    severity: 'fix',
    parts: [F1],
    case: 'day',
    measured: { value: 60, unit: 'A' },
    limit: { value: 40, unit: 'A' },
    message: 'A fuse is too large.',
    remedy: 'Fit a smaller one.',
    basis: 'a book',
    basisStatus: 'published',
    ...over,
  };
}

describe('the same job under two rule books', () => {
  const report = (findings: readonly Finding[]): CheckReport => ({ findings, notChecked: [], passed: [] });

  test('a finding of one book alone, another severity and another limit differ; another clause does not', () => {
    const same = finding({ rule: 'load-unfed' });
    const own = report([finding({}), same, finding({ rule: 'cable-too-thin' })]);
    const other = report([finding({ limit: { value: 60, unit: 'A' } }), { ...same, basis: 'another clause' }]);
    const { apart, alike } = comparePractices(own, other);
    expect(apart.map(({ key, other: has }) => [key, has === null])).toEqual([
      ['["fuse-over-cable","F1"]', false],
      ['["cable-too-thin","F1"]', true],
    ]);
    expect(alike.map(({ key }) => key)).toEqual(['["load-unfed","F1"]']);
  });

  test('what only the other book finds is among them, the worst first', () => {
    const { apart } = comparePractices(
      report([finding({})]),
      report([finding({ rule: 'no-fuse-on-source', severity: 'stop' })]),
    );
    expect(apart.map(({ own, other }) => [own?.rule, other?.rule])).toEqual([
      [undefined, 'no-fuse-on-source'],
      ['fuse-over-cable', undefined],
    ]);
  });

  test('a figure that differs by rounding alone is the same', () => {
    const { apart } = comparePractices(
      report([finding({})]),
      report([finding({ limit: { value: 40 + 1e-12, unit: 'A' } })]),
    );
    expect(apart).toEqual([]);
  });
});

test('proposals stand cheapest first, what nothing solves after them, and what stays apart', () => {
  const run = (id: string, over: Partial<ListedProposal>): ListedProposal => ({
    id: id as PartId,
    title: id,
    role: 'load',
    verdict: 'change',
    words: '',
    devices: [],
    cables: [],
    cost: { copperMmm2: 0, newDevices: 0, swappedDevices: 0 },
    reasons: [],
    alternatives: [],
    solves: [],
    left: [],
    canTake: true,
    ...over,
  });
  const dear = run('dear', { cost: { copperMmm2: 500, newDevices: 0, swappedDevices: 0 } });
  const cheap = run('cheap', { cost: { copperMmm2: 0, newDevices: 0, swappedDevices: 1 } });
  const none = run('none', { canTake: false, verdict: 'none-fits' });
  const kept = run('kept', { canTake: false, verdict: 'keep' });
  const sorted = sortedProposals([none, dear, kept, cheap]);
  expect(sorted.open.map(({ id }) => id)).toEqual(['cheap', 'dear', 'none']);
  expect(sorted.kept.map(({ id }) => id)).toEqual(['kept']);
});
