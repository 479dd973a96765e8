/**
 * Words that would lie on one another: the one that matters less gives way until the drawing is nearer. Where they lie is known only
 * once the browser has set them, so they are measured when the drawing has come to rest.
 */
import { useStoreApi } from '@xyflow/react';
import { type RefObject, useEffect } from 'react';
import { useOpenJob } from '../state/openJob.ts';
import { useLive } from './live.ts';
import { useView } from './view.ts';

const AT_REST_MS = 120;
/** Boxes of words have some air in them: they may share this much. */
const AIR_PX = 2;
const WORDS = '.words > span, .chip > span, .tag > span, .amps text';
/** What matters more comes first: whose word it is, its volts and amps, then what its label says. */
const RANKS = ['id', 'volts', 'figure', 'amps', 'name', 'state', 'zero', 'rating', 'label'] as const;

export function useUncrowded(frame: RefObject<HTMLElement | null>): void {
  const flow = useStoreApi();
  useEffect(() => {
    let waiting: ReturnType<typeof setTimeout> | undefined;
    const soon = (): void => {
      clearTimeout(waiting);
      waiting = setTimeout(() => {
        if (frame.current !== null) uncrowd(frame.current);
      }, AT_REST_MS);
    };
    soon();
    const stops = [
      useLive.subscribe(soon),
      useView.subscribe(soon),
      useOpenJob.subscribe(soon),
      // Panning moves all words alike.
      flow.subscribe((now, before) => {
        if (now.transform[2] !== before.transform[2]) soon();
      }),
    ];
    return () => {
      clearTimeout(waiting);
      for (const stop of stops) stop();
    };
  }, [frame, flow]);
}

interface Word {
  readonly element: Element;
  readonly box: DOMRect;
  readonly rank: number;
}

function uncrowd(root: HTMLElement): void {
  const words: Word[] = [];
  for (const element of root.querySelectorAll(WORDS)) {
    const box = element.getBoundingClientRect();
    if (box.width > 0) words.push({ element, box, rank: rankOf(element) });
  }
  words.sort((a, b) => a.rank - b.rank);
  const standing: DOMRect[] = [];
  for (const { element, box } of words) {
    const isCrowded = standing.some((other) => overlap(box, other));
    element.classList.toggle('crowded', isCrowded);
    if (!isCrowded) standing.push(box);
  }
}

/** What is selected or pointed out is told before all else. */
function rankOf(element: Element): number {
  const rank = RANKS.findIndex((name) =>
    name === 'amps' ? element.tagName === 'text' : element.classList.contains(name),
  );
  return (rank < 0 ? RANKS.length : rank) - (element.closest('.chosen, .lit') === null ? 0 : RANKS.length + 1);
}

function overlap(a: DOMRect, b: DOMRect): boolean {
  return (
    a.left < b.right - AIR_PX && b.left < a.right - AIR_PX && a.top < b.bottom - AIR_PX && b.top < a.bottom - AIR_PX
  );
}
