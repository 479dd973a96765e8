/** Where the steps of a volt walk stand in the chart: potentials in two bands of one scale, the source and the load across them. */
import type { VoltWalk, WalkStep } from '../../core/api.ts';

export interface ChartStep {
  readonly step: WalkStep;
  readonly index: number;
  readonly x: number;
  readonly width: number;
  readonly startY: number;
  readonly endY: number;
  /** Across the break between the bands. */
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
  readonly high: Band;
  readonly low: Band;
}

export interface WalkRoom {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  /** Between the bands, where the scale is broken. */
  readonly gap: number;
}

/** Both bands have the same volts to a pixel, so that a drop is as tall on the way back as on the way out. */
export function walkShape(walk: VoltWalk, { left, right, top, bottom, gap }: WalkRoom): WalkShape {
  const across = (step: WalkStep): boolean => step.kind === 'load' || step.kind === 'source';
  const { highs, lows } = potentials(walk, across);
  const [highTop, highLow] = [Math.max(...highs), Math.min(...highs)];
  const [lowTop, lowLow] = [Math.max(...lows), Math.min(...lows)];
  const room = bottom - top - gap;
  // Never so fine that rounding of the solve looks like a drop.
  const voltsToRoom = Math.max(highTop - highLow + (lowTop - lowLow), 0.01);
  const pixelsPerV = room / (voltsToRoom * 1.1);
  const highHeight = Math.max(16, (highTop - highLow) * pixelsPerV);
  const high: Band = { top, bottom: top + highHeight, highV: highTop, lowV: highLow };
  const low: Band = {
    top: Math.max(high.bottom + gap, bottom - (lowTop - lowLow) * pixelsPerV),
    bottom,
    highV: lowTop,
    lowV: lowLow,
  };
  const yOf = (volts: number, isHigh: boolean): number =>
    isHigh ? top + (highTop - volts) * pixelsPerV : bottom - (volts - lowLow) * pixelsPerV;
  const width = (right - left) / walk.steps.length;
  let isHigh = false;
  const steps = walk.steps.map((step, index): ChartStep => {
    const isAcross = across(step);
    const startY = yOf(step.startV, isHigh);
    if (isAcross) isHigh = step.changeV > 0;
    return { step, index, x: left + index * width, width, startY, endY: yOf(step.endV, isHigh), isAcross };
  });
  return { steps, high, low };
}

function potentials(
  walk: VoltWalk,
  across: (step: WalkStep) => boolean,
): { readonly highs: readonly number[]; readonly lows: readonly number[] } {
  const highs: number[] = [];
  const lows: number[] = [];
  let isHigh = false;
  for (const step of walk.steps) {
    (isHigh ? highs : lows).push(step.startV);
    if (across(step)) isHigh = step.changeV > 0;
    (isHigh ? highs : lows).push(step.endV);
  }
  return { highs, lows };
}
