/** Brings the whole drawing into view, from the places of its parts: it asks nothing of what the browser has measured so far. */
import { getViewportForBounds, type Rect, useReactFlow, useStoreApi } from '@xyflow/react';
import { useCallback } from 'react';
import type { FlowNode } from './flowNodes.ts';

const MOST_ZOOM = 1.25;
/** Room for the words beside the outermost parts. */
const PADDING = { left: '84px', right: '84px', top: '44px', bottom: '40px' } as const;

/** With nodes, of those; else of all that the canvas holds. */
export function useFit(): (nodes?: readonly FlowNode[]) => void {
  const flow = useReactFlow<FlowNode>();
  const store = useStoreApi<FlowNode>();
  return useCallback(
    (nodes = flow.getNodes()) => {
      const { width, height, minZoom } = store.getState();
      if (nodes.length === 0 || width === 0 || height === 0) return;
      void flow.setViewport(getViewportForBounds(boundsOf(nodes), width, height, minZoom, MOST_ZOOM, PADDING));
    },
    [flow, store],
  );
}

/** The place of a node is its middle. */
function boundsOf(nodes: readonly FlowNode[]): Rect {
  const [x1, y1, x2, y2] = nodes.reduce(
    ([left, top, right, bottom], { position: { x, y }, width = 0, height = 0 }) => [
      Math.min(left, x - width / 2),
      Math.min(top, y - height / 2),
      Math.max(right, x + width / 2),
      Math.max(bottom, y + height / 2),
    ],
    [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, Number.NEGATIVE_INFINITY],
  );
  return { x: x1, y: y1, width: x2 - x1, height: y2 - y1 };
}
