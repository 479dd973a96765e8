/** Shapes moved, enlarged and turned by quarters; words stay upright and keep their size, lines keep their weight. */
import type { Point } from './point.ts';
import type { Shape } from './shape.ts';

export interface Placing {
  readonly scale: number;
  /** Quarter turns clockwise. */
  readonly quarters: 0 | 1 | 2 | 3;
  /** Where the origin of the shapes goes. */
  readonly to: Point;
}

export function placeShapes(shapes: readonly Shape[], placing: Placing): readonly Shape[] {
  return shapes.map((shape) => placeShape(shape, placing));
}

function placeShape(shape: Shape, placing: Placing): Shape {
  const put = (x: number, y: number): Point => placePoint({ x, y }, placing);
  switch (shape.shape) {
    case 'line': {
      const [a, b] = [put(shape.x1, shape.y1), put(shape.x2, shape.y2)];
      return { ...shape, x1: a.x, y1: a.y, x2: b.x, y2: b.y };
    }
    case 'polyline': {
      const points = shape.points.map(([x, y]) => {
        const point = put(x, y);
        return [point.x, point.y] as const;
      });
      return { ...shape, points };
    }
    case 'rect': {
      const [a, b] = [put(shape.x, shape.y), put(shape.x + shape.width, shape.y + shape.height)];
      return {
        ...shape,
        x: Math.min(a.x, b.x),
        y: Math.min(a.y, b.y),
        width: Math.abs(b.x - a.x),
        height: Math.abs(b.y - a.y),
      };
    }
    case 'circle':
    case 'text': {
      const { x, y } = put(shape.x, shape.y);
      return shape.shape === 'circle' ? { ...shape, x, y, radius: shape.radius * placing.scale } : { ...shape, x, y };
    }
  }
}

function placePoint({ x, y }: Point, { scale, quarters, to }: Placing): Point {
  const [cos, sin] = QUARTERS[quarters];
  return { x: to.x + scale * (x * cos - y * sin), y: to.y + scale * (x * sin + y * cos) };
}
const QUARTERS = [
  [1, 0],
  [0, 1],
  [-1, 0],
  [0, -1],
] as const;
