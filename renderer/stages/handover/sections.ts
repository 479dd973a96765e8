/** The paper in sections, as a reader turns it over: what stands between two headings of the first level. */
import type { Block, ReportDocument } from '../../../core/api.ts';

export interface Section {
  readonly title: string;
  readonly blocks: readonly Block[];
  /** Printed across the page. */
  readonly landscape: boolean;
}

/** In the order of print; the cover first. Page breaks are not blocks of a section, only its orientation. */
export function sectionsOf(document: ReportDocument): readonly Section[] {
  const sections: { title: string; blocks: Block[]; landscape: boolean }[] = [];
  let landscape = false;
  for (const block of document.blocks) {
    if (block.kind === 'pageBreak') {
      landscape = block.orientation === 'landscape';
      continue;
    }
    const title = block.kind === 'cover' ? 'Cover' : block.kind === 'heading' && block.level === 1 ? block.text : null;
    if (title !== null || sections.length === 0)
      sections.push({ title: title ?? 'Before the first heading', blocks: [], landscape });
    sections.at(-1)?.blocks.push(block);
  }
  return sections;
}
