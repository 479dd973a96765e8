/** What a finding or a walk points at, on the drawing: lit, and brought into view. */
import { useReactFlow, useStoreApi } from '@xyflow/react';
import { useCallback, useEffect, useRef } from 'react';
import type { PartId, Positions } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';

/** A run is lit by either of its conductors. */
export function useIsLit(part: PartId): boolean {
  return useOpenJob(({ lit }) => lit.some((id) => ownerOf(id, part)));
}
function ownerOf(lit: string, part: string): boolean {
  return lit === part || lit === `${part}.plus` || lit === `${part}.minus`;
}

/** Room that a part needs round its middle to be seen with its words, px. */
const MARGIN_PX = 60;
/** Smaller than this, words cannot be read. */
const LEAST_ZOOM = 0.5;

/**
 * Moves the view to the first part that is lit, or selected elsewhere, where it lies outside what is seen. The returned function does
 * so for any part.
 */
export function useShowLit(positions: Positions): (part: PartId) => void {
  const lit = useOpenJob((job) => job.lit);
  const chosen = useOpenJob(({ selection }) => (selection.parts.length === 1 ? selection.parts[0] : undefined));
  const { setCenter } = useReactFlow();
  const store = useStoreApi();
  const shown = lit[0] ?? chosen;
  const last = useRef<PartId | undefined>(undefined);
  const bringIntoView = useCallback(
    (part: PartId) => {
      const at = positions.parts.get(part.replace(/\.(?:plus|minus)$/, '') as PartId);
      if (at === undefined) return;
      const {
        transform: [x, y, zoom],
        width,
        height,
      } = store.getState();
      const [left, top] = [at.x * zoom + x, at.y * zoom + y];
      const isSeen =
        left > MARGIN_PX && left < width - MARGIN_PX && top > MARGIN_PX / 2 && top < height - MARGIN_PX / 2;
      if (!isSeen) void setCenter(at.x, at.y, { zoom: Math.max(zoom, LEAST_ZOOM) });
    },
    [positions, setCenter, store],
  );
  useEffect(() => {
    // Moving a part by hand must not move the view: only another part to show does.
    if (shown === last.current) return;
    last.current = shown;
    if (shown !== undefined) bringIntoView(shown);
  }, [shown, bringIntoView]);
  return bringIntoView;
}
