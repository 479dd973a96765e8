/** The name of a conductor on its line: what a hand takes hold of and the keyboard stops at. */
import type { NodeProps } from '@xyflow/react';
import { memo, type ReactElement } from 'react';
import { SeverityMark } from '../controls/SeverityMark.tsx';
import { useOpenJob } from '../state/openJob.ts';
import type { PartFlowNode } from './flowNodes.ts';
import { useLive } from './live.ts';
import { classesOf } from './PartNode.tsx';

export const ConductorNode = memo(function ConductorNode({
  data: { placed },
  selected,
}: NodeProps<PartFlowNode>): ReactElement {
  const { part, drawn, rating } = placed;
  const live = useLive((now) => now.parts.get(part.id));
  const isLit = useOpenJob(({ lit }) => lit.includes(part.id));
  const kind = part.kind === 'pair' ? 'between' : drawn.pose.isUpright ? 'aside' : 'over';
  return (
    <div className={`${classesOf('conductor', { selected, isLit, live })} ${kind}`}>
      <div className="chip" aria-hidden>
        {live?.severity != null && <SeverityMark severity={live.severity} bare />}
        <span className="id">{part.id}</span>
        {rating !== '' && <span className="rating">{rating}</span>}
      </div>
    </div>
  );
});
