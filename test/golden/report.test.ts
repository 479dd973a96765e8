/** The whole paper of one invented job as plain text, word for word; a change of wording or order shows here and nowhere else first. */
import { expect, test } from 'vitest';
import { buildReport } from '../../core/report/buildReport.ts';
import type { Block, ReportDocument } from '../../core/report/document.ts';
import { cellText } from '../../core/report/document.ts';
import { protectedInput, studiedInput } from '../core/reportInput.ts';
import { cabin } from '../core/reportJobs.ts';
import { cabinInput } from '../core/reportSample.ts';

test('the cabin reads as it did', async () => {
  await expect(plainText(buildReport(cabinInput()))).toMatchFileSnapshot('report-cabin.txt');
});

test('its section on strings reads as it did', async () => {
  const report = buildReport(studiedInput(cabin));
  const start = report.blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Strings');
  const end = report.blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Findings');
  const lines = report.blocks.slice(start, end).flatMap(linesOf);
  await expect(`${lines.join('\n').replaceAll('\u00a0', ' ').trim()}\n`).toMatchFileSnapshot('report-strings.txt');
});

test('its section on short circuits, and the tables beside its devices and cables, read as they did', async () => {
  const { blocks } = buildReport(protectedInput(cabin));
  const start = blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Short circuits and protection');
  const end = blocks.findIndex((block) => block.kind === 'heading' && block.text === 'Findings');
  const beside = blocks.filter((block) => block.kind === 'table' && block.caption.endsWith('in a short circuit'));
  const lines = [...beside, ...blocks.slice(start, end)].flatMap(linesOf);
  await expect(`${lines.join('\n').replaceAll('\u00a0', ' ').trim()}\n`).toMatchFileSnapshot('report-protection.txt');
});

function plainText({ title, subject, author, paper, preparedOn, program, footer, blocks }: ReportDocument): string {
  const head = [title, subject, author, `${paper}, ${preparedOn ?? 'undated'}, ${program}`, footer];
  return `${[...head, ...blocks.flatMap(linesOf)].join('\n').replaceAll('\u00a0', ' ')}\n`;
}

function linesOf(block: Block): readonly string[] {
  switch (block.kind) {
    case 'cover':
      return [
        '',
        ...block.facts.map(({ label, value }) => `${label}: ${value}`),
        ...block.statement,
        ...block.blanks.map((label) => `${label}: ______`),
      ];
    case 'heading':
      return ['', `${'#'.repeat(block.level)} ${block.text}`];
    case 'paragraph':
      return [block.text];
    case 'list':
      return block.items.map((item, index) => `${block.ordered ? `${index + 1}.` : '-'} ${item}`);
    case 'caution':
      return [`! ${block.title}`, ...block.points.map((point) => `! - ${point}`)];
    case 'facts':
      return block.facts.map(({ label, value }) => `${label}: ${value}`);
    case 'entry':
      return [
        `${block.number} ${block.word} ${block.title}`,
        ...block.facts.map(({ label, value }) => `   ${label}: ${value}`),
      ];
    case 'table':
      return [
        `[${block.caption}]`,
        block.columns
          .map(({ head, unit }) => (unit === undefined || unit === '' ? head : `${head} ${unit}`))
          .join(' | '),
        ...block.rows.map((row) => row.map(cellText).join(' | ')),
        ...block.notes.map((note) => `(${note})`),
      ];
    case 'figure':
      return [`[${block.title}: ${block.shapes.length} shapes] ${block.alt}`];
    case 'sources':
      return block.items.map(({ number, text, status }) => `[${number}] ${text} (${status})`);
    case 'pageBreak':
      return [`--- ${block.orientation}`];
  }
}
