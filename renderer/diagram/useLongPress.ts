/** A finger that stays opens the menu that the right button opens. */
import { type PointerEvent, useCallback, useRef } from 'react';
import { openMenuOf } from './openMenus.ts';

const LONG_MS = 550;
/** A finger trembles this far, px. */
const TREMBLE = 8;

export interface LongPress {
  readonly onPointerDownCapture: (event: PointerEvent<HTMLElement>) => void;
  readonly onPointerMoveCapture: (event: PointerEvent<HTMLElement>) => void;
  readonly onPointerUpCapture: () => void;
}

export function useLongPress(): LongPress {
  const press = useRef<{ timer: ReturnType<typeof setTimeout>; x: number; y: number } | null>(null);
  const end = useCallback(() => {
    if (press.current !== null) clearTimeout(press.current.timer);
    press.current = null;
  }, []);
  const onPointerDownCapture = useCallback(
    (event: PointerEvent<HTMLElement>) => {
      end();
      const node = event.target instanceof Element ? event.target.closest<HTMLElement>('.react-flow__node') : null;
      const id = node?.dataset['id'];
      if (event.pointerType !== 'touch' || id === undefined) return;
      const at = { x: event.clientX, y: event.clientY };
      press.current = { ...at, timer: setTimeout(() => openMenuOf(id, at), LONG_MS) };
    },
    [end],
  );
  const onPointerMoveCapture = useCallback(
    ({ clientX, clientY }: PointerEvent<HTMLElement>) => {
      const now = press.current;
      if (now !== null && Math.hypot(clientX - now.x, clientY - now.y) > TREMBLE) end();
    },
    [end],
  );
  return { onPointerDownCapture, onPointerMoveCapture, onPointerUpCapture: end };
}
