/** The report's section on strings: the answer first, the figures of the study and no others, cautions where the hand is. */
import { describe, expect, test } from 'vitest';
import { Citations } from '../../core/report/citations.ts';
import type { Block, TableBlock } from '../../core/report/document.ts';
import { cellText } from '../../core/report/document.ts';
import type { ReportInput } from '../../core/report/input.ts';
import { stringsSection } from '../../core/report/stringsSection.ts';
import weekendHut from '../../data/examples/weekend-hut.job.json';
import { hillFarm, hireBoat, ridgeCabin, saunaHut } from '../outside/scenarioBanks.ts';
import { studiedInput } from './reportInput.ts';

const file = (draft: object): object => ({ format: 'ohmwright-job', version: 1, practice: 'iec-land', ...draft });
const sectionOf = (input: ReportInput): readonly Block[] => stringsSection(input, new Citations());
const wordsOf = (blocks: readonly Block[]): string => JSON.stringify(blocks);

function tableCalled(blocks: readonly Block[], caption: string): TableBlock {
  const found = blocks.find(
    (block): block is TableBlock => block.kind === 'table' && block.caption.startsWith(caption),
  );
  if (found === undefined) throw new Error(`no table called ${caption}`);
  return found;
}

const cabin = studiedInput(file(ridgeCabin));
const cabinSection = sectionOf(cabin);

describe('the section on strings', () => {
  test('begins with what flows at rest and who carries the load', () => {
    expect(cabinSection[0]).toMatchObject({ kind: 'heading', level: 1, text: 'Strings' });
    const lead = cabinSection[1];
    expect(lead).toMatchObject({ kind: 'paragraph', tone: 'lead' });
    expect(wordsOf([lead!])).toMatch(
      /20\.1 A flows between the strings with nothing switched on.*C carries 72 % of the 80 A/,
    );
  });

  test('prints the amps and shares of the study, slow and fast side by side', () => {
    const rows = tableCalled(cabinSection, 'How the strings share').rows.map((row) => row.map(cellText));
    const first = rows.findIndex(([name]) => name === 'Load');
    // 57.5 A is 72 % of 80 A; its fair share is 200 of 500 Ah; the label's resistance serves both models.
    expect(rows[first + 2]?.slice(1)).toEqual(['C', '57.5', '72', '40', '80', '57.5', '72', '200.0']);
  });

  test('draws a bar for every string, told by letter and hatch, against a dashed line of its fair share', () => {
    const figure = cabinSection.find((block) => block.kind === 'figure');
    if (figure?.kind !== 'figure') throw new Error('no figure');
    const bars = figure.shapes.filter((shape) => shape.shape === 'rect');
    const fair = figure.shapes.filter((shape) => shape.shape === 'line' && shape.dashed === true);
    const letters = figure.shapes.flatMap((shape) => (shape.shape === 'text' && shape.strong ? [shape.text] : []));
    expect([bars.length, fair.length, letters]).toEqual([3, 3, ['a', 'b', 'c']]);
    // The bars are as long as the shares: C's 57.5 A over A's 11.2 A.
    expect((bars[2]?.width ?? 0) / (bars[0]?.width ?? 1)).toBeCloseTo(57.549 / 11.225, 2);
    expect(figure.alt).toContain('C 72 % against a fair share of 40 %');
    const outside = figure.shapes.filter((shape) => shape.shape === 'rect' && shape.x + shape.width > figure.width);
    expect(outside).toEqual([]);
  });

  test('has its caution right before the table of joints', () => {
    const joints = cabinSection.indexOf(tableCalled(cabinSection, 'If strings that were apart'));
    expect(cabinSection[joints - 1]).toMatchObject({ kind: 'caution', title: 'Before strings are joined' });
  });

  test('tells the largest load that survives any one loss, and what goes with a string in one row', () => {
    const table = tableCalled(sectionOf(studiedInput(file(saunaHut))), 'One out');
    expect(table.notes.join(' ')).toContain(
      'Largest load with all in: 277.5 A. Largest that survives any one loss: 177.5 A.',
    );
    const rows = table.rows.map((row) => row.map(cellText));
    expect(rows.map(([gone]) => gone)).toEqual(['block 1, limit 1', 'block 2, limit 2', 'block 3, limit 3']);
    expect(rows[0]?.[1]).toBe('block 2 135.2 A (over), block 3 104.8 A (over)');
  });

  test('a block that must be isolated is told before all else', () => {
    const [, stop] = sectionOf(studiedInput(file(hireBoat)));
    expect(stop).toMatchObject({ kind: 'caution', title: 'Stop' });
    expect(wordsOf([stop!])).toContain('isolate block 3 now');
  });

  test('prints every block that was read, with its distance from the mean and the base of the percentage', () => {
    const section = sectionOf(studiedInput(file(hillFarm())));
    const rows = tableCalled(section, 'Along a string').rows.map((row) => row.map(cellText));
    expect(rows.find(([, name]) => name === '48 V block 3')?.slice(2)).toEqual(['13.62', '−730', '−5.1']);
    expect(wordsOf(section)).toContain('4.3 % of the mean half');
  });

  test('stands only where there is something to say', () => {
    expect(sectionOf(studiedInput(weekendHut))).toEqual([]);
    expect(sectionOf({ ...cabin, strings: undefined })).toEqual([]);
  });
});
