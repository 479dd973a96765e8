/** A figure of the paper as vectors on the screen: the same shapes that the PDF draws. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import type { FigureBlock, Shape, Stroke, Tone } from '../../../core/api.ts';

const TONES: Readonly<Record<Tone, string>> = {
  ink: 'var(--ink)',
  quiet: 'var(--soft)',
  copper: 'var(--copper)',
  paper: 'var(--sheet)',
};
const STROKES: Readonly<Record<Stroke, number>> = { hair: 0.5, line: 0.9, heavy: 2.4 };
const ANCHORS = { left: 'start', centre: 'middle', right: 'end' } as const;

export function PaperFigure({ figure }: { readonly figure: FigureBlock }): ReactElement {
  return (
    <Box component="figure" sx={{ m: 0, my: '0.75rem' }}>
      <Box component="figcaption" sx={{ fontWeight: 600, fontSize: '0.875rem', mb: '0.375rem' }}>
        {figure.title}
      </Box>
      <svg
        viewBox={`0 0 ${String(figure.width)} ${String(figure.height)}`}
        role="img"
        aria-label={figure.alt}
        style={{ width: '100%', maxWidth: `${String(figure.width * 1.6)}px`, height: 'auto', display: 'block' }}
      >
        {figure.shapes.map((shape, index) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: shapes have no names and never move within a figure
          <Drawn key={index} shape={shape} />
        ))}
      </svg>
    </Box>
  );
}

function Drawn({ shape }: { readonly shape: Shape }): ReactElement {
  const colour = TONES[shape.tone];
  switch (shape.shape) {
    case 'line':
      return (
        <line
          x1={shape.x1}
          y1={shape.y1}
          x2={shape.x2}
          y2={shape.y2}
          stroke={colour}
          strokeWidth={STROKES[shape.stroke]}
          strokeDasharray={shape.dashed === true ? '3 3' : undefined}
        />
      );
    case 'polyline': {
      const points = shape.points.map(([x, y]) => `${String(x)},${String(y)}`).join(' ');
      const drawn = {
        points,
        fill: shape.filled ? colour : 'none',
        stroke: colour,
        strokeWidth: STROKES[shape.stroke],
      };
      return shape.closed ? <polygon {...drawn} /> : <polyline {...drawn} />;
    }
    case 'rect':
      return (
        <rect
          x={shape.x}
          y={shape.y}
          width={shape.width}
          height={shape.height}
          fill={fillOf(shape.fill)}
          stroke={colour}
          strokeWidth={STROKES[shape.stroke]}
        />
      );
    case 'circle':
      return (
        <circle
          cx={shape.x}
          cy={shape.y}
          r={shape.radius}
          fill={fillOf(shape.fill)}
          stroke={colour}
          strokeWidth={STROKES[shape.stroke]}
        />
      );
    case 'text':
      return (
        <text
          x={shape.x}
          y={shape.y}
          fontSize={shape.sizePt}
          textAnchor={ANCHORS[shape.align]}
          fontWeight={shape.strong ? 600 : 400}
          fill={colour}
        >
          {shape.text}
        </text>
      );
  }
}

function fillOf(fill: 'none' | 'paper' | 'ink'): string {
  return fill === 'none' ? 'none' : TONES[fill];
}
