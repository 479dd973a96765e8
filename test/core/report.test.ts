/** The report's document tree: what must stand in it, in which order, and what must never. */
import { describe, expect, test } from 'vitest';
import type { CheckReport } from '../../core/checks/finding.ts';
import type { PartId } from '../../core/job/part.ts';
import { buildReport } from '../../core/report/buildReport.ts';
import { cautionBases } from '../../core/report/cautions.ts';
import type { Block, EntryBlock, HeadingBlock, ReportDocument, TableBlock } from '../../core/report/document.ts';
import { cellText } from '../../core/report/document.ts';
import { worstFirst } from '../../core/report/findingSection.ts';
import sourcesPage from '../../data/SOURCES.md?raw';
import { solvedInput, studiedInput } from './reportInput.ts';
import { cabin, van } from './reportJobs.ts';
import { assumption, cabinChecks, cabinInput, point, REMEMBERED } from './reportSample.ts';

const ofKind = <K extends Block['kind']>(report: ReportDocument, kind: K): readonly Extract<Block, { kind: K }>[] =>
  report.blocks.filter((block): block is Extract<Block, { kind: K }> => block.kind === kind);
const headings = (report: ReportDocument, level: number): readonly string[] =>
  ofKind(report, 'heading')
    .filter((block: HeadingBlock) => block.level === level)
    .map(({ text }) => text);
const tableCalled = (report: ReportDocument, caption: string): TableBlock => {
  const found = ofKind(report, 'table').find((block) => block.caption.startsWith(caption));
  if (found === undefined) throw new Error(`no table called ${caption}`);
  return found;
};
/** Every word that a reader of the paper meets. */
function wordsOf(report: ReportDocument): string {
  const strings: string[] = [];
  const collect = (value: unknown): void => {
    if (typeof value === 'string') strings.push(value);
    else if (Array.isArray(value)) value.forEach(collect);
    else if (value !== null && typeof value === 'object') Object.values(value).forEach(collect);
  };
  collect(report);
  return strings.join('\n').replaceAll('\u00a0', ' ');
}

const studiedCabin = studiedInput(cabin);
const cabinReport = buildReport(studiedCabin);
const sampleReport = buildReport(cabinInput());

describe('what stands in a report', () => {
  test('the sections come in the order in which they are read', () => {
    expect(headings(cabinReport, 1)).toEqual([
      'Summary',
      'One-line diagram',
      'What was assumed',
      'Parts',
      'Operating cases',
      'Strings',
      'Findings',
      'Proof of balance',
      'Readings and test record',
      'Sources',
      'Statement',
    ]);
  });

  test('the cover says for whom, by which practice and edition, what system, and leaves room for signature and check', () => {
    const [cover] = ofKind(cabinReport, 'cover');
    const facts = new Map(cover?.facts.map(({ label, value }) => [label, value]));
    expect(facts.get('Prepared for')).toBe('The hut association (invented)');
    expect(facts.get('Edition')).toBe('IEC 60364-4-43:2008, as adopted locally');
    expect(facts.get('Practice')).toContain('IEC 60364');
    expect(facts.get('System')).toContain('24 V nominal');
    // 3 strings x 2 blocks x 12 V x 200 Ah = 14.4 kWh.
    expect(facts.get('Bank')).toBe('3 strings of 2 × 12 V, 200 Ah, lead-acid, AGM; 14.4 kWh by label');
    expect(cover?.blanks.join(' ')).toMatch(/signature.*licence.*checked against \(code, edition\).*checked by/i);
    expect(cover?.statement.join(' ')).toMatch(
      /local code.*makers' instructions.*inspector.*licensed electrician.*prevail/,
    );
  });

  test('a job that names no practice is not said to be judged by one', () => {
    const { practice: _practice, ...nameless } = van;
    const [cover] = ofKind(buildReport(solvedInput(nameless)), 'cover');
    expect(cover?.facts.find(({ label }) => label === 'Practice')?.value).toContain('not named in the job');
  });

  test('every part of the job stands in a schedule', () => {
    const input = solvedInput(cabin);
    const start = cabinReport.blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Parts');
    const end = cabinReport.blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Operating cases');
    const listed = new Set(
      cabinReport.blocks
        .slice(start, end)
        .flatMap((block) => (block.kind === 'table' ? block.rows : []))
        .map((row) => (typeof row[0] === 'string' ? row[0] : row[0]?.text)),
    );
    for (const part of input.job.parts) expect(listed).toContain(part.kind === 'pair' ? `${part.id}.plus` : part.id);
  });

  test('sizes and lengths are told in both notations', () => {
    const rows = tableCalled(cabinReport, 'Conductor schedule').rows.map((row) =>
      row.map(cellText).join(' | ').replaceAll('\u00a0', ' '),
    );
    // 24 ft x 0.3048 = 7.3152 m; 2/0 AWG is 67.4 mm² by ASTM B258.
    expect(rows.find((row) => row.startsWith('W-FRIDGE.plus'))).toContain('7.32 24 ft');
    expect(rows.find((row) => row.startsWith('C-INV+'))).toContain('2/0 AWG ≈ 67.4 mm²');
    // 6 mm² lies between 10 AWG (5.26) and 9 AWG (6.63), nearer to 9 by ratio.
    expect(rows.find((row) => row.startsWith('W-FRIDGE.plus'))).toContain('6 mm² ≈ 9 AWG');
  });

  test('every assumption of every case is told with its origin and its status', () => {
    const input = solvedInput(cabin);
    const table = tableCalled(cabinReport, 'Figures taken by the program');
    const rows = table.rows.map((row) => row.map(cellText).join(' | '));
    const assumptions = input.points.flatMap((one) => one.assumptions);
    expect(assumptions.length).toBeGreaterThan(10);
    for (const { part, basis } of assumptions) {
      const status = {
        published: 'published',
        'common-practice': 'common practice, no source',
        'from-memory': 'from memory',
      }[basis.status];
      expect(
        rows.some((row) => row.includes(part ?? 'the whole system') && row.includes(status) && row.includes('default')),
      ).toBe(true);
    }
  });

  test('figures of the job that were measured or guessed say so, with their range', () => {
    const rows = tableCalled(cabinReport, 'Figures of the job').rows.map((row) =>
      row.map(cellText).join(' | ').replaceAll('\u00a0', ' '),
    );
    expect(rows).toEqual([
      'S-C | Resistance | 6.10 mΩ | 5.80 mΩ – 6.40 mΩ | measured',
      'S-C | Age | 1 year | — | guess',
    ]);
  });

  test('findings stand worst first, each with what, where, measured, limit, remedy, basis and status', () => {
    const entries = ofKind(sampleReport, 'entry');
    expect(entries.map(({ word }) => word)).toEqual(['STOP', 'FIX', 'LOOK', 'NOTE']);
    const facts = (entry: EntryBlock | undefined): string =>
      entry?.facts
        .map(({ label, value }) => `${label}: ${value}`)
        .join('\n')
        .replaceAll('\u00a0', ' ') ?? '';
    expect(facts(entries[0])).toContain('Measured: 8.12 kA, limit 5 kA');
    expect(facts(entries[0])).toContain('Basis: IEC 60364-4-43:2008, clause 434.5.1 (published)');
    expect(facts(entries[2])).toContain('Measured: 4.1 %, limit 3 %');
    expect(facts(entries[1])).toContain('Basis: common practice, no source');
    expect(facts(entries[3])).toContain('from memory — confirm against the text');
  });

  test('the two conductors of a run are named once', () => {
    const look = ofKind(sampleReport, 'entry').find(({ word }) => word === 'LOOK');
    expect(look?.facts[0]?.value).toBe('W-FRIDGE (Run to the refrigerator in the back kitchen), both conductors');
  });

  test('findings of one severity keep the order in which the checks ranked them', () => {
    const ranked = cabinChecks.findings.map((finding, index) => ({
      ...finding,
      severity: 'fix' as const,
      rule: String(index),
    }));
    expect(worstFirst(ranked).map(({ rule }) => rule)).toEqual(['0', '1', '2', '3']);
  });

  test('every check that was not done is told with the figure that it is waiting for', () => {
    const input = solvedInput(cabin);
    const rows = tableCalled(cabinReport, 'Checks not done').rows;
    expect(rows).toHaveLength(input.checkReport.notChecked.length);
    expect(input.checkReport.notChecked.length).toBeGreaterThan(0);
    const sample = tableCalled(sampleReport, 'Checks not done').rows.map((row) => row.map(cellText).join(' | '));
    expect(sample[0]).toContain('rated volts of fuse F-INV');
  });

  test('a pass is told by what was compared, and how often', () => {
    const rows = tableCalled(cabinReport, 'Comparisons that held').rows.map((row) => row.map(cellText));
    const input = solvedInput(cabin);
    expect(rows).toHaveLength(input.checkReport.passed.length);
    for (const [times, compared] of rows) {
      expect(Number(times)).toBeGreaterThan(0);
      expect(compared?.split(' ').length).toBeGreaterThan(5);
    }
  });

  test('the proof of balance is printed for each case, and the sum can be checked from the paper', () => {
    const input = solvedInput(cabin);
    const table = tableCalled(cabinReport, 'What remains');
    expect(table.rows).toHaveLength(input.points.length);
    for (const row of table.rows) {
      const [powerIn, out, heat] = [row[5], row[6], row[7]].map((cell) => Number(cellText(cell ?? '')));
      // Printed to 1 W or better each, so the three may be 1.5 W apart.
      expect(Math.abs((powerIn ?? Number.NaN) - (out ?? 0) - (heat ?? 0))).toBeLessThan(1.5);
    }
  });

  test('readings stand beside what the drawing gives, with the difference', () => {
    const [first] = tableCalled(cabinReport, 'Readings entered').rows;
    const [measured, computed, difference] = [3, 4, 5].map((index) =>
      Number(
        cellText(first?.[index] ?? '')
          .replace('−', '-')
          .replace(/[^\d.-]/g, ''),
      ),
    );
    expect(measured).toBe(23.92);
    // Each is rounded to a millivolt.
    expect(difference).toBeCloseTo((measured ?? 0) - (computed ?? 0), 2);
  });
});

describe('what a report does not print', () => {
  test('a case that collapses is told in words and has no table of figures', () => {
    const collapsed = headings(sampleReport, 2).indexOf('Saw starting');
    expect(collapsed).toBeGreaterThan(-1);
    const words = wordsOf(sampleReport);
    expect(words).toContain('INV1 (Inverter) asks for 6667 W; the network can deliver 5120 W to it at most');
    expect(ofKind(sampleReport, 'table').some(({ caption }) => caption.includes('Saw starting'))).toBe(false);
  });

  test('a case whose proof fails keeps its figures to itself', () => {
    const input = cabinInput();
    const [first] = input.points;
    if (first === undefined) throw new Error('the sample has cases');
    const unproved = { ...first, proof: { ...first.proof, holds: false, worstJunctionA: 0.37 } };
    const report = buildReport({ ...input, points: [unproved] });
    expect(wordsOf(report)).toContain('The sums of this case do not close (largest junction remainder 3.7 × 10⁻¹ A)');
    expect(ofKind(report, 'table').some(({ caption }) => caption.includes('Winter night'))).toBe(false);
    expect(tableCalled(report, 'What remains').rows[0]?.map(cellText)[1]).toContain('does not hold');
  });

  test('a case without a source is told with what is unsupplied', () => {
    const input = cabinInput();
    const unsupplied = point(input.job, {
      case: 'winter-night',
      outcome: 'unsupplied',
      parts: new Map(),
      junctions: new Map(),
      remarks: [
        {
          kind: 'unfed',
          parts: ['FRIDGE' as PartId],
          junctions: [],
          message: 'the refrigerator has no path back to battery minus',
        },
      ],
    });
    const words = wordsOf(buildReport({ ...input, points: [unsupplied] }));
    expect(words).toContain('The refrigerator has no path back to battery minus.');
  });

  test('a figure that the network leaves open is a letter with its reason, never a number', () => {
    const input = cabinInput();
    const [first] = input.points;
    if (first === undefined) throw new Error('the sample has cases');
    const open = {
      id: 'Q1' as PartId,
      currentA: null,
      voltageV: 0,
      powerW: null,
      dropV: 0,
      undetermined: 'two parts without resistance lie side by side',
    };
    const report = buildReport({ ...input, points: [{ ...first, parts: new Map([...first.parts, [open.id, open]]) }] });
    const table = tableCalled(report, 'Conductors and devices');
    expect(table.rows.find((row) => cellText(row[0] ?? '').startsWith('Q1'))?.[2]).toBe('[a]');
    expect(table.notes.join(' ')).toContain('[a] not determined: two parts without resistance lie side by side.');
  });

  test('loads that dropped out are named in the answer of the case', () => {
    expect(wordsOf(cabinReport)).toContain('Dropped out for want of volts: INV1 (Inverter).');
  });

  test.each([
    'compliant',
    'complies',
    'compliance',
    'approved',
    'approval',
    'safe',
    'safely',
    'certified',
    'guaranteed',
  ])('the word %s is never ours', (word) => {
    for (const report of [cabinReport, sampleReport, buildReport(solvedInput(van))]) {
      expect(wordsOf(report)).not.toMatch(new RegExp(`\\b${word}\\b`, 'i'));
    }
  });

  test('no field name of the job file is left in a sentence', () => {
    const prose = [cabinReport, buildReport(solvedInput(van))].map(wordsOf).join('\n');
    expect(
      prose.match(
        /\b(?:ratingV|ratingA|minimumV|maximumV|cutoffV|resistanceOhm|emfV|stateOfCharge|ageYears|temperatureDegC)\b/g,
      ),
    ).toBeNull();
    expect(prose).not.toContain('degC');
  });

  test('no figure is NaN, infinite or undefined', () => {
    expect(wordsOf(cabinReport)).not.toMatch(/NaN|Infinity|undefined|\bnull\b/);
  });
});

describe('cautions', () => {
  const cautionsOf = (report: ReportDocument): string =>
    ofKind(report, 'caution')
      .flatMap(({ points }) => points)
      .join('\n');

  test('stand only where the job has what they warn of', () => {
    const lead = cautionsOf(cabinReport);
    const lithium = cautionsOf(buildReport(solvedInput(van)));
    expect(lead).toContain('Acid burns eyes and skin');
    expect(lead).not.toContain('lithium cells');
    expect(lead).toContain('solar array is live');
    expect(lithium).toContain('charging below 0 °C damages lithium cells');
    expect(lithium).not.toContain('Acid burns');
    expect(lithium).not.toContain('solar array');
    // The van is judged by a marine book.
    expect(lithium).toContain('Petrol or bottled gas aboard');
    expect(lead).not.toContain('Petrol');
  });

  test('stand at the section that they concern', () => {
    const batteries = cabinReport.blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Batteries');
    expect(cabinReport.blocks[batteries + 1]).toMatchObject({ kind: 'caution', title: 'At the batteries' });
  });

  test('every job is told that a battery cannot be switched off, and that passed is no proof', () => {
    for (const report of [cabinReport, sampleReport]) {
      expect(cautionsOf(report)).toContain('A battery cannot be switched off');
      expect(cautionsOf(report)).toContain('A passed check is not proof');
    }
  });
});

describe('sources', () => {
  test('of the cautions are described among the sources under the same printed phrase', () => {
    for (const { source, text } of cautionBases) expect(sourcesPage).toContain(`| ${source} | ${text} |`);
  });

  test('every number in brackets leads to an entry of the list, and every entry is cited', () => {
    const items = ofKind(cabinReport, 'sources').flatMap((block) => block.items);
    const cited = new Set([...wordsOf(cabinReport).matchAll(/\[(\d+)\]/g)].map((match) => Number(match[1])));
    expect([...cited].filter((number) => !items.some((item) => item.number === number))).toEqual([]);
    expect(items.filter(({ number }) => !cited.has(number))).toEqual([]);
  });

  test('a remembered source is marked for confirmation', () => {
    const items = ofKind(sampleReport, 'sources').flatMap((block) => block.items);
    expect(items.find(({ text }) => text === REMEMBERED.text)?.status).toBe('from memory — confirm against the text');
  });
});

describe('the tree itself', () => {
  test('is plain data: written as JSON and read back it is the same', () => {
    expect(JSON.parse(JSON.stringify(cabinReport))).toEqual(JSON.parse(JSON.stringify(buildReport(studiedCabin))));
    expect(JSON.parse(JSON.stringify(sampleReport))).toEqual(sampleReport);
  });

  test('tables are rectangular', () => {
    for (const { caption, columns, rows } of [...ofKind(cabinReport, 'table'), ...ofKind(sampleReport, 'table')]) {
      for (const row of rows) expect([caption, row.length]).toEqual([caption, columns.length]);
    }
  });

  test('the same assumption about several parts is told once, with all their names', () => {
    const input = cabinInput();
    const [first] = input.points;
    if (first === undefined) throw new Error('the sample has cases');
    const same = ['LA+', 'LB+', 'LC+'].map((id) =>
      assumption(id, 'conductor', 'stranding flexible', { text: 'stranding flexible' }),
    );
    const rows = tableCalled(
      buildReport({ ...input, points: [{ ...first, assumptions: same }] }),
      'Figures taken',
    ).rows;
    expect(rows).toHaveLength(1);
    expect(cellText(rows[0]?.at(-1) ?? '')).toBe('LA+, LB+, LC+');
  });

  test('a report without cases and findings still stands and says so', () => {
    const empty: CheckReport = { findings: [], notChecked: [], passed: [] };
    const words = wordsOf(buildReport({ ...cabinInput(), points: [], checkReport: empty }));
    expect(words).toContain('No case was solved for this report.');
    expect(words).toContain('The checks that were made gave no finding.');
  });
});
