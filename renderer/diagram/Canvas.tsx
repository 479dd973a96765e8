/** The one-line diagram: pan, zoom, select, move, connect. */
import '@xyflow/react/dist/base.css';
import './diagram.css';
import {
  ConnectionLineType,
  ConnectionMode,
  type FinalConnectionState,
  type NodeChange,
  type OnConnect,
  ReactFlow,
  SelectionMode,
  useReactFlow,
  useStore,
  ViewportPortal,
} from '@xyflow/react';
import {
  type DragEvent,
  type FocusEvent,
  type MouseEvent,
  type ReactElement,
  useCallback,
  useEffect,
  useLayoutEffect,
  useMemo,
  useRef,
  useState,
} from 'react';
import type { JunctionId, PartFieldsGiven, PartId, Point } from '../../core/api.ts';
import { GRID } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { BarNode } from './BarNode.tsx';
import { ConductorNode } from './ConductorNode.tsx';
import { DRAGGED_PART } from './draggedPart.ts';
import { commitMove, putPart } from './edits.ts';
import { type FlowNode, junctionOfNode, MIDDLE, NodeMaker, partOfNode } from './flowNodes.ts';
import { focusGrip } from './Grip.tsx';
import { gripShifts, useGripShifts } from './gripPlaces.ts';
import { JunctionNode } from './JunctionNode.tsx';
import { followAnswers, useLive } from './live.ts';
import { openGroundMenu, openMenuOf } from './openMenus.ts';
import { PartNode } from './PartNode.tsx';
import { type Drawing, useDrawing } from './placedParts.ts';
import { useDiagramKeys } from './useDiagramKeys.ts';
import { useFit } from './useFit.ts';
import { useShowLit } from './useLit.ts';
import { useLongPress } from './useLongPress.ts';
import { useUncrowded } from './useUncrowded.ts';
import { useView } from './view.ts';
import { Wires } from './Wires.tsx';

const nodeTypes = { part: PartNode, conductor: ConductorNode, bar: BarNode, junction: JunctionNode };
const SELECT_KEYS = ['Shift', 'Control', 'Meta'];

/** Less than this on the screen a hand cannot hit. */
const LEAST_TARGET_PX = 24;
/** Where the drawing stands smaller than this, grips of the usual spacing cannot stand side by side. */
const LEAST_ZOOM_FOR_GRIPS = 0.2;

export function Canvas(): ReactElement {
  const drawing = useDrawing();
  const nodes = useNodes(drawing);
  const onNodesChange = useChanges(drawing);
  const keys = useDiagramKeys();
  const flow = useReactFlow();
  const pressed = useLongPress();
  useEffect(followAnswers, []);
  const onTouched = useFirstFit(nodes);
  const bringIntoView = useShowLit(drawing.positions);
  const showFocused = ({ target }: FocusEvent<HTMLElement>): void => {
    if (!target.matches('.grip:focus-visible')) return;
    const id = target.closest<HTMLElement>('.react-flow__node')?.dataset['id'] ?? null;
    const part = partOfNode(id);
    if (part !== undefined) bringIntoView(part);
  };

  const onConnect = useCallback<OnConnect>(() => undefined, []);
  const onConnectEnd = useCallback(
    (event: globalThis.MouseEvent | TouchEvent, state: FinalConnectionState) => {
      const from = junctionOf(state.fromNode?.id, state.fromHandle?.id);
      if (from === undefined) return;
      const at = pointerOf(event);
      const to = junctionOf(state.toNode?.id, state.toHandle?.id);
      if (to === undefined) {
        useView.setState({ menu: { menu: 'new-part', from, at, place: flow.screenToFlowPosition(at) } });
      } else if (to !== from) useView.setState({ menu: { menu: 'connect', from, to, at } });
    },
    [flow],
  );
  const onDrop = (event: DragEvent): void => {
    const text = event.dataTransfer.getData(DRAGGED_PART);
    if (text === '') return;
    event.preventDefault();
    event.stopPropagation();
    putPart(JSON.parse(text) as PartFieldsGiven, flow.screenToFlowPosition({ x: event.clientX, y: event.clientY }));
  };

  return (
    <DrawingFrame parts={drawing.parts}>
      {/* The drawing is one thing to the keyboard; its parts are stops inside it. */}
      <ReactFlow<FlowNode>
        {...keys}
        {...pressed}
        nodes={nodes}
        edges={NO_EDGES}
        nodeTypes={nodeTypes}
        nodeOrigin={MIDDLE}
        onNodesChange={onNodesChange}
        onConnect={onConnect}
        onConnectEnd={onConnectEnd}
        onNodeClick={focusNode}
        onFocus={showFocused}
        onNodeContextMenu={openNodeMenu}
        onPaneContextMenu={(event) => openGroundMenu(event, flow.screenToFlowPosition)}
        onPaneClick={() => useOpenJob.getState().light([])}
        onMoveStart={(event) => {
          if (event !== null) onTouched();
        }}
        onNodeDragStart={onTouched}
        onDragOver={(event) => event.preventDefault()}
        onDrop={onDrop}
        connectionMode={ConnectionMode.Loose}
        connectionLineType={ConnectionLineType.Step}
        connectionRadius={24}
        minZoom={0.15}
        maxZoom={3}
        multiSelectionKeyCode={SELECT_KEYS}
        selectionKeyCode="Shift"
        selectionMode={SelectionMode.Partial}
        deleteKeyCode={null}
        panActivationKeyCode={null}
        disableKeyboardA11y
        elevateNodesOnSelect={false}
        zoomOnDoubleClick={false}
        tabIndex={-1}
        aria-label="One-line diagram. Tab goes from part to part."
      >
        <ViewportPortal>
          <Wires parts={drawing.parts} />
        </ViewportPortal>
      </ReactFlow>
    </DrawingFrame>
  );
}
const NO_EDGES: never[] = [];

/** Classes that say how much is shown: by the person's wish, and by how large the drawing stands. */
function DrawingFrame({
  parts,
  children,
}: {
  readonly parts: Drawing['parts'];
  readonly children: ReactElement;
}): ReactElement {
  const frame = useRef<HTMLDivElement>(null);
  useUncrowded(frame);
  const { volts, amps, labels } = useView();
  const isOld = useLive((now) => now.isOld);
  const zoom = useStore((flow) => flow.transform[2]);
  const detail = zoom >= 0.75 ? 'near' : zoom >= 0.45 ? 'mid' : zoom >= 0.26 ? 'far' : 'far tiny';
  // Words never get smaller on the screen than this share of their usual size.
  const k = Math.round(Math.min(3.7, Math.max(0.8, 0.95 / zoom)) * 20) / 20;
  const s = Math.round(Math.min(1.9, Math.max(1, 0.7 / zoom)) * 20) / 20;
  // In units of the drawing, a little more and rounded up, so that few steps of the zoom change it.
  const grip = Math.ceil((LEAST_TARGET_PX / zoom + 1) / 2) * 2;
  useEffect(() => {
    frame.current?.style.setProperty('--k', String(k));
    frame.current?.style.setProperty('--s', String(s));
    frame.current?.style.setProperty('--grip', `${String(grip)}px`);
  }, [k, s, grip]);
  useEffect(() => {
    const isTooSmall = grip > LEAST_TARGET_PX / LEAST_ZOOM_FOR_GRIPS;
    useGripShifts.setState({ shifts: isTooSmall ? new Map() : gripShifts(parts, grip) });
  }, [parts, grip]);
  const classes = [
    'drawing',
    detail,
    zoom >= 1.1 ? 'names' : '',
    volts ? '' : 'no-volts',
    amps ? '' : 'no-amps',
    labels ? '' : 'no-labels',
    isOld ? 'old' : '',
  ];
  return (
    <div ref={frame} className={classes.filter((name) => name !== '').join(' ')}>
      {children}
    </div>
  );
}

function useNodes(drawing: Drawing): FlowNode[] {
  const [maker] = useState(() => new NodeMaker());
  const selection = useOpenJob((job) => job.selection);
  return useMemo(() => maker.make(drawing, selection), [maker, drawing, selection]);
}

/** Fits the drawing into view when a job is opened, and again as its room changes, until the person has moved the view. */
function useFirstFit(nodes: readonly FlowNode[]): () => void {
  const fitWhole = useFit();
  const standing = useRef(nodes);
  useLayoutEffect(() => {
    standing.current = nodes;
  }, [nodes]);
  const key = useOpenJob((job) => job.key);
  const width = useStore((flow) => flow.width);
  const height = useStore((flow) => flow.height);
  const touched = useRef<string | null>(null);
  const isThere = nodes.length > 0 && width > 0;
  const room = `${String(width)} × ${String(height)}`;
  useEffect(() => {
    if (isThere && room !== '' && touched.current !== key) fitWhole(standing.current);
  }, [isThere, room, key, fitWhole]);
  return useCallback(() => {
    touched.current = key;
  }, [key]);
}

/** Selection and moves, as the canvas reports them. */
function useChanges({ positions }: Drawing): (changes: NodeChange<FlowNode>[]) => void {
  const start = useRef<Map<string, Point>>(new Map());
  return useCallback(
    (changes) => {
      takeSelection(changes);
      const moves = changes.filter((change) => change.type === 'position');
      const [first] = moves;
      if (first === undefined) return;
      if (first.dragging === true && first.position !== undefined) {
        for (const { id, position } of moves) {
          if (!start.current.has(id) && position !== undefined)
            start.current.set(id, firstPlace(id, positions) ?? position);
        }
        const from = start.current.get(first.id) ?? first.position;
        const by = { x: snapped(first.position.x - from.x), y: snapped(first.position.y - from.y) };
        const drag = useView.getState().drag;
        if (drag === null || drag.by.x !== by.x || drag.by.y !== by.y) {
          useView.setState({ drag: { parts: idsOf(moves, partOfNode), junctions: idsOf(moves, junctionOfNode), by } });
        }
        return;
      }
      start.current.clear();
      const drag = useView.getState().drag;
      useView.setState({ drag: null });
      if (drag !== null) commitMove(positions, drag);
    },
    [positions],
  );
}

function firstPlace(id: string, positions: Drawing['positions']): Point | undefined {
  const junction = junctionOfNode(id);
  if (junction !== undefined) return positions.junctions.get(junction);
  const node = document.querySelector<HTMLElement>(`.react-flow__node[data-id="${CSS.escape(id)}"] .bar`);
  // A bar's node stands about the middle of the bar, not at its place.
  const part = partOfNode(id);
  return node !== null || part === undefined ? undefined : positions.parts.get(part);
}
function snapped(value: number): number {
  return Math.round(value / GRID) * GRID;
}
function idsOf<T extends string>(
  moves: readonly { readonly id: string }[],
  idOf: (node: string) => T | undefined,
): ReadonlySet<T> {
  return new Set(moves.flatMap(({ id }) => idOf(id) ?? []));
}

function takeSelection(changes: readonly NodeChange<FlowNode>[]): void {
  const selects = changes.filter((change) => change.type === 'select');
  if (selects.length === 0) return;
  const { selection, select } = useOpenJob.getState();
  const parts = new Set<PartId>(selection.parts);
  const junctions = new Set<JunctionId>(selection.junctions);
  for (const { id, selected } of selects) {
    const part = partOfNode(id);
    const junction = junctionOfNode(id);
    if (part !== undefined) {
      if (selected) parts.add(part);
      else parts.delete(part);
    }
    if (junction !== undefined) {
      if (selected) junctions.add(junction);
      else junctions.delete(junction);
    }
  }
  select({ parts: [...parts], junctions: [...junctions] });
}

/** Every handle is called by its junction. */
function junctionOf(node: string | undefined, handle: string | null | undefined): JunctionId | undefined {
  return (handle ?? junctionOfNode(node ?? null)) as JunctionId | undefined;
}
function pointerOf(event: globalThis.MouseEvent | TouchEvent): Point {
  const at = 'changedTouches' in event ? event.changedTouches[0] : event;
  return { x: at?.clientX ?? 0, y: at?.clientY ?? 0 };
}

function focusNode({ currentTarget }: MouseEvent): void {
  focusGrip(currentTarget instanceof Element ? currentTarget : null);
}

function openNodeMenu(event: MouseEvent, { id }: FlowNode): void {
  event.preventDefault();
  openMenuOf(id, { x: event.clientX, y: event.clientY });
}
