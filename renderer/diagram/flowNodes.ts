/** The nodes of the canvas: one a part, one a junction. A node object stays the same as long as nothing of it changes. */
import type { Node } from '@xyflow/react';
import type { JunctionId, PartId } from '../../core/api.ts';
import { roomOf } from '../../core/api.ts';
import type { Selection } from '../state/openJob.ts';
import type { Drawing, PlacedJunction, PlacedPart } from './placedParts.ts';

export type PartFlowNode = Node<{ readonly placed: PlacedPart }, 'part' | 'conductor' | 'bar'>;
export type JunctionFlowNode = Node<{ readonly placed: PlacedJunction }, 'junction'>;
export type FlowNode = PartFlowNode | JunctionFlowNode;

export const partNodeId = (id: PartId): string => `p:${id}`;
export const junctionNodeId = (id: JunctionId): string => `j:${id}`;
export function partOfNode(id: string | null): PartId | undefined {
  return id?.startsWith('p:') === true ? (id.slice(2) as PartId) : undefined;
}
export function junctionOfNode(id: string | null): JunctionId | undefined {
  return id?.startsWith('j:') === true ? (id.slice(2) as JunctionId) : undefined;
}

/** The place of a node is its middle. */
export const MIDDLE: [number, number] = [0.5, 0.5];
/** Across a junction's dot. */
export const JUNCTION_SIZE = 16;

export class NodeMaker {
  private made = new Map<string, FlowNode>();

  /** Parts in reading order, so that the Tab key walks them so; then junctions. */
  make(drawing: Drawing, selection: Selection): FlowNode[] {
    const chosenParts = new Set<string>(selection.parts);
    const chosenJunctions = new Set<string>(selection.junctions);
    const parts = drawing.parts
      .toSorted(inReadingOrder)
      .map((placed) => this.kept(partNode(placed, chosenParts.has(placed.part.id))));
    const junctions = drawing.junctions.map((placed) =>
      this.kept(junctionNode(placed, chosenJunctions.has(placed.id))),
    );
    const nodes = [...parts, ...junctions];
    this.made = new Map(nodes.map((node) => [node.id, node]));
    return nodes;
  }

  private kept(now: FlowNode): FlowNode {
    const old = this.made.get(now.id);
    const isSame = old !== undefined && old.data.placed === now.data.placed && old.selected === now.selected;
    return isSame ? old : now;
  }
}

const ROW = 80;
function inReadingOrder(a: PlacedPart, b: PlacedPart): number {
  const rows = Math.round(a.at.y / ROW) - Math.round(b.at.y / ROW);
  return rows === 0 ? a.at.x - b.at.x : rows;
}

function partNode(placed: PlacedPart, selected: boolean): PartFlowNode {
  const { part, drawn } = placed;
  const isBar = drawn.bar !== undefined;
  const room = roomOf(part, drawn.pose);
  const [width, height] = isBar ? barSize(placed) : [2 * room.halfWidth, 2 * room.halfHeight];
  const type = isBar ? 'bar' : part.kind === 'cable' || part.kind === 'pair' ? 'conductor' : 'part';
  return {
    id: partNodeId(part.id),
    type,
    position: isBar ? barMiddle(placed) : placed.at,
    data: { placed },
    width,
    height,
    measured: { width, height },
    selected,
    // Its grip has the name and the focus.
    focusable: false,
    zIndex: isBar ? 1 : 4,
  };
}

function barSize({ drawn: { bar, pose } }: PlacedPart): readonly [number, number] {
  const [a, b] = bar ?? [];
  const length = a === undefined || b === undefined ? 40 : Math.abs(b.x - a.x) + Math.abs(b.y - a.y);
  return pose.isUpright ? [16, length] : [length, 16];
}
/** The box of a bar is about its middle, wherever its handle stands. */
function barMiddle({ at, drawn: { bar } }: PlacedPart): { x: number; y: number } {
  const [a, b] = bar ?? [at, at];
  return { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
}

function junctionNode(placed: PlacedJunction, selected: boolean): JunctionFlowNode {
  return {
    id: junctionNodeId(placed.id),
    type: 'junction',
    position: placed.at,
    data: { placed },
    width: JUNCTION_SIZE,
    height: JUNCTION_SIZE,
    measured: { width: JUNCTION_SIZE, height: JUNCTION_SIZE },
    selected,
    ariaLabel: `Junction ${placed.label}`,
    ariaRole: 'button',
    zIndex: 3,
    domAttributes: { tabIndex: -1 },
  };
}
