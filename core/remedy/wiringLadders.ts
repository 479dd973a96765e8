/** Leads swapped, links taken out, switches closed, parts brought into use. */

import { changed } from '../draft/draft.ts';
import type { Edit } from '../draft/edit.ts';
import { removeParts } from '../draft/parts.ts';
import { junctionAt, pathsOf, putTerminal } from '../draft/terminals.ts';
import { partsInCase } from '../job/job.ts';
import type { JunctionId, Part, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { isWiring, joined, withoutPairs } from '../network/wiring.ts';
import { type Bench, type Candidate, type Ladder, stepped } from './candidate.ts';

/** Parts that are tried one by one, at most. */
const MOST_TRIED = 8;

/** Plus and minus of a part changed over, for each pair of poles that it has. */
export function swappedLeads(bench: Bench, id: PartId): readonly Ladder[] {
  const part = bench.drawn(id);
  if (part === undefined) return [];
  const paths = pathsOf(part.kind);
  const pairs = paths
    .filter((path) => path.endsWith('plus'))
    .map((plus) => [plus, plus.replace(/plus$/, 'minus')] as const);
  return pairs.map(([plus, minus]) => {
    const where = pairs.length > 1 ? ` (${plus.split('.')[0] === 'from' ? 'input' : 'output'})` : '';
    const edit: Edit = {
      label: `${nameOf(part)}: plus and minus leads${where} changed over`,
      apply: (draft) =>
        changed(draft, (open) => {
          const found = open.parts.find((candidate) => candidate.id === id);
          if (found === undefined) return;
          const [high, low] = [junctionAt(found, plus), junctionAt(found, minus)];
          if (high === undefined || low === undefined) return;
          putTerminal(found, plus, low);
          putTerminal(found, minus, high);
        }),
    };
    return stepped([{ edit, cost: 'two leads changed over', effort: 'joint', amount: 1 }]);
  });
}

/** The links that join the poles of a source: each opened or taken out, one at a time. */
export function linksAway(bench: Bench, id: PartId): readonly Ladder[] {
  const source = bench.drawn(id);
  if (source === undefined) return [];
  const poles = 'plus' in source ? source : 'to' in source && typeof source.to === 'object' ? source.to : undefined;
  if (poles === undefined) return [];
  const way = shortestWay(bench, poles.plus, poles.minus);
  return way.slice(0, MOST_TRIED).map((part) => stepped([away(bench, part)]));
}

function away(bench: Bench, id: PartId): Candidate {
  const part = bench.inCase(id);
  if (part !== undefined && 'state' in part) {
    const edit = bench.set(part, 'state', 'open', `${nameOf(part)}: opened`);
    return { edit, cost: 'a switch opened', effort: 'setting', amount: 1 };
  }
  // A conductor of an out-and-back run goes with the whole run.
  const whole = bench.drawn(id) === undefined ? (id.replace(/\.(plus|minus)$/, '') as PartId) : id;
  return { edit: removeParts([whole]), cost: 'a link taken out', effort: 'part-away', amount: 1 };
}

/** Wiring parts in line from one junction to another, by the fewest parts. */
function shortestWay(bench: Bench, from: JunctionId, to: JunctionId): readonly PartId[] {
  const parts = withoutPairs(partsInCase(bench.job, bench.operatingCase)).filter(isWiring);
  const cameBy = new Map<JunctionId, { readonly part: PartId; readonly before: JunctionId } | null>([[from, null]]);
  for (const at of cameBy.keys()) {
    for (const part of parts) {
      const ends = joined(part);
      if (!ends.includes(at) || ('state' in part && part.state === 'open')) continue;
      for (const next of ends) if (!cameBy.has(next)) cameBy.set(next, { part: part.id, before: at });
    }
  }
  const way: PartId[] = [];
  for (let step = cameBy.get(to); step !== undefined && step !== null; step = cameBy.get(step.before))
    way.push(step.part);
  return way;
}

/** Whatever is open in the case closed, one at a time. */
export function closedAgain(bench: Bench): readonly Ladder[] {
  const open = partsInCase(bench.job, bench.operatingCase).filter((part) => 'state' in part && part.state === 'open');
  return open.slice(0, MOST_TRIED).map((part) => stepped([inUse(bench, part)]));
}

/** A part that is off or open in every case, on or closed as drawn. */
export function broughtIntoUse(bench: Bench, id: PartId): readonly Ladder[] {
  const part = bench.drawn(id);
  return part !== undefined && ('state' in part || 'on' in part) ? [stepped([inUse(bench, part)])] : [];
}

function inUse(bench: Bench, part: Part): Candidate {
  const edit =
    'state' in part
      ? bench.set(part, 'state', 'closed', `${nameOf(part)}: closed`)
      : bench.set(part, 'on', true, `${nameOf(part)}: on`);
  return { edit, cost: 'a switch', effort: 'setting', amount: 1 };
}

/** The parts named taken out of the job. */
export function takenOut(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  const known = ids.filter((id) => bench.drawn(id) !== undefined);
  // What gives or stores is not thrown away to please a list.
  const isKept = known.some((id) => ['string', 'array', 'charger', 'controller'].includes(bench.drawn(id)!.kind));
  if (known.length < ids.length || isKept || known.length === 0) return [];
  return [stepped([{ edit: removeParts(known), cost: 'parts taken out', effort: 'part-away', amount: known.length }])];
}
