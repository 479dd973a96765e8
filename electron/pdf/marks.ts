/** Severity as a shape, so that it reads in grey and from across the table: octagon, triangle, lens, dot. */
import type { Severity } from '../../core/api.ts';
import type { Sheet } from './sheet.ts';
import { COPPER, INK } from './style.ts';

/** Draws the shape round (`x`, `y`), about twice `radius` wide. Drawn as ornament: the word always stands beside it. */
export function drawMark(
  sheet: Sheet,
  mark: Severity,
  { x, y, radius }: { readonly x: number; readonly y: number; readonly radius: number },
): void {
  sheet.artifact(() => {
    const { doc } = sheet;
    doc.lineWidth(1).strokeColor(INK).fillColor(INK).lineJoin('miter').undash();
    switch (mark) {
      case 'stop':
        polygon(sheet, octagon(x, y, radius));
        doc.fill(INK);
        doc.rect(x - radius * 0.55, y - radius * 0.17, radius * 1.1, radius * 0.34).fill('#ffffff');
        break;
      case 'fix':
        polygon(sheet, triangle(x, y, radius));
        doc.fill(INK);
        break;
      case 'look':
        lens(sheet, x, y, radius);
        doc.stroke(INK);
        doc.circle(x, y, radius * 0.32).fill(INK);
        break;
      case 'note':
        doc.circle(x, y, radius * 0.42).fill(INK);
        break;
    }
  });
}

/** The warning sign beside a caution: a triangle with a stroke and a dot in it. */
export function drawCautionSign(
  sheet: Sheet,
  { x, y, radius }: { readonly x: number; readonly y: number; readonly radius: number },
): void {
  sheet.artifact(() => {
    const { doc } = sheet;
    polygon(sheet, triangle(x, y, radius));
    doc.lineWidth(1.1).lineJoin('round').undash().stroke(COPPER);
    doc.lineCap('round').lineWidth(1.2).strokeColor(COPPER);
    doc
      .moveTo(x, y - radius * 0.28)
      .lineTo(x, y + radius * 0.12)
      .stroke();
    doc.circle(x, y + radius * 0.4, 0.75).fill(COPPER);
    doc.lineCap('butt');
  });
}

type Points = readonly (readonly [number, number])[];

function polygon({ doc }: Sheet, points: Points): void {
  points.forEach(([x, y], index) => {
    if (index === 0) doc.moveTo(x, y);
    else doc.lineTo(x, y);
  });
  doc.closePath();
}
function octagon(x: number, y: number, radius: number): Points {
  return Array.from({ length: 8 }, (_, corner) => {
    const angle = Math.PI / 8 + (corner * Math.PI) / 4;
    return [x + radius * Math.cos(angle), y + radius * Math.sin(angle)] as const;
  });
}
function triangle(x: number, y: number, radius: number): Points {
  return [
    [x, y - radius * 0.9],
    [x + radius, y + radius * 0.8],
    [x - radius, y + radius * 0.8],
  ];
}
function lens({ doc }: Sheet, x: number, y: number, radius: number): void {
  doc
    .moveTo(x - radius, y)
    .quadraticCurveTo(x, y - radius * 1.25, x + radius, y)
    .quadraticCurveTo(x, y + radius * 1.25, x - radius, y)
    .closePath();
}
