import { describe, expect, test } from 'vitest';
import { buildReport } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { renderPdf } from '../../electron/pdf/renderPdf.ts';
import { bytesOf, pdfPages } from '../../renderer/stages/handover/pdfPages.ts';
import { sectionsOf } from '../../renderer/stages/handover/sections.ts';
import { solvedInput } from '../core/reportInput.ts';
import { readPdf } from '../hosts/pdfReader.ts';

const sloop = JSON.parse(examples.find(({ name }) => name === 'two-bank-sloop')?.text ?? '') as object;
const report = buildReport(solvedInput(sloop));
const bytes = await renderPdf(report);
const read = await readPdf(bytes);
const sections = sectionsOf(report);

describe('what will be printed', () => {
  test('every block of the paper but page breaks stands in one section, in the order of print', () => {
    const shown = sections.flatMap(({ blocks }) => blocks);
    expect(shown).toEqual(report.blocks.filter(({ kind }) => kind !== 'pageBreak'));
    expect(sections.map(({ title }) => title).slice(0, 2)).toEqual(['Cover', 'Summary']);
  });

  test('the number of pages is that which another reader of the PDF counts', () => {
    expect(pdfPages(bytes, []).total).toBe(read.pages.length);
  });

  test('every section begins on the page on which its heading is drawn', () => {
    const { firstPages } = pdfPages(
      bytes,
      sections.map(({ title }) => title),
    );
    // The cover has no heading of its own name.
    for (const [index, { title }] of [...sections.entries()].slice(1)) {
      const drawn = read.pages[firstPages[index]! - 1]?.texts.map(({ text }) => text);
      expect(drawn, title).toContain(title);
    }
    expect(firstPages[0]).toBe(1);
    expect(firstPages).toEqual(firstPages.toSorted((a, b) => a! - b!));
  });

  test('a title that no bookmark bears has no page', () => {
    expect(pdfPages(bytes, ['No such section']).firstPages).toEqual([null]);
  });

  test('base64 of a host is the same bytes again', () => {
    expect(Buffer.from(bytes).equals(bytesOf(Buffer.from(bytes).toString('base64')))).toBe(true);
  });
});
