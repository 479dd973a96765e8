/** The paper itself, read back by a library that did not write it. */
import { describe, expect, test } from 'vitest';
import { buildReport } from '../../core/report/buildReport.ts';
import type { Block, Paper, ReportDocument } from '../../core/report/document.ts';
import { examples } from '../../data/examples/index.ts';
import { renderPdf } from '../../electron/pdf/renderPdf.ts';
import { MARGINS_PT } from '../../electron/pdf/style.ts';
import { checked, solvedInput } from '../core/reportInput.ts';
import { cabin, van } from '../core/reportJobs.ts';
import { largeJob } from '../core/reportLargeJob.ts';
import { cabinInput, point } from '../core/reportSample.ts';
import type { DrawnText, ReadPdf } from './pdfReader.ts';
import { elementsWith, readPdf, spokenText, squeeze } from './pdfReader.ts';

/** The most tangled of the invented examples: two banks, a relay between them, isolators, three sheets of diagram. */
const sloop = JSON.parse(examples.find(({ name }) => name === 'two-bank-sloop')?.text ?? '') as object;
const sloopReport = buildReport(solvedInput(sloop, { paper: 'Letter' }));
const sloopPdf = await readPdf(await renderPdf(sloopReport));
const cabinReport = buildReport(solvedInput(cabin));
const cabinBytes = await renderPdf(cabinReport);
const cabinPdf = await readPdf(cabinBytes);
const vanReport = buildReport(solvedInput(van, { paper: 'Letter' }));
const vanPdf = await readPdf(await renderPdf(vanReport));
const sampleReport = buildReport(cabinInput({ paper: 'Letter' }));
const samplePdf = await readPdf(await renderPdf(sampleReport));

function largeReport(): ReportDocument {
  const job = checked(largeJob(300));
  return buildReport({ ...cabinInput(), job, points: [point(job, { case: 'as-drawn' })] });
}
const largePdf = await readPdf(await renderPdf(largeReport()));

/** The texts of a block, each as one piece that must come out in one piece. */
function piecesOf(block: Block): readonly string[] {
  switch (block.kind) {
    case 'cover':
      return [
        block.title,
        block.subtitle,
        ...block.facts.flatMap(({ label, value }) => [label, value]),
        ...block.statement,
        ...block.blanks,
      ];
    case 'heading':
    case 'paragraph':
      return [block.text];
    case 'list':
      return block.items;
    case 'caution':
      return block.points;
    case 'facts':
      return block.facts.flatMap(({ label, value }) => [label, value]);
    case 'entry':
      return [block.word, block.title, ...block.facts.flatMap(({ label, value }) => [label, value])];
    case 'table':
      return [
        ...block.columns.flatMap(({ head, unit }) => [head, unit ?? '']),
        ...block.rows.flat().flatMap((cell) => (typeof cell === 'string' ? [cell] : [cell.text, cell.under ?? ''])),
        ...block.notes,
      ];
    case 'sources':
      return block.items.map(({ text }) => text);
    case 'figure':
      return block.shapes.flatMap((shape) => (shape.shape === 'text' ? [shape.text] : []));
    case 'pageBreak':
      return [];
  }
}

describe.each([
  ['the cabin on A4', cabinReport, cabinPdf],
  ['the van on Letter', vanReport, vanPdf],
  ['the hand-made sample on Letter', sampleReport, samplePdf],
  ['the two-bank sloop on Letter', sloopReport, sloopPdf],
  ['a job of 300 parts', largeReport(), largePdf],
] as const)('%s', (_name, report, pdf) => {
  test('says every word of the report', () => {
    const spoken = spokenText(pdf);
    const missing = report.blocks.flatMap(piecesOf).filter((piece) => !spoken.includes(squeeze(piece)));
    expect(missing).toEqual([]);
  });

  test('keeps all text inside the margins', () => {
    const outside = pdf.pages.flatMap(({ width, height, texts }, index) =>
      texts
        .filter(({ text }) => text.trim() !== '')
        .filter(({ x, y, width: wide, isArtifact }) => {
          const isBeside = x < MARGINS_PT.left - SLACK_PT || x + wide > width - MARGINS_PT.right + SLACK_PT;
          const isBeyond = !isArtifact && (y < MARGINS_PT.bottom - SLACK_PT || y > height - MARGINS_PT.top + SLACK_PT);
          return isBeside || isBeyond;
        })
        .map(({ text }) => `page ${index + 1}: ${text}`),
    );
    expect(outside).toEqual([]);
  });

  test('draws no text over other text', () => {
    const collisions = pdf.pages.flatMap(({ texts }, index) =>
      collisionsOf(texts).map((pair) => `page ${index + 1}: ${pair}`),
    );
    expect(collisions).toEqual([]);
  });

  test('has bookmarks for every section and its parts', () => {
    const expected = report.blocks.flatMap((block) =>
      block.kind === 'heading' && block.level === 1 ? [block.text] : [],
    );
    expect(pdf.outline.map(({ title }) => title)).toEqual(['Cover', ...expected]);
    const second = report.blocks.flatMap((block) =>
      block.kind === 'heading' && block.level === 2 ? [block.text] : [],
    );
    expect(pdf.outline.flatMap(({ items }) => items.map(({ title }) => title))).toEqual(second);
  });

  test('numbers its pages', () => {
    pdf.pages.forEach(({ texts }, index) => {
      expect(texts.map(({ text }) => text)).toContain(`Page ${index + 1} of ${pdf.pages.length}`);
    });
  });

  test('is tagged: headings, tables with header cells, lists, and a figure in words where there is one', () => {
    expect(pdf.isMarked).toBe(true);
    const roles = (role: string): number =>
      pdf.pages.reduce((sum, { structure }) => sum + elementsWith(structure, role).length, 0);
    const figures = report.blocks.filter(({ kind }) => kind === 'figure');
    expect(roles('H1')).toBeGreaterThan(8);
    expect(roles('TH')).toBeGreaterThan(20);
    expect(roles('TD')).toBeGreaterThan(50);
    expect(roles('LI')).toBeGreaterThan(20);
    const drawn = pdf.pages.flatMap(({ structure }) => elementsWith(structure, 'Figure'));
    expect(drawn).toHaveLength(figures.length);
    for (const figure of drawn)
      expect(figure.alt).toMatch(/^Diagram of the wiring, both poles(?:, sheet \d of \d)?\. /);
  });
});
/** Half a point: less than a hairline on paper; rounding of widths. */
const SLACK_PT = 0.5;

/** Pairs of texts whose boxes share more than the air above and below letters. */
function collisionsOf(texts: readonly DrawnText[]): readonly string[] {
  const seen = texts.filter(({ text }) => text.trim() !== '');
  return seen.flatMap((one, index) =>
    seen.slice(index + 1).flatMap((other) => {
      const acrossPt = Math.min(one.x + one.width, other.x + other.width) - Math.max(one.x, other.x);
      const apartPt = Math.abs(one.y - other.y);
      const isOver = acrossPt > 1 && apartPt < 0.62 * Math.min(one.height, other.height);
      return isOver ? [`“${one.text}” and “${other.text}”`] : [];
    }),
  );
}

describe('the pages', () => {
  const sizeOf = ({ pages }: ReadPdf): readonly number[] => [
    Math.round(pages[0]?.width ?? 0),
    Math.round(pages[0]?.height ?? 0),
  ];

  test('are of the paper that was asked for', () => {
    expect(sizeOf(cabinPdf)).toEqual([595, 842]);
    expect(sizeOf(vanPdf)).toEqual([612, 792]);
  });

  test('are about as many as such a job needs', () => {
    expect(cabinPdf.pages.length).toBeGreaterThan(10);
    expect(cabinPdf.pages.length).toBeLessThan(26);
    expect(vanPdf.pages.length).toBeLessThan(17);
  });

  test('none is left nearly empty but the last and those before a sheet that lies across', () => {
    const thin = cabinPdf.pages.flatMap(({ texts, width, height }, index) => {
      const next = cabinPdf.pages[index + 1];
      const isBeforeTurn = next === undefined || next.width > next.height !== width > height;
      return !isBeforeTurn && texts.filter(({ isArtifact }) => !isArtifact).length < 12 ? [index + 1] : [];
    });
    expect(thin).toEqual([]);
  });
});

describe('the file', () => {
  test('is the same, byte for byte, when it is written twice, in any time zone', async () => {
    const zone = process.env['TZ'];
    process.env['TZ'] = 'Pacific/Auckland';
    const again = await renderPdf(buildReport(solvedInput(cabin)));
    if (zone === undefined) delete process.env['TZ'];
    else process.env['TZ'] = zone;
    expect(Buffer.from(again).equals(Buffer.from(cabinBytes))).toBe(true);
  });

  test('carries the date of the report, or a fixed one where the report has none', async () => {
    expect(cabinPdf.info['CreationDate']).toBe('D:20250331000000Z');
    const undated = await readPdf(await renderPdf({ ...vanReport, preparedOn: null }));
    expect(undated.info['CreationDate']).toBe('D:20000101000000Z');
  });

  test('embeds its typeface and names no font of the system', async () => {
    const raw = Buffer.from(cabinBytes).toString('latin1');
    expect(raw.match(/\/BaseFont \/[A-Z]+\+SourceSans3-\w+/g)?.length).toBeGreaterThanOrEqual(3);
    expect(raw).not.toMatch(/Helvetica|Times-Roman|Courier/);
  });

  test('keeps a title like A & B <title> in its metadata', async () => {
    const title = 'A & B <title> "quoted"';
    const bytes = await renderPdf(buildReport(solvedInput({ ...van, title, preparedBy: 'X & Y' })));
    const pdf = await readPdf(bytes);
    expect(pdf.info['Title']).toBe(title);
    expect(pdf.metadataTitle).toBe(title);
    const raw = Buffer.from(bytes).toString('latin1');
    expect(raw).toContain('A &amp; B &lt;title&gt; &quot;quoted&quot;');
    expect(spokenText(pdf)).toContain(squeeze(title));
  });
});

describe('hard cases', () => {
  test('a table over many pages has its header on each of them', () => {
    const continued = largePdf.pages.filter(({ texts }) =>
      texts.some(({ text }) => text === 'Conductor schedule, continued'),
    );
    expect(continued.length).toBeGreaterThan(2);
    for (const { texts } of continued) {
      const heads = texts.filter(({ isArtifact }) => isArtifact).map(({ text }) => text);
      expect(heads).toEqual(expect.arrayContaining(['Conductor', 'From', 'To', 'Length', 'Size']));
    }
  });

  test('a row never begins on one page and ends on the next', () => {
    // Each conductor of the large job has two lines in its row: size, and the nearest in the other notation.
    for (const { texts } of largePdf.pages) {
      const sizes = texts.filter(({ text }) => text.normalize('NFKC') === '4 mm2').length;
      const others = texts.filter(({ text }) => text.normalize('NFKC') === '≈ 11 AWG').length;
      expect(others).toBe(sizes);
    }
  });

  test('signs that the typeface lacks are told by their code, and nothing else is lost', async () => {
    const title = 'Hut \u{1F50B} 電池 Ω café Ħ Ж';
    const pdf = await readPdf(await renderPdf(buildReport(solvedInput({ ...van, title }))));
    const spoken = spokenText(pdf);
    expect(spoken).toContain(squeeze('Hut [U+1F50B] [U+96FB][U+6C60] Ω café Ħ Ж'));
  });

  test('names without a space are divided rather than run off the paper', async () => {
    const parts = van.parts.map((part) => (part.id === 'F1' ? { ...part, label: 'X'.repeat(200) } : part));
    const pdf = await readPdf(await renderPdf(buildReport(solvedInput({ ...van, title: 'Y'.repeat(190), parts }))));
    for (const { texts, width } of pdf.pages) {
      for (const { x, width: wide } of texts) expect(x + wide).toBeLessThanOrEqual(width - MARGINS_PT.right + SLACK_PT);
    }
    expect(spokenText(pdf)).toContain('X'.repeat(200));
  });

  test.each(['A4', 'Letter'] as const)('a report with nothing in it is still a paper on %s', async (paper: Paper) => {
    const pdf = await readPdf(await renderPdf({ ...vanReport, paper, blocks: [] }));
    expect(pdf.pages).toHaveLength(1);
  });
});
