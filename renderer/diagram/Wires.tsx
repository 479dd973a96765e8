/**
 * All wires of the drawing in one sheet under the symbols: thickness by current, and on every conductor the number in amps with an
 * arrow that says which way it flows.
 */
import { type CSSProperties, type MouseEvent, memo, type ReactElement } from 'react';
import { type DrawnWire, figurePlace, isConductor, lineWeight } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { type LivePart, useLive } from './live.ts';
import type { PlacedPart } from './placedParts.ts';
import { useIsLit } from './useLit.ts';
import { useView } from './view.ts';

export function Wires({ parts }: { readonly parts: readonly PlacedPart[] }): ReactElement {
  return (
    <svg className="wires" width="1" height="1" aria-hidden>
      {parts.map((placed) => (
        <PartWires key={placed.part.id} placed={placed} />
      ))}
    </svg>
  );
}

const PartWires = memo(function PartWires({ placed }: { readonly placed: PlacedPart }): ReactElement {
  const { part, drawn } = placed;
  const live = useLive((now) => now.parts.get(part.id));
  const largestA = useLive((now) => now.largestA);
  const isLit = useIsLit(part.id);
  const isChosen = useOpenJob(({ selection }) => selection.parts.includes(part.id));
  const isTold = isConductor(part) || part.kind === 'joint';
  const classes = ['wire-group', live?.isDead === true ? 'dead' : '', isLit ? 'lit' : '', isChosen ? 'chosen' : ''];
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the keyboard reaches the same part by its node; a wire is a larger target for a hand
    <g
      className={classes.filter((name) => name !== '').join(' ')}
      data-part={part.id}
      onClick={(event) => choose(event, placed)}
      onContextMenu={(event) => openMenu(event, placed)}
    >
      {drawn.wires.map((wire) => (
        <OneWire key={wire.role} wire={wire} live={live} largestA={largestA} isTold={isTold} middleY={placed.at.y} />
      ))}
    </g>
  );
});

function choose(event: MouseEvent, { part }: PlacedPart): void {
  event.stopPropagation();
  const { selection, select } = useOpenJob.getState();
  if (!event.shiftKey && !event.ctrlKey && !event.metaKey) {
    select({ parts: [part.id] });
    return;
  }
  const isChosen = selection.parts.includes(part.id);
  const parts = isChosen ? selection.parts.filter((id) => id !== part.id) : [...selection.parts, part.id];
  select({ ...selection, parts });
}
function openMenu(event: MouseEvent, { part }: PlacedPart): void {
  event.preventDefault();
  event.stopPropagation();
  useOpenJob.getState().select({ parts: [part.id] });
  useView.setState({ menu: { menu: 'part', part: part.id, at: { x: event.clientX, y: event.clientY } } });
}

function OneWire({
  wire,
  live,
  largestA,
  isTold,
  middleY,
}: {
  readonly wire: DrawnWire;
  readonly live: LivePart | undefined;
  readonly largestA: number;
  readonly isTold: boolean;
  readonly middleY: number;
}): ReactElement | null {
  if (wire.points.length < 2) return null;
  const { current } = wire;
  const key = current.of === 'through' ? (current.cable ?? 'through') : current.of;
  const flow = current.of === 'none' ? undefined : live?.currents[key];
  const currentA = flow?.currentA ?? 0;
  // In quarters of a unit, so that a hundredth of an ampere elsewhere does not paint every line anew.
  const weight = Math.round(4 * lineWeight(currentA, largestA)) / 4;
  const path = pathOf(wire);
  const isDead = flow !== undefined && flow.currentA !== null && Math.abs(flow.currentA) < 0.001;
  return (
    <g className={isDead ? 'wire dead' : 'wire'}>
      <path className="hit" d={path} />
      <path className="under" d={path} style={strokeOf(weight + 6)} />
      <path className="line" d={path} style={strokeOf(weight)} />
      {isTold && flow !== undefined && (
        <Figure wire={wire} text={flow.text} currentA={flow.currentA} weight={weight} middleY={middleY} />
      )}
    </g>
  );
}

function strokeOf(weight: number): CSSProperties {
  return { strokeWidth: `calc(${String(weight)}px * var(--s))` };
}

function pathOf({ points }: DrawnWire): string {
  return points.map(({ x, y }, index) => `${index === 0 ? 'M' : 'L'}${String(x)} ${String(y)}`).join('');
}

/** Stretches on which a figure stands freely only when the drawing is near, and only when it is not far. */
const TIGHT = 60;
const SHORT = 110;

function roomFor(length: number): string {
  if (length < TIGHT) return 'tight short';
  return length < SHORT ? 'short' : '';
}

function Figure({
  wire,
  text,
  currentA,
  weight,
  middleY,
}: {
  readonly wire: DrawnWire;
  readonly text: string;
  readonly currentA: number | null;
  readonly weight: number;
  /** Of the part: the upper line of a run has its number above it, for the run's name stands between the two. */
  readonly middleY: number;
}): ReactElement {
  const { at, isUpright, forward, length } = figurePlace(wire);
  const isFlowing = currentA !== null && Math.abs(currentA) >= 0.001;
  const way = (currentA ?? 0) < 0 ? -forward : forward;
  const turn = isUpright ? (way > 0 ? 90 : -90) : way > 0 ? 0 : 180;
  return (
    <g className={`amps ${roomFor(length)}`} transform={`translate(${String(at.x)} ${String(at.y)})`}>
      {isFlowing && (
        <path
          className="arrow"
          d="M-6-6.5 7 0-6 6.5z"
          transform={`rotate(${String(turn)}) scale(${String(0.8 + weight / 12)})`}
        />
      )}
      <text className={isUpright ? 'aside' : at.y < middleY ? 'over' : 'under'}>{text}</text>
    </g>
  );
}
