/** Keys of the drawing. They work while the drawing has the focus; in a field they belong to the field. */
import { useReactFlow } from '@xyflow/react';
import { type ClipboardEvent, type KeyboardEvent, useCallback } from 'react';
import type { PartId, Point } from '../../core/api.ts';
import { GRID, junctionsOf } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { useSession } from '../state/session.ts';
import { copiedText, duplicateSelected, goToLedger, nudge, paste, removeSelected, selectAll } from './edits.ts';
import { junctionOfNode, partOfNode } from './flowNodes.ts';
import { focusGrip } from './Grip.tsx';
import { useFit } from './useFit.ts';
import { useView } from './view.ts';

const ARROWS: Readonly<Record<string, Point>> = {
  ArrowLeft: { x: -GRID, y: 0 },
  ArrowRight: { x: GRID, y: 0 },
  ArrowUp: { x: 0, y: -GRID },
  ArrowDown: { x: 0, y: GRID },
};

export interface DiagramKeys {
  readonly onKeyDown: (event: KeyboardEvent<HTMLElement>) => void;
  readonly onCopy: (event: ClipboardEvent<HTMLElement>) => void;
  readonly onCut: (event: ClipboardEvent<HTMLElement>) => void;
  readonly onPaste: (event: ClipboardEvent<HTMLElement>) => void;
}

export function useDiagramKeys(): DiagramKeys {
  const { zoomIn, zoomOut } = useReactFlow();
  const fitWhole = useFit();
  const onKeyDown = useCallback(
    (event: KeyboardEvent<HTMLElement>) => {
      if (isTyping(event.target) || event.altKey) return;
      const act = event.ctrlKey || event.metaKey ? controlKey(event) : plainKey(event, { zoomIn, zoomOut, fitWhole });
      if (act === undefined) return;
      event.preventDefault();
      act();
    },
    [zoomIn, zoomOut, fitWhole],
  );
  return { onKeyDown, onCopy: copy, onCut: cut, onPaste: pasteFrom };
}

function isTyping(target: EventTarget): boolean {
  return (
    target instanceof HTMLInputElement || target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement
  );
}

function controlKey({ key }: KeyboardEvent): (() => void) | undefined {
  switch (key.toLowerCase()) {
    case 'a':
      return selectAll;
    case 'd':
      return duplicateSelected;
    default:
      return undefined;
  }
}

interface Zooming {
  readonly zoomIn: () => Promise<boolean>;
  readonly zoomOut: () => Promise<boolean>;
  readonly fitWhole: () => void;
}

function plainKey(event: KeyboardEvent<HTMLElement>, { zoomIn, zoomOut, fitWhole }: Zooming): (() => void) | undefined {
  const arrow = ARROWS[event.key];
  if (arrow !== undefined) {
    const steps = event.shiftKey ? 4 : 1;
    return () => {
      takeFocused(event);
      nudge({ x: arrow.x * steps, y: arrow.y * steps });
    };
  }
  switch (event.key) {
    case '+':
    case '=':
      return () => void zoomIn();
    case '-':
      return () => void zoomOut();
    case '0':
      return () => fitWhole();
    case 'Delete':
    case 'Backspace':
      return () => {
        const next = focusedNode(event)?.nextElementSibling;
        takeFocused(event);
        removeSelected();
        // The keyboard goes on from where it was.
        focusGrip(next);
      };
    case 'Escape':
      return () => {
        useOpenJob.getState().select({});
        useOpenJob.getState().light([]);
      };
    case 'Enter':
      return () => {
        takeFocused(event);
        // Where it stands beside the stage already, calling it changes nothing.
        useSession.getState().callLedger(true);
        goToLedger();
      };
    case ' ':
      return () => toggleFocused(event);
    case 'j':
      return () => stepThroughJunctions(event);
    case 'c':
      return () => connectFromHere(event);
    case 'ContextMenu':
      return () => menuHere(event);
    case 'F10':
      return event.shiftKey ? () => menuHere(event) : undefined;
    default:
      return undefined;
  }
}

/** The node that has the focus. */
function focusedNode(event: KeyboardEvent<HTMLElement>): HTMLElement | null {
  return event.target instanceof HTMLElement ? event.target.closest<HTMLElement>('.react-flow__node') : null;
}
function focusedPart(event: KeyboardEvent<HTMLElement>): PartId | undefined {
  return partOfNode(focusedNode(event)?.dataset['id'] ?? null);
}

/** What has the focus is meant, unless it is among what is selected. */
function takeFocused(event: KeyboardEvent<HTMLElement>): void {
  const { selection, select } = useOpenJob.getState();
  const id = focusedNode(event)?.dataset['id'] ?? null;
  const part = partOfNode(id);
  const junction = junctionOfNode(id);
  if (part !== undefined && !selection.parts.includes(part)) select({ parts: [part] });
  if (junction !== undefined && !selection.junctions.includes(junction)) select({ junctions: [junction] });
}

function toggleFocused(event: KeyboardEvent<HTMLElement>): void {
  const part = focusedPart(event);
  if (part === undefined) return;
  const { selection, select } = useOpenJob.getState();
  const isChosen = selection.parts.includes(part);
  select({ ...selection, parts: isChosen ? selection.parts.filter((id) => id !== part) : [...selection.parts, part] });
}

/** From a part to its junctions, one after the other, and from a junction on to the next of the part. */
function stepThroughJunctions(event: KeyboardEvent<HTMLElement>): void {
  const { job, selection, select } = useOpenJob.getState();
  const id = focusedPart(event) ?? selection.parts[0];
  const part = job.parts.find((each) => each.id === id);
  if (part === undefined) return;
  const junctions = [...new Set(junctionsOf(part))];
  const now = junctions.findIndex((each) => selection.junctions.includes(each));
  const next = junctions[(now + 1) % junctions.length];
  if (next !== undefined) select({ parts: [part.id], junctions: [next] });
}

function placeOf(element: HTMLElement | null): Point {
  const box = (element ?? document.querySelector<HTMLElement>('.drawing'))?.getBoundingClientRect();
  return { x: (box?.left ?? 0) + (box?.width ?? 0) / 2, y: (box?.top ?? 0) + (box?.height ?? 0) / 2 };
}

function connectFromHere(event: KeyboardEvent<HTMLElement>): void {
  const at = placeOf(focusedNode(event));
  const { selection, job } = useOpenJob.getState();
  const junction = junctionOfNode(focusedNode(event)?.dataset['id'] ?? null) ?? selection.junctions[0];
  if (junction !== undefined) {
    useView.setState({ menu: { menu: 'choose-end', from: junction, at } });
    return;
  }
  const id = focusedPart(event) ?? selection.parts[0];
  if (id !== undefined && job.parts.some((part) => part.id === id)) {
    useView.setState({ menu: { menu: 'choose-start', part: id, at } });
  }
}

function menuHere(event: KeyboardEvent<HTMLElement>): void {
  const node = focusedNode(event);
  const at = placeOf(node);
  // With the focus on the drawing itself, what is selected is meant.
  const isOnDrawing = node === null;
  const { selection } = useOpenJob.getState();
  const part = isOnDrawing ? selection.parts[0] : focusedPart(event);
  const junction = isOnDrawing ? selection.junctions[0] : junctionOfNode(node.dataset['id'] ?? null);
  takeFocused(event);
  if (part !== undefined) useView.setState({ menu: { menu: 'part', part, at } });
  else if (junction !== undefined) useView.setState({ menu: { menu: 'junction', junction, at } });
  else useView.setState({ menu: { menu: 'ground', at, place: { x: 0, y: 0 } } });
}

function copy(event: ClipboardEvent<HTMLElement>): void {
  if (isTyping(event.target)) return;
  const text = copiedText();
  if (text === undefined) return;
  event.preventDefault();
  event.clipboardData.setData('text/plain', text);
}
function cut(event: ClipboardEvent<HTMLElement>): void {
  if (isTyping(event.target)) return;
  copy(event);
  if (event.defaultPrevented) removeSelected();
}
function pasteFrom(event: ClipboardEvent<HTMLElement>): void {
  if (isTyping(event.target)) return;
  event.preventDefault();
  paste(event.clipboardData.getData('text/plain'));
}
