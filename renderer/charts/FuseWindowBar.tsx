/** The window of a fuse as one bar from nought: load, what lasts with its margin, at most the fuse, at most what the wire admits. */
import type { ReactElement } from 'react';
import type { FuseWindow } from '../../core/api.ts';

/** The longest mark stands here, so that one sees that nothing is cut off. */
const LONGEST = 0.94;
const HEIGHT = 28;
const MIDDLE = HEIGHT / 2;
/** Closer than this two ticks run into one. */
const LEAST_GAP = 0.012;

export interface WindowShares {
  readonly load: number;
  readonly continuous: number;
  readonly most: number;
  readonly fuse: number | null;
  readonly standard: readonly number[];
  /** False where what flows needs more than the wire admits: then no fuse fits between. */
  readonly isOpen: boolean;
}

/** Places on the bar as shares of its width; ticks that would run into each other are thinned. */
export function windowShares(window: FuseWindow): WindowShares {
  const { loadA, continuousA, fuseA, allowedA, capA, standardInside } = window;
  const mostA = Math.min(allowedA, capA ?? Number.POSITIVE_INFINITY);
  const longestA = Math.max(continuousA, mostA, fuseA ?? 0, Number.MIN_VALUE);
  const share = (currentA: number): number => (currentA / longestA) * LONGEST;
  const standard: number[] = [];
  for (const ratingA of standardInside) {
    if (share(ratingA) - (standard.at(-1) ?? Number.NEGATIVE_INFINITY) >= LEAST_GAP) standard.push(share(ratingA));
  }
  return {
    load: share(loadA),
    continuous: share(continuousA),
    most: share(mostA),
    fuse: fuseA === null ? null : share(fuseA),
    standard,
    isOpen: continuousA <= mostA,
  };
}

export function FuseWindowBar({ window }: { readonly window: FuseWindow }): ReactElement {
  const { load, continuous, most, fuse, standard, isOpen } = windowShares(window);
  const [left, right] = [Math.min(continuous, most), Math.max(continuous, most)];
  return (
    <svg width="100%" height={HEIGHT} aria-hidden="true" focusable="false" style={{ display: 'block' }}>
      <line x1="0" x2="100%" y1={MIDDLE} y2={MIDDLE} stroke="var(--hair)" />
      <rect
        x={percent(left)}
        width={percent(right - left)}
        y={MIDDLE - 9}
        height={18}
        fill={isOpen ? 'var(--lit)' : 'none'}
        stroke={isOpen ? 'var(--edge)' : 'var(--stop)'}
        strokeDasharray={isOpen ? '' : '3 3'}
      />
      <rect x="0" width={percent(load)} y={MIDDLE - 4} height={8} fill="var(--volt)" />
      <rect
        x={percent(load)}
        width={percent(Math.max(0, continuous - load))}
        y={MIDDLE - 4}
        height={8}
        fill="var(--sheet)"
        stroke="var(--volt)"
      />
      {standard.map((at) => (
        <Across key={at} at={at} from={MIDDLE + 3} to={MIDDLE + 9} stroke="var(--soft)" width={1} />
      ))}
      <Across at={most} from={1} to={HEIGHT - 1} stroke="var(--ink)" width={2} />
      {fuse !== null && (
        <>
          <Across at={fuse} from={0} to={HEIGHT} stroke="var(--ground)" width={8} />
          <Across at={fuse} from={0} to={HEIGHT} stroke={window.fits ? 'var(--copper)' : 'var(--stop)'} width={4} />
        </>
      )}
    </svg>
  );
}

interface AcrossProps {
  readonly at: number;
  readonly from: number;
  readonly to: number;
  readonly stroke: string;
  readonly width: number;
}

function Across({ at, from, to, stroke, width }: AcrossProps): ReactElement {
  return <line x1={percent(at)} x2={percent(at)} y1={from} y2={to} stroke={stroke} strokeWidth={width} />;
}

function percent(share: number): string {
  return `${(share * 100).toFixed(2)}%`;
}
