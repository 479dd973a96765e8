/** Vector shapes of drawings: plain data that paper and screen draw alike. */

/** `paper` draws in the colour of the sheet: it wipes. */
export type Tone = 'ink' | 'quiet' | 'copper' | 'paper';
export type Stroke = 'hair' | 'line' | 'heavy';

/** Shapes on a plane in points, x to the right and y down; text is placed by its baseline. */
export type Shape =
  | {
      readonly shape: 'line';
      readonly x1: number;
      readonly y1: number;
      readonly x2: number;
      readonly y2: number;
      readonly stroke: Stroke;
      readonly tone: Tone;
      readonly dashed?: boolean;
    }
  | {
      readonly shape: 'polyline';
      readonly points: readonly (readonly [number, number])[];
      readonly closed: boolean;
      readonly filled: boolean;
      readonly stroke: Stroke;
      readonly tone: Tone;
    }
  | {
      readonly shape: 'rect';
      readonly x: number;
      readonly y: number;
      readonly width: number;
      readonly height: number;
      /** `paper` hides what lies beneath. */
      readonly fill: 'none' | 'paper' | 'ink';
      readonly stroke: Stroke;
      readonly tone: Tone;
    }
  | {
      readonly shape: 'circle';
      readonly x: number;
      readonly y: number;
      readonly radius: number;
      readonly fill: 'none' | 'paper' | 'ink';
      readonly stroke: Stroke;
      readonly tone: Tone;
    }
  | {
      readonly shape: 'text';
      readonly x: number;
      readonly y: number;
      readonly text: string;
      readonly sizePt: number;
      readonly align: 'left' | 'centre' | 'right';
      readonly strong: boolean;
      readonly tone: Tone;
    };
