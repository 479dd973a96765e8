/** A part on the canvas: its symbol, name, rating and live figure. */
import { Handle, type NodeProps, Position } from '@xyflow/react';
import { memo, type ReactElement } from 'react';
import { partSymbol } from '../../core/api.ts';
import { SeverityMark } from '../controls/SeverityMark.tsx';
import type { PartFlowNode } from './flowNodes.ts';
import { Grip } from './Grip.tsx';
import { type LivePart, useLive } from './live.ts';
import type { PlacedPart } from './placedParts.ts';
import { Shapes } from './Shapes.tsx';
import { useIsLit } from './useLit.ts';

export const PartNode = memo(function PartNode({
  data: { placed },
  selected,
  width = 0,
  height = 0,
}: NodeProps<PartFlowNode>): ReactElement {
  const { part, drawn } = placed;
  const live = useLive((now) => now.parts.get(part.id));
  const isLit = useIsLit(part.id);
  const isDevice = 'plus' in part;
  const isClosed = live === undefined ? !('state' in part && part.state === 'open') : !live.isOpen;
  return (
    <div
      className={classesOf(
        isDevice || part.kind === 'controller' || part.kind === 'converter' ? 'part device' : 'part',
        { selected, isLit, live },
      )}
    >
      <svg
        className="symbol"
        width={width}
        height={height}
        viewBox={`${String(-width / 2)} ${String(-height / 2)} ${String(width)} ${String(height)}`}
        aria-hidden
      >
        <rect className="halo" x={-width / 2 - 4} y={-height / 2 - 4} width={width + 8} height={height + 8} rx="3" />
        <Shapes shapes={partSymbol(part, drawn.pose, { isClosed })} />
        <Signs placed={placed} />
      </svg>
      {live?.severity != null && (
        <div className={`verdict ${isDevice ? placed.side : drawn.pose.isUpright ? 'aside' : 'over'}`} aria-hidden>
          <SeverityMark severity={live.severity} bare />
        </div>
      )}
      <Words placed={placed} live={live} />
      <Grip part={part.id} selected={selected} />
      {selected && <Terminals placed={placed} width={width} height={height} />}
    </div>
  );
});

export function classesOf(
  base: string,
  {
    selected,
    isLit,
    live,
  }: { readonly selected?: boolean; readonly isLit: boolean; readonly live: LivePart | undefined },
): string {
  return [base, selected === true ? 'chosen' : '', isLit ? 'lit' : '', live?.isDead === true ? 'dead' : '']
    .filter((name) => name !== '')
    .join(' ');
}

/** Plus and minus as signs at the poles. */
function Signs({ placed: { drawn, at, part } }: { readonly placed: PlacedPart }): ReactElement | null {
  if (!('plus' in part) && part.kind !== 'controller' && part.kind !== 'converter') return null;
  return (
    <g className="signs">
      {drawn.terminals
        .filter(({ role }) => role !== 'midpoint')
        .map(({ role, x, y, way }) => {
          const isLevel = way === 'left' || way === 'right';
          const dx = isLevel ? (way === 'left' ? 18 : -18) : -9;
          const dy = isLevel ? (y > at.y ? -4 : 12) : way === 'up' ? 12 : -4;
          return (
            <text key={role} x={x - at.x + dx} y={y - at.y + dy} textAnchor="middle">
              {role.endsWith('plus') ? '+' : '\u2212'}
            </text>
          );
        })}
    </g>
  );
}

function Words({ placed, live }: { readonly placed: PlacedPart; readonly live: LivePart | undefined }): ReactElement {
  const { part, drawn, side, rating } = placed;
  const place =
    'plus' in part
      ? side
      : part.kind === 'controller' || part.kind === 'converter'
        ? 'under'
        : drawn.pose.isUpright && part.kind !== 'bond'
          ? 'right'
          : part.kind === 'bond'
            ? 'right'
            : 'around';
  const label = part.label === undefined || part.label === part.id ? null : <span className="label">{part.label}</span>;
  const figure = live === undefined ? '' : live.line;
  const state = live?.state ?? '';
  const figures = (
    <>
      {rating !== '' && <span className="rating">{rating}</span>}
      {live !== undefined && live.volts !== '' && <span className="volts">{live.volts}</span>}
      {figure !== '' && !(live?.isDead === true && state !== '') && <span className="figure">{figure}</span>}
      {state !== '' && <span className={state === 'no current' ? 'state plain' : 'state'}>{state}</span>}
    </>
  );
  if (place === 'left' || place === 'right') {
    const isSplit = part.kind === 'string' && part.midpoint !== undefined && side === 'left';
    return (
      <div className={`words beside ${place}${isSplit ? ' split' : ''}`} aria-hidden>
        <span className="id">{part.id}</span>
        {label}
        {figures}
      </div>
    );
  }
  if (place === 'under') {
    return (
      <div className="words below" aria-hidden>
        <span className="id">{part.id}</span>
        {figure !== '' && live?.isDead !== true && <span className="figure">{figure}</span>}
        {state !== '' && <span className="state">{state}</span>}
      </div>
    );
  }
  return (
    <>
      <div className="words above" aria-hidden>
        <span className="id">{part.id}</span>
      </div>
      <div className="words below" aria-hidden>
        {figures}
      </div>
    </>
  );
}

/**
 * A wire can be drawn from each terminal of a selected part; it begins at the terminal's junction. Only there: every handle listens to
 * every move of the view, and a large drawing has thousands of terminals.
 */
function Terminals({
  placed: { drawn, at },
  width,
  height,
}: {
  readonly placed: PlacedPart;
  readonly width: number;
  readonly height: number;
}): ReactElement {
  return (
    <>
      {drawn.terminals.map(({ role, junction, x, y }) => (
        <Handle
          key={role}
          id={junction}
          type="source"
          position={Position.Top}
          className="terminal"
          style={{ left: x - at.x + width / 2, top: y - at.y + height / 2 }}
        />
      ))}
    </>
  );
}
