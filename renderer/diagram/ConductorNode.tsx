/** The name of a conductor on its line: what a hand takes hold of and the keyboard stops at. */
import type { NodeProps } from '@xyflow/react';
import { memo, type ReactElement } from 'react';
import { figurePlace } from '../../core/api.ts';
import { SeverityMark } from '../controls/SeverityMark.tsx';
import type { PartFlowNode } from './flowNodes.ts';
import { Grip } from './Grip.tsx';
import { useLive } from './live.ts';
import { classesOf } from './PartNode.tsx';
import { useIsLit } from './useLit.ts';

/** What the volts of its first junction need, and the mean width of a letter, in units of the drawing. */
const ROOM_FOR_VOLTS = 70;
const LETTER = 6.5;

export const ConductorNode = memo(function ConductorNode({
  data: { placed },
  selected,
}: NodeProps<PartFlowNode>): ReactElement {
  const { part, drawn, rating } = placed;
  const live = useLive((now) => now.parts.get(part.id));
  const isLit = useIsLit(part.id);
  // Where the line is too short for both, the size gives way: the ledger has it.
  const [wire] = drawn.wires;
  const room = wire === undefined ? 0 : figurePlace(wire).length - ROOM_FOR_VOLTS;
  const isBrief = part.kind === 'cable' && !drawn.pose.isUpright && (part.id.length + rating.length) * LETTER > room;
  const kind = part.kind === 'pair' ? 'between' : drawn.pose.isUpright ? 'aside' : 'over';
  return (
    <div className={`${classesOf('conductor', { selected, isLit, live })} ${kind}`}>
      <Grip part={part.id} selected={selected} />
      <div className="chip" aria-hidden>
        {live?.severity != null && <SeverityMark severity={live.severity} bare />}
        <span className="id">{part.id}</span>
        {rating !== '' && !isBrief && <span className="rating">{rating}</span>}
      </div>
    </div>
  );
});
