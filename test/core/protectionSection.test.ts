/** What the report tells of short circuits: the figures of the study and no others, the answer first. */
import { describe, expect, test } from 'vitest';
import { buildReport } from '../../core/report/buildReport.ts';
import { Citations } from '../../core/report/citations.ts';
import type { Block, TableBlock } from '../../core/report/document.ts';
import { cellText } from '../../core/report/document.ts';
import { cableFaultSchedule, deviceFaultSchedule } from '../../core/report/faultSchedules.ts';
import type { ReportInput } from '../../core/report/input.ts';
import { protectionSection } from '../../core/report/protectionSection.ts';
import weekendHut from '../../data/examples/weekend-hut.job.json';
import { protectedInput, solvedInput } from './reportInput.ts';

/** A string of 12.8 V and 5 mΩ; a 100 A fuse on it; a 10 A fuse to a lamp at the end of 20 m of thin cable. */
const hut = (main: object = {}, branch: object = {}) => ({
  format: 'ohmwright-job',
  version: 1,
  title: 'Two fuses',
  practice: 'iec-land',
  parts: [
    {
      id: 'S',
      kind: 'string',
      plus: 'S+',
      minus: 'S-',
      chemistry: 'agm',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 100,
      emfV: 12.8,
      resistanceOhm: 0.005,
    },
    {
      id: 'F1',
      kind: 'fuse',
      from: 'S+',
      to: 'BUS',
      ratingA: 100,
      ratingV: 32,
      interruptA: 2000,
      resistanceOhm: 0,
      ...main,
    },
    { id: 'F2', kind: 'fuse', from: 'BUS', to: 'OUT', ratingA: 10, ratingV: 32, resistanceOhm: 0, ...branch },
    {
      id: 'W',
      kind: 'pair',
      from: { plus: 'OUT', minus: 'S-' },
      to: { plus: 'L+', minus: 'L-' },
      lengthM: 20,
      size: '1 mm2',
    },
    { id: 'L', kind: 'load', plus: 'L+', minus: 'L-', powerW: 20 },
    { id: 'P', kind: 'load', plus: 'BUS', minus: 'S-', powerW: 20 },
  ],
});

const sectionOf = (input: ReportInput): readonly Block[] => protectionSection(input, new Citations());
const wordsOf = (blocks: readonly Block[]): string => JSON.stringify(blocks).replaceAll('\u00a0', ' ');
const rowsOf = (table: TableBlock | undefined) => (table?.rows ?? []).map((row) => row.map(cellText));
const tableCalled = (blocks: readonly Block[], caption: string) =>
  blocks.find((block): block is TableBlock => block.kind === 'table' && block.caption.startsWith(caption));

const plain = protectedInput(hut());
const full = protectedInput(
  hut({ type: 'class_T', preArcI2t: 9000, totalI2t: 20000 }, { type: 'blade', interruptA: 3000 }),
);

describe('the section on short circuits', () => {
  test('begins with the most that can flow and with what is not rated for it', () => {
    // 12.8 V over 5 mΩ is 2560 A, more than the 2000 A that F1 interrupts.
    expect(sectionOf(plain)[1]).toMatchObject({
      kind: 'paragraph',
      tone: 'lead',
      text: 'A short circuit sends at most 2560 A, at S+ to S-. Rated to interrupt less than may flow through them: F1. No interrupt rating given: F2. Times not given: F1 and F2.',
    });
  });

  test('puts junctions without resistance between them in one row, plain and IEC side by side, and leaves out the return', () => {
    const table = tableCalled(sectionOf(plain), 'Short-circuit currents, each to S-');
    expect(table?.columns.map(({ head }) => head)).toEqual([
      'Junction',
      'Highest',
      'Lowest',
      'Source',
      'IEC first',
      'IEC settled',
    ]);
    const [first, far, ...rest] = rowsOf(table);
    // IEC 61660-1: 12.8 V / (0.9 · 5 mΩ) = 2844 A, then 0.95 · 12.8 V / 5 mΩ = 2432 A.
    expect(first).toEqual(['S+, BUS, OUT', '2560', expect.any(String), '5.00', '2844', '2432']);
    expect(far?.[0]).toBe('L+');
    expect(rest).toEqual([]);
    expect(table?.notes.join(' ')).toMatch(/plain Thévenin.*IEC: the highest by the battery branch of IEC 61660-1/);
  });

  test('tells of every device in series which opens before which, and by what', () => {
    const table = tableCalled(sectionOf(plain), 'Selectivity');
    expect(rowsOf(table)).toEqual([['F2', 'F1', '10 A behind 100 A', '10.00', '2.0', 'opens alone', 'ratings']]);
    const close = tableCalled(sectionOf(protectedInput(hut({}, { ratingA: 80 }))), 'Selectivity');
    expect(rowsOf(close)[0]?.slice(3, 6)).toEqual(['1.25', '2.0', 'both may open']);
  });

  test('is left out without a study, and with no source to feed a fault', () => {
    expect(sectionOf(solvedInput(hut()))).toEqual([]);
    const lone = { ...hut(), parts: hut().parts.filter(({ id }) => id !== 'S') };
    expect(sectionOf(protectedInput(lone))).toEqual([]);
  });
});

describe('beside the schedules', () => {
  test('each device has its highest and lowest, its margin, when it opens by which band, and the one ahead', () => {
    const [table] = deviceFaultSchedule(full, new Citations());
    const [main, branch] = rowsOf(table);
    expect(main?.slice(0, 4)).toEqual(['F1', '2560', '2000', '−560']);
    expect(branch?.slice(0, 4)).toEqual(['F2', '2560', '3000', '440']);
    // 40 m of 1 mm² at 18.1 mΩ/m cold, a fifth more when hot: some 14 A, far below what opens a 10 A blade fuse quickly.
    expect(Number(branch?.[4])).toBeGreaterThan(12);
    expect(Number(branch?.[4])).toBeLessThan(15.5);
    expect(branch?.[5]).toBe('L+');
    expect(branch?.slice(7)).toEqual(['generic, blade [2]', 'F1, 100 A', '10.0']);
    expect(table?.notes.join(' ')).toContain('Get the maker’s curve');
  });

  test('a device of unknown times says so, and has no time', () => {
    const [table] = deviceFaultSchedule(plain, new Citations());
    expect(rowsOf(table)[0]?.slice(6, 8)).toEqual(['—', 'type not given']);
  });

  test('each cable has k²S² against what its device lets through', () => {
    const [table] = cableFaultSchedule(full, new Citations());
    const row = rowsOf(table).find(([cable]) => cable === 'W.plus');
    // k of PVC 70 °C copper is 115: (115 · 1 mm²)² = 13 225 A²s.
    expect(row?.slice(0, 3)).toEqual(['W.plus', 'F2', '13.2']);
    expect(table?.notes.join(' ')).toContain('insulation ordinary PVC, 70 °C');
  });
});

test('a small job stays short: five rows for its ten live junctions, and no promise in the words', () => {
  const input = protectedInput(weekendHut);
  const { blocks } = buildReport(input);
  expect(rowsOf(tableCalled(blocks, 'Short-circuit currents'))).toHaveLength(5);
  expect(wordsOf(blocks)).not.toMatch(/\b(compliant|approved|guaranteed|certified|is safe|are safe|now safe)\b/i);
});
