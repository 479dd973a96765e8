/** Draws the shapes of core on the screen: the same symbols as on paper. */
import type { CSSProperties, ReactElement } from 'react';
import type { Shape, Stroke, Tone } from '../../core/api.ts';

const WIDTH: Readonly<Record<Stroke, number>> = { hair: 1, line: 1.6, heavy: 5 };
const COLOUR: Readonly<Record<Tone, string>> = {
  ink: 'currentColor',
  quiet: 'var(--soft)',
  copper: 'var(--copper)',
  paper: 'var(--ground)',
};
const FILL = { none: 'none', paper: 'var(--ground)', ink: 'currentColor' } as const;

export function Shapes({ shapes }: { readonly shapes: readonly Shape[] }): ReactElement {
  // Shapes of one symbol never change places: their order is their name.
  return <>{shapes.map((shape, index) => shapeOf(shape, `${shape.shape}${String(index)}`))}</>;
}

function shapeOf(shape: Shape, key: string): ReactElement | null {
  switch (shape.shape) {
    case 'line': {
      const { x1, y1, x2, y2 } = shape;
      const dashes = shape.dashed === true ? { strokeDasharray: '3 3' } : {};
      return <line key={key} {...{ x1, y1, x2, y2 }} {...strokeOf(shape)} {...dashes} />;
    }
    case 'polyline': {
      const points = shape.points.map(([x, y]) => `${String(x)},${String(y)}`).join(' ');
      const fill = shape.filled ? COLOUR[shape.tone] : 'none';
      const Line = shape.closed ? 'polygon' : 'polyline';
      return <Line key={key} points={points} fill={fill} {...strokeOf(shape)} />;
    }
    case 'rect': {
      const { x, y, width, height } = shape;
      return <rect key={key} {...{ x, y, width, height }} fill={FILL[shape.fill]} {...strokeOf(shape)} />;
    }
    case 'circle':
      return (
        <circle key={key} cx={shape.x} cy={shape.y} r={shape.radius} fill={FILL[shape.fill]} {...strokeOf(shape)} />
      );
    case 'text':
      // The canvas writes the signs at the poles itself, never too small to read.
      return null;
  }
}

function strokeOf({ stroke, tone }: { readonly stroke: Stroke; readonly tone: Tone }): {
  readonly stroke: string;
  readonly style: CSSProperties;
} {
  // Lines stay visible as a drawing gets smaller: --s is 1 elsewhere.
  return { stroke: COLOUR[tone], style: { strokeWidth: `calc(${String(WIDTH[stroke])}px * var(--s, 1))` } };
}
