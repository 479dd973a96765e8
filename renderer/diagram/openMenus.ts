/** Opens the menus of the drawing where a hand asks for them. */
import type { MouseEvent } from 'react';
import type { Point } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { junctionOfNode, partOfNode } from './flowNodes.ts';
import { useView } from './view.ts';

export function openMenuOf(node: string, at: Point): void {
  const part = partOfNode(node);
  const junction = junctionOfNode(node);
  const { selection, select } = useOpenJob.getState();
  if (part !== undefined) {
    if (!selection.parts.includes(part)) select({ parts: [part] });
    useView.setState({ menu: { menu: 'part', part, at } });
  } else if (junction !== undefined) {
    select({ junctions: [junction] });
    useView.setState({ menu: { menu: 'junction', junction, at } });
  }
}

export function openGroundMenu(event: globalThis.MouseEvent | MouseEvent, toPlace: (at: Point) => Point): void {
  event.preventDefault();
  const at = { x: event.clientX, y: event.clientY };
  useView.setState({ menu: { menu: 'ground', at, place: toPlace(at) } });
}
