/** A junction: a dot from which a wire can be drawn, its name and its volts. */
import { Handle, type NodeProps, Position } from '@xyflow/react';
import { memo, type ReactElement } from 'react';
import type { JunctionFlowNode } from './flowNodes.ts';
import { useLive } from './live.ts';

export const JunctionNode = memo(function JunctionNode({
  data: { placed },
  selected,
}: NodeProps<JunctionFlowNode>): ReactElement {
  const volts = useLive((now) => now.volts.get(placed.id) ?? '');
  const classes = ['junction', placed.isLow ? 'low' : 'high', placed.isMain ? 'main' : '', selected ? 'chosen' : ''];
  return (
    <div className={classes.filter((name) => name !== '').join(' ')} title={`${placed.label}: ${volts}`}>
      <Handle id={placed.id} type="source" position={Position.Top} className="dot" />
      <div className="tag" aria-hidden>
        <span className="name">{placed.label}</span>
        {volts !== '' && !placed.isReference && <span className="volts">{volts}</span>}
        {placed.isReference && <span className="zero">0 V, reference</span>}
      </div>
    </div>
  );
});
