/** The wiring of one pole as a tree that grows from the point where the bank is joined, batteries to the left, the rest to the right. */
import type { Link } from './wiringGraph.ts';

export interface TreeNode {
  readonly name: string;
  readonly parent: TreeNode | undefined;
  /** The link to the parent. */
  readonly link: Link | undefined;
  readonly children: TreeNode[];
}

/** A tree of all points reached from `root`, and the links left over that close loops. */
export function growTree(
  root: string,
  links: readonly Link[],
): { readonly nodes: ReadonlyMap<string, TreeNode>; readonly loops: readonly Link[] } {
  const touching = linksByPoint(links);
  const first: TreeNode = { name: root, parent: undefined, link: undefined, children: [] };
  const nodes = new Map([[root, first]]);
  const used = new Set<Link>();
  const loops: Link[] = [];
  const queue = [first];
  for (let node = queue.shift(); node !== undefined; node = queue.shift()) {
    for (const link of touching.get(node.name) ?? []) {
      if (used.has(link)) continue;
      used.add(link);
      const far = link.from === node.name ? link.to : link.from;
      if (nodes.has(far)) {
        loops.push(link);
        continue;
      }
      const child: TreeNode = { name: far, parent: node, link, children: [] };
      node.children.push(child);
      nodes.set(far, child);
      queue.push(child);
    }
  }
  return { nodes, loops };
}

function linksByPoint(links: readonly Link[]): ReadonlyMap<string, readonly Link[]> {
  const touching = new Map<string, Link[]>();
  for (const link of links) {
    for (const point of new Set([link.from, link.to])) touching.set(point, [...(touching.get(point) ?? []), link]);
  }
  return touching;
}

/** Where the ways from `start` to all of `targets` part: the last point that they share. */
export function partingPoint(start: string, targets: readonly string[], links: readonly Link[]): string {
  const { nodes } = growTree(start, links);
  const ways = targets.flatMap((target) => {
    const node = nodes.get(target);
    return node === undefined ? [] : [wayTo(node)];
  });
  const [firstWay = [start], ...others] = ways;
  let shared = start;
  for (const [index, point] of firstWay.entries()) {
    if (!others.every((way) => way[index] === point)) break;
    shared = point;
  }
  return shared;
}

/** From the root down to a node. */
function wayTo(node: TreeNode): readonly string[] {
  const way: string[] = [];
  for (let step: TreeNode | undefined = node; step !== undefined; step = step.parent) way.unshift(step.name);
  return way;
}

/** All nodes of a branch, the branch's own first, parents before children. */
export function branchOf(node: TreeNode): readonly TreeNode[] {
  const found = [node];
  for (const next of found) found.push(...next.children);
  return found;
}
