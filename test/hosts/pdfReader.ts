/** Reads a PDF back with a library that did not write it. */
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';

export interface DrawnText {
  readonly text: string;
  /** Left end and baseline, points from the lower left corner. */
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  /** Head, foot, repeated table header: not part of what is read aloud. */
  readonly isArtifact: boolean;
}
interface ReadPage {
  readonly width: number;
  readonly height: number;
  readonly texts: readonly DrawnText[];
  readonly structure: StructureNode;
}
export interface StructureNode {
  readonly role?: string;
  readonly alt?: string;
  readonly children?: readonly StructureNode[];
}
export interface ReadPdf {
  readonly pages: readonly ReadPage[];
  readonly outline: readonly { readonly title: string; readonly items: readonly { readonly title: string }[] }[];
  readonly info: Readonly<Record<string, unknown>>;
  readonly metadataTitle: string | null;
  readonly isMarked: boolean;
}

export async function readPdf(bytes: Uint8Array): Promise<ReadPdf> {
  const task = getDocument({ data: bytes.slice(), useSystemFonts: false, verbosity: 0 });
  const document = await task.promise;
  const pages: ReadPage[] = [];
  for (let number = 1; number <= document.numPages; number += 1) {
    const page = await document.getPage(number);
    const [, , width = 0, height = 0] = page.view;
    const content = await page.getTextContent({ includeMarkedContent: true });
    pages.push({
      width,
      height,
      texts: drawnTexts(content.items),
      structure: (await page.getStructTree()) as unknown as StructureNode,
    });
  }
  const { info, metadata } = await document.getMetadata();
  const outline = (await document.getOutline()) as ReadPdf['outline'] | null;
  const marks = (await document.getMarkInfo()) as { Marked?: boolean } | null;
  await task.destroy();
  return {
    pages,
    outline: outline ?? [],
    info: info as Readonly<Record<string, unknown>>,
    metadataTitle: (metadata as { get(name: string): string | null } | null)?.get('dc:title') ?? null,
    isMarked: marks?.Marked === true,
  };
}

interface RawItem {
  readonly type?: string;
  readonly tag?: string;
  readonly str?: string;
  readonly transform?: readonly number[];
  readonly width?: number;
  readonly height?: number;
}

function drawnTexts(items: readonly RawItem[]): readonly DrawnText[] {
  const open: string[] = [];
  const texts: DrawnText[] = [];
  for (const { type, tag, str, transform, width = 0, height = 0 } of items) {
    if (type?.startsWith('beginMarkedContent') === true) open.push(tag ?? '');
    else if (type === 'endMarkedContent') open.pop();
    else if (str !== undefined && str !== '') {
      texts.push({
        text: str,
        x: transform?.[4] ?? 0,
        y: transform?.[5] ?? 0,
        width,
        height,
        isArtifact: open.includes('Artifact'),
      });
    }
  }
  return texts;
}

/** All that is read aloud, in reading order, without any space; ligatures and compatibility signs taken apart. */
export function spokenText({ pages }: ReadPdf): string {
  return squeeze(
    pages.flatMap(({ texts }) => texts.filter(({ isArtifact }) => !isArtifact).map(({ text }) => text)).join(''),
  );
}
export function squeeze(text: string): string {
  return text.normalize('NFKC').replaceAll(/\s+/g, '');
}

/** All structure elements of a page with a role, at any depth. */
export function elementsWith(node: StructureNode, role: string): readonly StructureNode[] {
  const inner = (node.children ?? []).flatMap((child) => elementsWith(child, role));
  return node.role === role ? [node, ...inner] : inner;
}
