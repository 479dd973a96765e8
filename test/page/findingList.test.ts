import { describe, expect, test } from 'vitest';
import type { Finding } from '../../core/api.ts';
import { parseJob, runChecks } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { countWords } from '../../renderer/stages/findings/FindingsStage.tsx';
import { choices, drawnParts, filtered, listed, NO_FILTER } from '../../renderer/stages/findings/findingList.ts';
import { barShares } from '../../renderer/stages/findings/LimitBar.tsx';
import { missingFigures, waitsForPractice } from '../../renderer/stages/findings/notDone.ts';

function jobOf(text: string) {
  const read = parseJob(text);
  if (!read.ok) throw new Error(read.issues.map(({ message }) => message).join(' '));
  return read.value;
}

/** The invented sloop in which four troubles were put on purpose. */
const sloop = jobOf(examples.find(({ name }) => name === 'sloop-with-seeded-trouble')?.text ?? '');
const sloopReport = runChecks({ job: sloop, tables });
const all = listed(sloopReport.findings);

const hutText = {
  format: 'ohmwright-job',
  version: 1,
  title: 'Hut',
  parts: [
    {
      id: 'B1',
      kind: 'string',
      plus: 'P',
      minus: 'N',
      chemistry: 'agm',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 100,
    },
    { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 60 },
    { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', powerW: 60, minimumV: 10 },
    { id: 'L2', kind: 'load', plus: 'Q', minus: 'N', powerW: 60, minimumV: 10 },
  ],
};

describe('the list of findings', () => {
  test('keeps the order of the checks, worst first, and gives each finding a name of its own', () => {
    expect(all.map(({ finding }) => finding)).toEqual(sloopReport.findings);
    expect(new Set(all.map(({ key }) => key)).size).toBe(all.length);
  });

  test('a finding keeps its name when its figures change, so that what is open stays open', () => {
    const [first] = sloopReport.findings;
    const changed: Finding = { ...first!, measured: { value: 1, unit: 'A' }, message: 'other words' };
    expect(listed([changed])[0]?.key).toBe(all[0]?.key);
  });

  test('a filter by severity, part, case, family or words leaves only what it names', () => {
    const stops = filtered(all, { ...NO_FILTER, severities: new Set(['stop']) }, sloop);
    expect(stops.length).toBeGreaterThan(0);
    expect(stops.every(({ finding }) => finding.severity === 'stop')).toBe(true);

    const ofShore = filtered(all, { ...NO_FILTER, part: 'SHORE' }, sloop);
    expect(ofShore.length).toBeGreaterThan(0);
    expect(ofShore.every(({ finding }) => finding.parts.some((id) => id === 'SHORE'))).toBe(true);

    const bilge = filtered(all, { ...NO_FILTER, case: 'bilge', family: 'voltage', text: 'PUMP lost' }, sloop);
    expect(bilge.map(({ finding }) => finding.rule)).toEqual(['drop-too-big']);
    expect(filtered(all, { ...NO_FILTER, text: 'no such words' }, sloop)).toEqual([]);
  });

  test('either conductor of an out-and-back run stands for the run', () => {
    const cable = all.find(({ finding }) => finding.parts.some((id) => id === 'W-INV.minus'));
    expect(drawnParts(sloop, cable!.finding.parts)).toContain('W-INV');
    expect(choices(all, sloop).parts).toContain('W-INV');
    expect(filtered(all, { ...NO_FILTER, part: 'W-INV' }, sloop)).toContain(cable);
  });

  test('the count is told in a sentence, also where there is no finding', () => {
    const told = `${String(sloopReport.findings.length)} findings, worst first: 2 stop, `;
    expect(countWords(sloopReport).startsWith(told)).toBe(true);
    expect(countWords(sloopReport)).toMatch(
      /\d fix, \d+ look\. \d+ comparisons held; \d+ not done for want of a figure\.$/,
    );
    const clear = { findings: [], notChecked: [], passed: [{ rule: 'end-open', count: 7 }] };
    expect(countWords(clear)).toBe('No finding in 7 checks; every check had its figures.');
  });
});

describe('the bar of measured against limit', () => {
  const bar = (measured: number, limit: number, unit = 'A') =>
    barShares({ measured: { value: measured, unit }, limit: { value: limit, unit } });

  test('begins at nought, so that twice the amps are twice the length', () => {
    const shares = bar(150, 75);
    // Shares are a quotient of two figures: equal to rounding.
    expect(shares!.measured / shares!.limit).toBeCloseTo(2, 12);
    expect(shares!.measured).toBeLessThan(1);
  });

  test('is left out where it would mislead: temperatures, negative figures, figures of two units, nought against nought', () => {
    expect(bar(-5, 10, 'degC')).toBeNull();
    expect(bar(-5, 10)).toBeNull();
    expect(bar(0, 0)).toBeNull();
    expect(bar(Number.POSITIVE_INFINITY, 10)).toBeNull();
    expect(barShares({ measured: { value: 1, unit: 'A' }, limit: { value: 1, unit: 'V' } })).toBeNull();
  });
});

describe('checks not done', () => {
  const hut = jobOf(JSON.stringify(hutText));
  const rows = runChecks({ job: hut, tables }).notChecked;
  const figures = missingFigures(rows, hut);

  test('every one of them stands under exactly one missing figure', () => {
    const counted = figures.reduce((sum, { checks }) => sum + checks.length, 0);
    expect(counted).toBe(rows.length);
  });

  test('a missing rating names its part and its field, to be filled in place', () => {
    const rating = figures.find(({ fields }) => fields.some(({ part, field }) => part === 'F1' && field === 'ratingV'));
    expect(rating?.checks.map(({ rule }) => rule)).toContain('volts-rating-low');
  });

  test('the rules of a book wait together for the choice of the book', () => {
    const waiting = figures.filter(waitsForPractice);
    expect(waiting).toHaveLength(1);
    expect(waiting[0]?.checks.length).toBeGreaterThan(1);
  });
});
