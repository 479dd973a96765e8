/** Where the steps of a volt walk stand in the chart: potentials in bands of one scale, sources and the load across the breaks. */
import type { VoltWalk, WalkStep } from '../../core/api.ts';

export interface ChartStep {
  readonly step: WalkStep;
  readonly index: number;
  readonly x: number;
  readonly width: number;
  readonly startY: number;
  readonly endY: number;
  /** Across the break between two bands. */
  readonly isAcross: boolean;
}
export interface Band {
  readonly top: number;
  readonly bottom: number;
  readonly highV: number;
  readonly lowV: number;
}
export interface WalkShape {
  readonly steps: readonly ChartStep[];
  /** From the highest potentials to the lowest. */
  readonly bands: readonly Band[];
}

export interface WalkRoom {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  /** Between the bands, where the scale is broken. */
  readonly gap: number;
}

/** Potentials further apart than this share of the smallest rise or fall belong to two bands. */
const BREAK_SHARE = 0.4;
/** Never so fine that rounding of the solve looks like a drop. */
const LEAST_SPAN_V = 0.01;

/** All bands have the same volts to a pixel, so that a drop is as tall on the way back as on the way out. */
export function walkShape(walk: VoltWalk, { left, right, top, bottom, gap }: WalkRoom): WalkShape {
  const ranges = rangesOf(walk);
  const span = Math.max(
    LEAST_SPAN_V,
    ranges.reduce((sum, { highV, lowV }) => sum + highV - lowV, 0),
  );
  const pixelsPerV = Math.max(20, bottom - top - gap * (ranges.length - 1)) / span;
  let y = top;
  const bands = ranges.map(({ highV, lowV }): Band => {
    const band = { top: y, bottom: y + (highV - lowV) * pixelsPerV, highV, lowV };
    y = band.bottom + gap;
    return band;
  });
  const yOf = (volts: number): number => {
    const band = bands.find(({ lowV }) => volts >= lowV) ?? bands.at(-1);
    return band === undefined ? top : band.top + (band.highV - volts) * pixelsPerV;
  };
  const width = (right - left) / walk.steps.length;
  const steps = walk.steps.map((step, index) => ({
    step,
    index,
    x: left + index * width,
    width,
    startY: yOf(step.startV),
    endY: yOf(step.endV),
    isAcross: isAcross(step),
  }));
  return { steps, bands };
}

function isAcross({ kind }: WalkStep): boolean {
  return kind === 'load' || kind === 'source';
}

function rangesOf({ steps }: VoltWalk): readonly { readonly highV: number; readonly lowV: number }[] {
  const rises = steps.filter(isAcross).map(({ changeV }) => Math.abs(changeV));
  const breakV = BREAK_SHARE * Math.min(...rises);
  const potentials = steps.flatMap(({ startV, endV }) => [startV, endV]).toSorted((a, b) => b - a);
  const ranges: { highV: number; lowV: number }[] = [];
  for (const volts of potentials) {
    const last = ranges.at(-1);
    if (last === undefined || last.lowV - volts > breakV) ranges.push({ highV: volts, lowV: volts });
    else last.lowV = volts;
  }
  return ranges;
}
