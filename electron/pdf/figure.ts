/** Figures: vector shapes brought to the width of the page, with words for those who cannot see them. */
import type { FigureBlock } from '../../core/api.ts';
import type { Sheet } from './sheet.ts';
import { STYLES } from './style.ts';
import { flowText } from './textBlocks.ts';

const TITLE_PT = STYLES.caption.leadingPt + 6;

/** How much smaller than on an empty page a figure may come out to stay on the page that is begun. */
const SHRINKS_TO = 0.72;

/** Scale at which a figure fits what is left of the page, or else an empty one. */
function scaleOf(sheet: Sheet, { width, height }: FigureBlock, abovePt = 0): number {
  const empty = Math.min(1, sheet.width / width, (sheet.fullRoom - TITLE_PT) / height);
  const here = Math.min(empty, (sheet.room - abovePt - TITLE_PT) / height);
  return here >= empty * SHRINKS_TO ? here : empty;
}

/** Height that a figure takes, where `abovePt` will still be used before it. */
export function figureHeightPt(sheet: Sheet, block: FigureBlock, abovePt = 0): number {
  return TITLE_PT + block.height * scaleOf(sheet, block, abovePt);
}

export function drawFigure(sheet: Sheet, block: FigureBlock): void {
  const scale = scaleOf(sheet, block);
  sheet.ensure(figureHeightPt(sheet, block));
  flowText(sheet, sheet.root, { text: block.title, style: STYLES.caption, x: sheet.left, widthPt: sheet.width });
  sheet.y += 6;
  const x = sheet.left + (sheet.width - block.width * scale) / 2;
  const y = sheet.y;
  const element = sheet.child(sheet.root, 'Figure', {
    alt: block.alt,
    bbox: [x, y, x + block.width * scale, y + block.height * scale],
    placement: 'Block',
  });
  sheet.tagged(element, 'Figure', () => {
    for (const shape of block.shapes) sheet.shape(shape, { x, y, scale });
  });
  element.end();
  sheet.y = y + block.height * scale + 12;
}
