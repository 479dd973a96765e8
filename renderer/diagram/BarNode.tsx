/** A busbar: an upright or level bar on which its junctions lie. */
import type { NodeProps } from '@xyflow/react';
import { memo, type ReactElement } from 'react';
import type { JunctionId } from '../../core/api.ts';
import { SeverityMark } from '../controls/SeverityMark.tsx';
import type { PartFlowNode } from './flowNodes.ts';
import { Grip } from './Grip.tsx';
import { useLive } from './live.ts';
import { classesOf } from './PartNode.tsx';
import { useIsLit } from './useLit.ts';

export const BarNode = memo(function BarNode({
  data: { placed },
  selected,
  width = 0,
  height = 0,
}: NodeProps<PartFlowNode>): ReactElement {
  const { part, drawn, rating } = placed;
  const live = useLive((now) => now.parts.get(part.id));
  const isLit = useIsLit(part.id);
  const volts = useLive(
    (now) => (part.kind === 'busbar' ? now.volts.get(part.junctions[0] as JunctionId) : undefined) ?? '',
  );
  return (
    <div
      className={`${classesOf('bar', { selected, isLit, live })} ${drawn.pose.isUpright ? 'upright' : 'level'} ${placed.isLow ? 'low' : ''}`}
    >
      <div className="stroke" style={drawn.pose.isUpright ? { height } : { width }} />
      <Grip part={part.id} selected={selected} />
      <div className="words" aria-hidden>
        <span className="id">
          {live?.severity != null && <SeverityMark severity={live.severity} bare />}
          {part.id}
        </span>
        {rating !== '' && <span className="rating">{rating}</span>}
        {volts !== '' && <span className="volts">{volts}</span>}
      </div>
    </div>
  );
});
