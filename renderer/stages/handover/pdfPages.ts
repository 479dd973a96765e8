/** Where the sections begin in a PDF of ours, read off its own page list and bookmarks. */

export interface PdfPages {
  readonly total: number;
  /** First page of each title asked for, counted from 1; `null` where no bookmark names it. */
  readonly firstPages: readonly (number | null)[];
}

/** Titles in the order of print; where two bookmarks bear a title, the first one from the page of the title before counts. */
export function pdfPages(bytes: Uint8Array, titles: readonly string[]): PdfPages {
  const text = new TextDecoder('latin1').decode(bytes);
  const pages = new Map<string, number>();
  for (const [, object = ''] of text.matchAll(/\n(\d+) 0 obj\n<<\n\/Type \/Page\n/g)) pages.set(object, pages.size + 1);
  const bookmarks = [...text.matchAll(/\/Dest \[(\d+) 0 R[^\]]*\][^>]*?\/Title \(((?:[^()\\]|\\.)*)\)/g)].flatMap(
    ([, object = '', title = '']) => {
      const page = pages.get(object);
      return page === undefined ? [] : [{ title: title.replaceAll(/\\(.)/g, '$1'), page }];
    },
  );
  let least = 1;
  const firstPages = titles.map((title) => {
    const found = bookmarks.filter((bookmark) => bookmark.title === title && bookmark.page >= least);
    if (found.length === 0) return null;
    least = Math.min(...found.map(({ page }) => page));
    return least;
  });
  return { total: pages.size, firstPages };
}

/** Bytes of a base64 text. */
export function bytesOf(base64: string): Uint8Array<ArrayBuffer> {
  const binary = atob(base64);
  return Uint8Array.from(binary, (sign) => sign.charCodeAt(0));
}
